import { and, count, desc, eq, ilike, inArray, isNull, max, or, sql, type SQL } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import { containing } from '#server/db/containing.ts';
import type { Database } from '#server/db/database.ts';
import { cases } from '#server/db/schema/cases.ts';
import { exposures } from '#server/db/schema/exposures.ts';
import { identifications } from '#server/db/schema/identifications.ts';
import { matches } from '#server/db/schema/matches.ts';
import { people } from '#server/db/schema/people.ts';
import type { CaseState } from '#shared/contracts/cases.ts';

const creator = alias(people, 'creator');
const decider = alias(people, 'decider');

const caseColumns = { case: cases, createdBy: { id: creator.id, name: creator.name } };
export type CaseRecord = Awaited<ReturnType<typeof findCase>>;

export async function findCase(db: Database, id: string) {
  const rows = await db
    .select(caseColumns)
    .from(cases)
    .innerJoin(creator, eq(creator.id, cases.createdBy))
    .where(eq(cases.id, id));
  return rows.at(0);
}

export async function selectCases(
  db: Database,
  filter: { q?: string | undefined; state?: CaseState | undefined },
  limit: number,
  offset: number,
) {
  const pattern = filter.q ? containing(filter.q) : undefined;
  const where: SQL | undefined = and(
    filter.state ? eq(cases.state, filter.state) : undefined,
    pattern
      ? or(
          ilike(cases.number, pattern),
          ilike(cases.title, pattern),
          ilike(cases.part, pattern),
          ilike(cases.lot, pattern),
          ilike(cases.specimen, pattern),
        )
      : undefined,
  );
  const total = (await db.select({ n: count() }).from(cases).where(where))[0].n;
  const rows = await db
    .select(caseColumns)
    .from(cases)
    .innerJoin(creator, eq(creator.id, cases.createdBy))
    .where(where)
    .orderBy(sql`case ${cases.state} when 'closed' then 1 else 0 end`, desc(cases.updatedAt))
    .limit(limit)
    .offset(offset);
  return { total, rows };
}

/** Of each case: how many exposures are in use, and the newest of them with its newest identification. */
export async function selectFronts(db: Database, caseIds: readonly string[]) {
  if (caseIds.length === 0) return [];
  return db
    .selectDistinctOn([exposures.caseId], {
      caseId: exposures.caseId,
      exposureId: exposures.id,
      exposureCount: sql<number>`count(*) over (partition by ${exposures.caseId})`.mapWith(Number),
      state: identifications.state,
      share: identifications.share,
      step: identifications.step,
      queuedAt: identifications.queuedAt,
      outcome: identifications.outcome,
    })
    .from(exposures)
    .leftJoin(
      identifications,
      and(
        eq(identifications.exposureId, exposures.id),
        eq(
          identifications.run,
          sql`(select max(i.run) from ${identifications} i where i.exposure_id = ${exposures.id})`,
        ),
      ),
    )
    .where(and(inArray(exposures.caseId, [...caseIds]), isNull(exposures.withdrawnAt)))
    .orderBy(exposures.caseId, desc(exposures.number));
}

/** The newest match of each case. */
export async function selectNewestMatches(db: Database, caseIds: readonly string[]) {
  if (caseIds.length === 0) return [];
  return db
    .selectDistinctOn([matches.caseId], {
      id: matches.id,
      caseId: matches.caseId,
      state: matches.state,
      submittedBy: matches.submittedBy,
      exposureId: identifications.exposureId,
      candidate: matches.candidate,
      reason: matches.reason,
      decidedAt: matches.decidedAt,
      decider: { id: decider.id, name: decider.name },
      identificationId: matches.identificationId,
    })
    .from(matches)
    .innerJoin(identifications, eq(identifications.id, matches.identificationId))
    .leftJoin(decider, eq(decider.id, matches.decidedBy))
    .where(inArray(matches.caseId, [...caseIds]))
    .orderBy(matches.caseId, desc(matches.version));
}

/** The next serial; the table is locked against a second opening until the transaction ends. */
export async function nextSerial(tx: Database): Promise<number> {
  await tx.execute(sql`lock table cases in share row exclusive mode`);
  return ((await tx.select({ last: max(cases.serial) }).from(cases))[0].last ?? 0) + 1;
}

export async function insertCase(tx: Database, row: typeof cases.$inferInsert): Promise<void> {
  await tx.insert(cases).values(row);
}

/** Changes a case that is still as the caller saw it; false when it is not. */
export async function updateCase(
  tx: Database,
  id: string,
  as: { state: CaseState; version: number },
  change: Partial<typeof cases.$inferInsert>,
): Promise<boolean> {
  const rows = await tx
    .update(cases)
    .set({ ...change, version: as.version + 1 })
    .where(and(eq(cases.id, id), eq(cases.state, as.state), eq(cases.version, as.version)))
    .returning({ id: cases.id });
  return rows.length === 1;
}
