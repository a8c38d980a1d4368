import { and, count, desc, eq } from 'drizzle-orm';
import type { Database } from '#server/db/database.ts';
import { mail } from '#server/db/schema/mail.ts';

export type MailRow = typeof mail.$inferSelect;

export async function insertMail(db: Database, row: MailRow): Promise<void> {
  await db.insert(mail).values(row);
}

export async function findMail(db: Database, id: string): Promise<MailRow | undefined> {
  return (await db.select().from(mail).where(eq(mail.id, id)))[0];
}

export async function markMail(
  db: Database,
  id: string,
  change: Partial<Pick<MailRow, 'state' | 'sentAt' | 'lastError'>>,
) {
  await db
    .update(mail)
    .set(change)
    .where(and(eq(mail.id, id)));
}

export async function selectMail(db: Database, limit: number, offset: number) {
  const total = (await db.select({ n: count() }).from(mail))[0].n;
  const rows = await db.select().from(mail).orderBy(desc(mail.createdAt)).limit(limit).offset(offset);
  return { total, rows };
}
