import { sql } from 'drizzle-orm';
import {
  index,
  integer,
  jsonb,
  pgTable,
  real,
  text,
  timestamp,
  unique,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import { exposures } from '#server/db/schema/exposures.ts';
import { people } from '#server/db/schema/people.ts';
import type { IdentificationState, Outcome } from '#shared/contracts/identifications.ts';
import type { Problem } from '#shared/problems.ts';

export const identifications = pgTable(
  'identifications',
  {
    id: uuid().primaryKey(),
    exposureId: uuid('exposure_id')
      .notNull()
      .references(() => exposures.id),
    run: integer().notNull(),
    state: text().$type<IdentificationState>().notNull(),
    share: real().notNull().default(0),
    step: text().notNull().default(''),
    outcome: jsonb().$type<Outcome>(),
    problem: jsonb().$type<Problem>(),
    engineVersion: text('engine_version').notNull(),
    atlasVersion: text('atlas_version').notNull(),
    startedBy: uuid('started_by')
      .notNull()
      .references(() => people.id),
    queuedAt: timestamp('queued_at', { withTimezone: true }).notNull(),
    startedAt: timestamp('started_at', { withTimezone: true }),
    finishedAt: timestamp('finished_at', { withTimezone: true }),
  },
  (t) => [
    unique('identifications_exposure_run').on(t.exposureId, t.run),
    index('identifications_exposure').on(t.exposureId),
    uniqueIndex('identifications_one_under_way')
      .on(t.exposureId)
      .where(sql`state in ('queued', 'running')`),
  ],
);
