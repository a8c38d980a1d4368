import { integer, jsonb, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core';
import { people } from '#server/db/schema/people.ts';
import type { Reference } from '#shared/contracts/references.ts';

/** Named so because `references` is a reserved word of SQL. */
export const referenceEntries = pgTable('reference_entries', {
  id: uuid().primaryKey(),
  number: text().notNull().unique(),
  name: text().notNull(),
  origin: text().$type<Reference['origin']>().notNull(),
  family: text().notNull(),
  values: jsonb().$type<Reference['aperture']['values']>().notNull(),
  note: text().notNull(),
  state: text().$type<Reference['state']>().notNull(),
  version: integer().notNull().default(1),
  approvedBy: uuid('approved_by').references(() => people.id),
  approvedAt: timestamp('approved_at', { withTimezone: true }),
});
