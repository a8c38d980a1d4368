import { and, asc, count, eq } from 'drizzle-orm';
import type { Database } from '#server/db/database.ts';
import { people } from '#server/db/schema/people.ts';
import { referenceEntries } from '#server/db/schema/references.ts';

export type NewReference = typeof referenceEntries.$inferInsert;

const columns = {
  id: referenceEntries.id,
  number: referenceEntries.number,
  name: referenceEntries.name,
  origin: referenceEntries.origin,
  family: referenceEntries.family,
  values: referenceEntries.values,
  note: referenceEntries.note,
  state: referenceEntries.state,
  version: referenceEntries.version,
  approvedAt: referenceEntries.approvedAt,
  approvedBy: { id: people.id, name: people.name },
};

export async function selectReferences(
  db: Database,
  family: string | undefined,
  limit: number,
  offset: number,
) {
  const where = family ? eq(referenceEntries.family, family) : undefined;
  const total = (await db.select({ n: count() }).from(referenceEntries).where(where))[0].n;
  const rows = await db
    .select(columns)
    .from(referenceEntries)
    .leftJoin(people, eq(people.id, referenceEntries.approvedBy))
    .where(where)
    .orderBy(asc(referenceEntries.family), asc(referenceEntries.number))
    .limit(limit)
    .offset(offset);
  return { total, rows };
}

export async function selectApproved(db: Database, family: string) {
  return db
    .select({
      id: referenceEntries.id,
      number: referenceEntries.number,
      name: referenceEntries.name,
      values: referenceEntries.values,
    })
    .from(referenceEntries)
    .where(and(eq(referenceEntries.family, family), eq(referenceEntries.state, 'approved')))
    .orderBy(asc(referenceEntries.number));
}

export async function insertReference(db: Database, row: NewReference): Promise<void> {
  await db.insert(referenceEntries).values(row);
}
