import { and, desc, eq, inArray, max } from 'drizzle-orm';
import type { Database } from '#server/db/database.ts';
import { cases } from '#server/db/schema/cases.ts';
import { exposures } from '#server/db/schema/exposures.ts';
import { identifications } from '#server/db/schema/identifications.ts';
import { people } from '#server/db/schema/people.ts';
import type { IdentificationState } from '#shared/contracts/identifications.ts';

export type IdentificationRow = Awaited<ReturnType<typeof selectByExposure>>[number];
type Change = Partial<Omit<typeof identifications.$inferInsert, 'id'>>;

function baseQuery(db: Database) {
  return db
    .select({
      identification: identifications,
      caseId: exposures.caseId,
      caseState: cases.state,
      withdrawnAt: exposures.withdrawnAt,
      startedBy: { id: people.id, name: people.name },
    })
    .from(identifications)
    .innerJoin(exposures, eq(exposures.id, identifications.exposureId))
    .innerJoin(cases, eq(cases.id, exposures.caseId))
    .innerJoin(people, eq(people.id, identifications.startedBy));
}

export async function selectByExposure(db: Database, exposureId: string) {
  return baseQuery(db).where(eq(identifications.exposureId, exposureId)).orderBy(desc(identifications.run));
}

export async function findIdentification(db: Database, id: string): Promise<IdentificationRow | undefined> {
  return (await baseQuery(db).where(eq(identifications.id, id)))[0];
}

/** The newest identification of each exposure, without the outcome's bulk. */
export async function selectLatest(db: Database, exposureIds: readonly string[]) {
  if (exposureIds.length === 0) return [];
  return db
    .selectDistinctOn([identifications.exposureId], {
      id: identifications.id,
      exposureId: identifications.exposureId,
      state: identifications.state,
      share: identifications.share,
      step: identifications.step,
      outcome: identifications.outcome,
    })
    .from(identifications)
    .where(inArray(identifications.exposureId, [...exposureIds]))
    .orderBy(identifications.exposureId, desc(identifications.run));
}

export async function findExposureFile(db: Database, exposureId: string) {
  return (
    await db
      .select({
        sha256: exposures.sha256,
        bench: exposures.bench,
        withdrawnAt: exposures.withdrawnAt,
        caseState: cases.state,
        caseNumber: cases.number,
      })
      .from(exposures)
      .innerJoin(cases, eq(cases.id, exposures.caseId))
      .where(eq(exposures.id, exposureId))
  )[0];
}

export async function nextRun(tx: Database, exposureId: string): Promise<number> {
  const rows = await tx
    .select({ last: max(identifications.run) })
    .from(identifications)
    .where(eq(identifications.exposureId, exposureId));
  return (rows[0].last ?? 0) + 1;
}

export async function insertIdentification(
  tx: Database,
  row: typeof identifications.$inferInsert,
): Promise<void> {
  await tx.insert(identifications).values(row);
}

/** Changes a row that is in one of the given states; false when it is not. */
export async function changeIdentification(
  db: Database,
  id: string,
  from: readonly IdentificationState[],
  change: Change,
): Promise<boolean> {
  const rows = await db
    .update(identifications)
    .set(change)
    .where(and(eq(identifications.id, id), inArray(identifications.state, [...from])))
    .returning({ id: identifications.id });
  return rows.length === 1;
}

export async function hasOneUnderWay(db: Database, exposureId: string): Promise<boolean> {
  const rows = await db
    .select({ id: identifications.id })
    .from(identifications)
    .where(
      and(eq(identifications.exposureId, exposureId), inArray(identifications.state, ['queued', 'running'])),
    );
  return rows.length > 0;
}
