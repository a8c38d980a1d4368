import { and, count, desc, eq, ilike, max, ne, or, sql, type SQL } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import { containing } from '#server/db/containing.ts';
import type { Database } from '#server/db/database.ts';
import { cases } from '#server/db/schema/cases.ts';
import { exposures } from '#server/db/schema/exposures.ts';
import { identifications } from '#server/db/schema/identifications.ts';
import { matches } from '#server/db/schema/matches.ts';
import { people } from '#server/db/schema/people.ts';
import type { CaseState } from '#shared/contracts/cases.ts';
import type { MatchState } from '#shared/contracts/matches.ts';

export type MatchRow = Awaited<ReturnType<typeof selectMatches>>['rows'][number];

const submitter = alias(people, 'submitter');
const decider = alias(people, 'decider');

function baseQuery(db: Database) {
  return db
    .select({
      match: matches,
      case: { number: cases.number, title: cases.title, part: cases.part },
      exposureId: identifications.exposureId,
      outcome: identifications.outcome,
      engineVersion: identifications.engineVersion,
      atlasVersion: identifications.atlasVersion,
      submitter: { id: submitter.id, name: submitter.name, email: submitter.email },
      decider: { id: decider.id, name: decider.name },
    })
    .from(matches)
    .innerJoin(cases, eq(cases.id, matches.caseId))
    .innerJoin(identifications, eq(identifications.id, matches.identificationId))
    .innerJoin(submitter, eq(submitter.id, matches.submittedBy))
    .leftJoin(decider, eq(decider.id, matches.decidedBy));
}

interface MatchFilter {
  readonly state?: MatchState | undefined;
  readonly caseId?: string | undefined;
  /** Leaves out what this person submitted. */
  readonly notBy?: string | undefined;
  readonly q?: string | undefined;
}

function condition(filter: MatchFilter): SQL | undefined {
  const pattern = filter.q ? containing(filter.q) : undefined;
  return and(
    filter.state ? eq(matches.state, filter.state) : undefined,
    filter.caseId ? eq(matches.caseId, filter.caseId) : undefined,
    filter.notBy ? ne(matches.submittedBy, filter.notBy) : undefined,
    pattern
      ? or(
          ilike(cases.number, pattern),
          ilike(cases.title, pattern),
          ilike(cases.part, pattern),
          ilike(submitter.name, pattern),
        )
      : undefined,
  );
}

/** Open ones first (oldest of them first), then the newest decisions. */
export async function selectMatches(db: Database, filter: MatchFilter, limit: number, offset: number) {
  const where = condition(filter);
  const total = await db
    .select({ n: count() })
    .from(matches)
    .innerJoin(cases, eq(cases.id, matches.caseId))
    .innerJoin(submitter, eq(submitter.id, matches.submittedBy))
    .where(where);
  const rows = await baseQuery(db)
    .where(where)
    .orderBy(
      sql`case when ${matches.state} = 'submitted' then 0 else 1 end`,
      sql`case when ${matches.state} = 'submitted' then ${matches.submittedAt} end asc`,
      desc(matches.decidedAt),
      desc(matches.submittedAt),
    )
    .limit(limit)
    .offset(offset);
  return { total: total[0].n, rows };
}

export async function selectByCase(db: Database, caseId: string) {
  return baseQuery(db).where(eq(matches.caseId, caseId)).orderBy(desc(matches.version));
}

export async function findMatch(db: Database, id: string): Promise<MatchRow | undefined> {
  return (await baseQuery(db).where(eq(matches.id, id)))[0];
}

/** What a candidate is taken from, with the state of everything around it. */
export async function findSource(tx: Database, identificationId: string) {
  return (
    await tx
      .select({
        caseId: exposures.caseId,
        caseState: cases.state,
        caseNumber: cases.number,
        withdrawnAt: exposures.withdrawnAt,
        state: identifications.state,
        outcome: identifications.outcome,
      })
      .from(identifications)
      .innerJoin(exposures, eq(exposures.id, identifications.exposureId))
      .innerJoin(cases, eq(cases.id, exposures.caseId))
      .where(eq(identifications.id, identificationId))
  )[0];
}

export async function lockCase(tx: Database, caseId: string): Promise<CaseState | undefined> {
  await tx.execute(sql`select id from cases where id = ${caseId} for update`);
  return (await tx.select({ state: cases.state }).from(cases).where(eq(cases.id, caseId)))[0]?.state;
}

export async function nextVersion(tx: Database, caseId: string): Promise<number> {
  const rows = await tx
    .select({ last: max(matches.version) })
    .from(matches)
    .where(eq(matches.caseId, caseId));
  return (rows[0].last ?? 0) + 1;
}

export async function insertMatch(tx: Database, row: typeof matches.$inferInsert): Promise<void> {
  await tx.insert(matches).values(row);
}

/** Decides a match that is still open; false when somebody was faster. */
export async function closeMatch(
  tx: Database,
  id: string,
  change: Partial<typeof matches.$inferInsert> & { state: MatchState },
): Promise<boolean> {
  const rows = await tx
    .update(matches)
    .set(change)
    .where(and(eq(matches.id, id), eq(matches.state, 'submitted')))
    .returning({ id: matches.id });
  return rows.length === 1;
}

export async function supersedeEarlier(tx: Database, caseId: string, exceptId: string): Promise<void> {
  await tx
    .update(matches)
    .set({ state: 'superseded' })
    .where(and(eq(matches.caseId, caseId), eq(matches.state, 'confirmed'), ne(matches.id, exceptId)));
}

export async function setCaseState(tx: Database, caseId: string, state: CaseState, at: Date): Promise<void> {
  await tx.update(cases).set({ state, updatedAt: at }).where(eq(cases.id, caseId));
}
