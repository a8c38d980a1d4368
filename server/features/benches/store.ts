import { and, asc, eq, ne, sql } from 'drizzle-orm';
import type { Database } from '#server/db/database.ts';
import { benches } from '#server/db/schema/benches.ts';
import { people } from '#server/db/schema/people.ts';

export type NewBench = typeof benches.$inferInsert;
export type BenchRow = Awaited<ReturnType<typeof selectBenches>>[number];

const columns = {
  id: benches.id,
  name: benches.name,
  note: benches.note,
  values: benches.values,
  version: benches.version,
  createdAt: benches.createdAt,
  createdBy: { id: people.id, name: people.name },
};

export async function selectBenches(db: Database) {
  return db
    .select(columns)
    .from(benches)
    .innerJoin(people, eq(people.id, benches.createdBy))
    .orderBy(asc(benches.name));
}

export async function findBench(db: Database, id: string): Promise<BenchRow | undefined> {
  return (
    await db
      .select(columns)
      .from(benches)
      .innerJoin(people, eq(people.id, benches.createdBy))
      .where(eq(benches.id, id))
  )[0];
}

/** Keeps names unique until the transaction ends. */
export async function lockBenches(tx: Database): Promise<void> {
  await tx.execute(sql`lock table ${benches} in share row exclusive mode`);
}

export async function isNameTaken(db: Database, name: string, exceptId: string): Promise<boolean> {
  const rows = await db
    .select({ id: benches.id })
    .from(benches)
    .where(and(eq(benches.name, name), ne(benches.id, exceptId)));
  return rows.length > 0;
}

export async function insertBench(db: Database, bench: NewBench): Promise<void> {
  await db.insert(benches).values(bench);
}

export async function updateBench(
  db: Database,
  id: string,
  version: number,
  change: Pick<NewBench, 'name' | 'note' | 'values'>,
): Promise<boolean> {
  const rows = await db
    .update(benches)
    .set({ ...change, version: version + 1 })
    .where(and(eq(benches.id, id), eq(benches.version, version)))
    .returning({ id: benches.id });
  return rows.length === 1;
}
