import { index, integer, jsonb, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core';
import { people } from '#server/db/schema/people.ts';
import type { CaseState, Drawing } from '#shared/contracts/cases.ts';

export const cases = pgTable(
  'cases',
  {
    id: uuid().primaryKey(),
    serial: integer().notNull().unique(),
    number: text().notNull().unique(),
    title: text().notNull(),
    part: text().notNull(),
    lot: text().notNull(),
    specimen: text().notNull(),
    question: text().notNull(),
    drawing: jsonb().$type<Drawing>(),
    state: text().$type<CaseState>().notNull(),
    version: integer().notNull().default(1),
    createdBy: uuid('created_by')
      .notNull()
      .references(() => people.id),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull(),
    updatedAt: timestamp('updated_at', { withTimezone: true }).notNull(),
  },
  (t) => [index('cases_state_updated').on(t.state, t.updatedAt)],
);
