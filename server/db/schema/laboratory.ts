import { integer, pgTable, text, timestamp } from 'drizzle-orm/pg-core';

/** One row: what this installation is, and how far its first start has come. */
export const laboratory = pgTable('laboratory', {
  id: integer().primaryKey(),
  name: text().notNull(),
  /** `demo` once the demo laboratory is loaded whole, `own` once the first administrator exists. */
  kind: text().$type<'demo' | 'own'>().notNull(),
  createdAt: timestamp('created_at', { withTimezone: true }).notNull(),
});
