import type { z } from 'zod';
import type { Actor } from '#server/actor.ts';
import { record } from '#server/audit/audit.ts';
import type { Deps } from '#server/deps.ts';
import { postMail } from '#server/features/mail/service.ts';
import { decisionMail } from '#server/features/matches/decision-mail.ts';
import { whyNotDecide } from '#server/features/matches/policy.ts';
import { presentMatch } from '#server/features/matches/present.ts';
import {
  closeMatch,
  findMatch,
  findSource,
  insertMatch,
  lockCase,
  nextVersion,
  selectByCase,
  selectMatches,
  setCaseState,
  supersedeEarlier,
} from '#server/features/matches/store.ts';
import { passwordIsRight } from '#server/features/people/service.ts';
import { notFound, Refusal } from '#server/http/refusal.ts';
import {
  signatureMeanings,
  type Decision,
  type decideMatchSchema,
  type listMatches,
  type Match,
  type MatchState,
  type submitMatchSchema,
} from '#shared/contracts/matches.ts';
import { permits } from '#shared/permissions.ts';

const states: Record<Decision, MatchState> = { confirm: 'confirmed', return: 'returned', reject: 'rejected' };

/** Puts a candidate forward for review; the case is then under review. */
export async function putForward(
  deps: Deps,
  actor: Actor,
  caseId: string,
  input: z.output<typeof submitMatchSchema>,
): Promise<Match> {
  const id = deps.newId();
  await deps.db.transaction(async (tx) => {
    const state = await lockCase(tx, caseId);
    if (!state) throw notFound('case');
    const source = await findSource(tx, input.identificationId);
    if (source?.caseId !== caseId) throw notFound('identification');
    if (state === 'in-review')
      throw new Refusal(
        'wrong-state',
        `A match of ${source.caseNumber} is under review already. Wait for the decision.`,
      );
    if (state === 'closed')
      throw new Refusal(
        'wrong-state',
        `${source.caseNumber} is closed. Reopen it before a new match is put forward.`,
      );
    if (source.withdrawnAt)
      throw new Refusal(
        'wrong-state',
        'The exposure of this candidate is withdrawn. Choose a candidate of another exposure.',
      );
    if (source.outcome?.kind !== 'answer')
      throw new Refusal(
        'wrong-state',
        'The identification has no answer yet, so there is nothing to put forward.',
      );
    if (source.outcome.verdict === 'unidentified')
      throw new Refusal(
        'wrong-state',
        'The identification says "unidentified": no shape of the catalogue fits, so none can be put forward. Take another exposure or measure by another method.',
      );
    const candidate = source.outcome.candidates[input.candidateIndex];
    if (!candidate)
      throw new Refusal('invalid-input', 'There is no such candidate.', [
        { pointer: '#/candidateIndex', detail: 'Choose one of the ranked candidates.' },
      ]);
    const at = deps.clock();
    await insertMatch(tx, {
      id,
      caseId,
      version: await nextVersion(tx, caseId),
      identificationId: input.identificationId,
      candidateIndex: input.candidateIndex,
      candidate,
      comment: input.comment,
      state: 'submitted',
      submittedBy: actor.id,
      submittedAt: at,
    });
    await setCaseState(tx, caseId, 'in-review', at);
    await record(tx, actor, at, 'submit-match', { kind: 'match', id }, { caseId, family: candidate.family });
  });
  return readMatch(deps, actor, id);
}

/** Signs a decision. The password is asked again; nobody decides on their own match; of two deciders one is first. */
export async function decide(
  deps: Deps,
  actor: Actor,
  matchId: string,
  input: z.output<typeof decideMatchSchema>,
): Promise<Match> {
  const before = await findMatch(deps.db, matchId);
  if (!before) throw notFound('match');
  if (before.match.submittedBy === actor.id)
    throw new Refusal(
      'own-match',
      'You put this match forward yourself, so somebody else must decide on it.',
    );
  if (!(await passwordIsRight(deps.db, actor.id, input.password)))
    throw new Refusal('wrong-password', 'The password is not right, so nothing was signed. Type it again.', [
      { pointer: '#/password', detail: 'This is not your password. Nothing was signed.' },
    ]);
  await deps.db.transaction(async (tx) => {
    const row = await findMatch(tx, matchId);
    if (!row) throw notFound('match');
    await lockCase(tx, row.match.caseId);
    const why = whyNotDecide(actor, row.match);
    if (why) throw new Refusal('wrong-state', `${why} Reload the page to see how.`);
    const at = deps.clock();
    const meaning = signatureMeanings[input.decision];
    const closed = await closeMatch(tx, matchId, {
      state: states[input.decision],
      decision: input.decision,
      decidedBy: actor.id,
      decidedAt: at,
      reason: input.reason,
      meaning,
    });
    if (!closed)
      throw new Refusal(
        'wrong-state',
        'Somebody else decided on this match a moment ago. Reload the page to see how.',
      );
    if (input.decision === 'confirm') await supersedeEarlier(tx, row.match.caseId, matchId);
    await setCaseState(tx, row.match.caseId, input.decision === 'confirm' ? 'closed' : 'open', at);
    await record(
      tx,
      actor,
      at,
      `${input.decision}-match`,
      { kind: 'match', id: matchId },
      { reason: input.reason, meaning },
    );
    await postMail(
      tx,
      deps,
      decisionMail(row, input.decision, input.reason, actor.name, deps.settings.baseUrl),
    );
  });
  return readMatch(deps, actor, matchId);
}

export async function readMatch(deps: Deps, actor: Actor, id: string): Promise<Match> {
  const row = await findMatch(deps.db, id);
  if (!row) throw notFound('match');
  return presentMatch(row, actor);
}

export async function matchesOfCase(deps: Deps, actor: Actor, caseId: string): Promise<Match[]> {
  return (await selectByCase(deps.db, caseId)).map((row) => presentMatch(row, actor));
}

export async function reviewTable(deps: Deps, actor: Actor, query: z.output<(typeof listMatches)['query']>) {
  const { page, pageSize, caseId, q } = query;
  const waiting = query.mine === 'decide';
  if (waiting && !permits(actor.roles, 'decide-matches')) return { total: 0, page, pageSize, rows: [] };
  const filter = {
    caseId,
    q,
    state: waiting ? ('submitted' as const) : query.state,
    notBy: waiting ? actor.id : undefined,
  };
  const { total, rows } = await selectMatches(deps.db, filter, pageSize, (page - 1) * pageSize);
  return { total, page, pageSize, rows: rows.map((row) => presentMatch(row, actor)) };
}
