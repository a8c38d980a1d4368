import { and, arrayContains, asc, count, eq, ne, sql } from 'drizzle-orm';
import type { Database } from '#server/db/database.ts';
import { people } from '#server/db/schema/people.ts';
import { sessions } from '#server/db/schema/sessions.ts';

export type PersonRow = typeof people.$inferSelect;

/** Keeps what depends on all people (one address, one account; a last administrator) true until the transaction ends. */
export async function lockPeople(tx: Database): Promise<void> {
  await tx.execute(sql`lock table ${people} in share row exclusive mode`);
}

/** Ends the person's sessions, all or all but one. */
export async function endSessions(tx: Database, personId: string, exceptSid = ''): Promise<void> {
  await tx
    .delete(sessions)
    .where(and(sql`${sessions.sess} -> 'passport' ->> 'user' = ${personId}`, ne(sessions.sid, exceptSid)));
}

export async function insertPerson(db: Database, person: PersonRow): Promise<void> {
  await db.insert(people).values(person);
}

export async function selectPeople(db: Database): Promise<PersonRow[]> {
  return db.select().from(people).orderBy(asc(people.name));
}

export async function findPerson(db: Database, id: string): Promise<PersonRow | undefined> {
  return (await db.select().from(people).where(eq(people.id, id)))[0];
}

export async function findPersonByEmail(db: Database, email: string): Promise<PersonRow | undefined> {
  return (await db.select().from(people).where(eq(people.email, email.trim().toLowerCase())))[0];
}

export async function countPeople(db: Database): Promise<number> {
  return (await db.select({ n: count() }).from(people))[0].n;
}

export async function countActiveAdministrators(db: Database): Promise<number> {
  const where = and(eq(people.active, true), arrayContains(people.roles, ['administrator']));
  return (await db.select({ n: count() }).from(people).where(where))[0].n;
}

/** Changes a person whose version is still the given one; false when it is not. */
export async function updatePerson(
  db: Database,
  id: string,
  version: number,
  change: Partial<Pick<PersonRow, 'name' | 'roles' | 'active' | 'passwordHash'>>,
): Promise<boolean> {
  const rows = await db
    .update(people)
    .set({ ...change, version: version + 1 })
    .where(and(eq(people.id, id), eq(people.version, version)))
    .returning({ id: people.id });
  return rows.length === 1;
}
