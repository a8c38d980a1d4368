import { integer, jsonb, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core';
import { people } from '#server/db/schema/people.ts';
import type { BenchValues } from '#shared/contracts/benches.ts';

export const benches = pgTable('benches', {
  id: uuid().primaryKey(),
  name: text().notNull().unique(),
  note: text().notNull(),
  values: jsonb().$type<BenchValues>().notNull(),
  version: integer().notNull().default(1),
  createdBy: uuid('created_by')
    .notNull()
    .references(() => people.id),
  createdAt: timestamp('created_at', { withTimezone: true }).notNull(),
});
