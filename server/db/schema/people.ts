import { boolean, integer, pgTable, text, timestamp, uuid } from 'drizzle-orm/pg-core';
import type { Role } from '#shared/permissions.ts';

export const people = pgTable('people', {
  id: uuid().primaryKey(),
  name: text().notNull(),
  email: text().notNull().unique(),
  passwordHash: text('password_hash').notNull(),
  roles: text().array().$type<Role[]>().notNull(),
  active: boolean().notNull().default(true),
  version: integer().notNull().default(1),
  createdAt: timestamp('created_at', { withTimezone: true }).notNull(),
});
