import { index, json, pgTable, timestamp, varchar } from 'drizzle-orm/pg-core';

/** Shape that connect-pg-simple expects. */
export const sessions = pgTable(
  'sessions',
  {
    sid: varchar().primaryKey(),
    sess: json().notNull(),
    expire: timestamp({ precision: 6 }).notNull(),
  },
  (t) => [index('sessions_expire').on(t.expire)],
);
