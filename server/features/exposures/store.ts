import { and, asc, eq, isNull, max, sql } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import type { Database } from '#server/db/database.ts';
import { cases } from '#server/db/schema/cases.ts';
import { exposures } from '#server/db/schema/exposures.ts';
import { people } from '#server/db/schema/people.ts';

export type NewExposure = typeof exposures.$inferInsert;
export type ExposureRow = Awaited<ReturnType<typeof selectByCase>>[number];

const uploader = alias(people, 'uploader');
const withdrawer = alias(people, 'withdrawer');

function baseQuery(db: Database) {
  return db
    .select({
      exposure: exposures,
      caseNumber: cases.number,
      caseState: cases.state,
      drawing: cases.drawing,
      uploader: { id: uploader.id, name: uploader.name },
      withdrawer: { id: withdrawer.id, name: withdrawer.name },
    })
    .from(exposures)
    .innerJoin(cases, eq(cases.id, exposures.caseId))
    .innerJoin(uploader, eq(uploader.id, exposures.uploadedBy))
    .leftJoin(withdrawer, eq(withdrawer.id, exposures.withdrawnBy));
}

export async function selectByCase(db: Database, caseId: string) {
  return baseQuery(db).where(eq(exposures.caseId, caseId)).orderBy(asc(exposures.number));
}

export async function findExposure(db: Database, id: string): Promise<ExposureRow | undefined> {
  return (await baseQuery(db).where(eq(exposures.id, id)))[0];
}

/** The case, locked against a second upload at the same moment. */
export async function lockCase(tx: Database, id: string) {
  await tx.execute(sql`select id from cases where id = ${id} for update`);
  return findCaseOf(tx, id);
}

export async function findCaseOf(db: Database, id: string) {
  return (
    await db
      .select({ id: cases.id, number: cases.number, state: cases.state, drawing: cases.drawing })
      .from(cases)
      .where(eq(cases.id, id))
  )[0];
}

export async function findSameFile(db: Database, caseId: string, sha256: string) {
  return (
    await db
      .select({ number: exposures.number, fileName: exposures.fileName })
      .from(exposures)
      .where(and(eq(exposures.caseId, caseId), eq(exposures.sha256, sha256), isNull(exposures.withdrawnAt)))
  )[0];
}

export async function nextNumber(tx: Database, caseId: string): Promise<number> {
  const rows = await tx
    .select({ last: max(exposures.number) })
    .from(exposures)
    .where(eq(exposures.caseId, caseId));
  return (rows[0].last ?? 0) + 1;
}

export async function insertExposure(tx: Database, row: NewExposure): Promise<void> {
  await tx.insert(exposures).values(row);
}

export async function touchCase(tx: Database, caseId: string, at: Date): Promise<void> {
  await tx.update(cases).set({ updatedAt: at }).where(eq(cases.id, caseId));
}

export async function markWithdrawn(
  tx: Database,
  id: string,
  change: { withdrawnBy: string; withdrawnAt: Date; withdrawnReason: string },
): Promise<boolean> {
  const rows = await tx
    .update(exposures)
    .set(change)
    .where(and(eq(exposures.id, id), isNull(exposures.withdrawnAt)))
    .returning({ id: exposures.id });
  return rows.length === 1;
}
