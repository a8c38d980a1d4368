import { index, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core';
import type { Mail } from '#shared/contracts/mail.ts';

export const mail = pgTable(
  'mail',
  {
    id: uuid().primaryKey(),
    to: text().notNull(),
    subject: text().notNull(),
    text: text().notNull(),
    state: text().$type<Mail['state']>().notNull(),
    lastError: text('last_error'),
    createdAt: timestamp('created_at', { withTimezone: true }).notNull(),
    sentAt: timestamp('sent_at', { withTimezone: true }),
  },
  (t) => [index('mail_created').on(t.createdAt)],
);
