import { boolean, index, integer, jsonb, pgTable, text, timestamp, unique, uuid } from 'drizzle-orm/pg-core';
import { cases } from '#server/db/schema/cases.ts';
import { people } from '#server/db/schema/people.ts';
import type { BenchCopy } from '#shared/contracts/benches.ts';
import type { Channel, PictureFormat } from '#shared/contracts/exposures.ts';
import type { PictureFacts } from '#shared/contracts/identifications.ts';

export const exposures = pgTable(
  'exposures',
  {
    id: uuid().primaryKey(),
    caseId: uuid('case_id')
      .notNull()
      .references(() => cases.id),
    number: integer().notNull(),
    fileName: text('file_name').notNull(),
    sha256: text().notNull(),
    byteSize: integer('byte_size').notNull(),
    format: text().$type<PictureFormat>().notNull(),
    width: integer().notNull(),
    height: integer().notNull(),
    bitDepth: integer('bit_depth').notNull(),
    fullScale: integer('full_scale').notNull(),
    codeStep: integer('code_step').notNull(),
    lossy: boolean().notNull(),
    channel: text().$type<Channel>().notNull(),
    note: text().notNull(),
    bench: jsonb().$type<BenchCopy>().notNull(),
    facts: jsonb().$type<PictureFacts>().notNull(),
    uploadedBy: uuid('uploaded_by')
      .notNull()
      .references(() => people.id),
    uploadedAt: timestamp('uploaded_at', { withTimezone: true }).notNull(),
    withdrawnBy: uuid('withdrawn_by').references(() => people.id),
    withdrawnAt: timestamp('withdrawn_at', { withTimezone: true }),
    withdrawnReason: text('withdrawn_reason'),
  },
  (t) => [unique('exposures_case_number').on(t.caseId, t.number), index('exposures_case').on(t.caseId)],
);
