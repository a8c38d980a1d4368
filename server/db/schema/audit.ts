import { bigserial, index, jsonb, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core';
import { people } from '#server/db/schema/people.ts';

export const auditEvents = pgTable(
  'audit_events',
  {
    id: bigserial({ mode: 'bigint' }).primaryKey(),
    at: timestamp({ withTimezone: true }).notNull(),
    by: uuid().references(() => people.id),
    event: text().notNull(),
    subject: text().notNull(),
    subjectId: text('subject_id'),
    detail: jsonb().$type<Record<string, unknown>>().notNull(),
  },
  (t) => [index('audit_at').on(t.at)],
);
