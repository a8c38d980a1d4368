import type { Actor } from '#server/actor.ts';
import type { selectFronts, selectNewestMatches } from '#server/features/cases/store.ts';
import type { CaseStage, CaseState } from '#shared/contracts/cases.ts';
import type { Candidate } from '#shared/contracts/identifications.ts';
import { permits } from '#shared/permissions.ts';

export type Front = Awaited<ReturnType<typeof selectFronts>>[number];
export type NewestMatch = Awaited<ReturnType<typeof selectNewestMatches>>[number];

/** Where the work of a case stands. What was identified after a decision takes over from the decision. */
export function stageOf(
  state: CaseState,
  front: Front | undefined,
  match: NewestMatch | undefined,
): CaseStage {
  if (match?.state === 'submitted') return 'in-review';
  if (front?.state === 'queued' || front?.state === 'running') return 'running';
  if (match?.state === 'confirmed' && state === 'closed') return 'confirmed';
  if ((match?.state === 'returned' || match?.state === 'rejected') && !isNewer(front, match))
    return match.state;
  if (!front) return 'no-exposure';
  if (front.state === 'done' && front.outcome?.kind === 'answer') return front.outcome.verdict;
  return 'failed';
}

function isNewer(front: Front | undefined, match: NewestMatch): boolean {
  return !!front?.queuedAt && !!match.decidedAt && front.queuedAt > match.decidedAt;
}

/** Candidates below this share of the best one's probability are told apart from it (the engine's own gap). */
const sameShare = Math.exp(-3);

/** The candidates that a list shows for a stage: the match's own, or those of the newest identification. */
export function leadingOf(
  stage: CaseStage,
  front: Front | undefined,
  match: NewestMatch | undefined,
): Candidate[] {
  if (match && isOfMatch(stage)) return [match.candidate];
  if (front?.outcome?.kind !== 'answer') return [];
  const { candidates } = front.outcome;
  if (stage === 'identified') return candidates.slice(0, 1);
  if (stage !== 'ambiguous') return [];
  return candidates.filter((c) => c.probability >= sameShare * candidates[0].probability).slice(0, 3);
}

/** Stages that speak of the match rather than of the newest identification. */
export function isOfMatch(stage: CaseStage): boolean {
  return ['in-review', 'returned', 'rejected', 'confirmed'].includes(stage);
}

/** True when the reader has the next deed. */
export function waitsFor(actor: Actor, stage: CaseStage, match: NewestMatch | undefined): boolean {
  switch (stage) {
    case 'in-review':
      return permits(actor.roles, 'decide-matches') && match?.submittedBy !== actor.id;
    case 'running':
    case 'confirmed':
      return false;
    case 'no-exposure':
    case 'failed':
    case 'identified':
    case 'ambiguous':
    case 'unidentified':
    case 'returned':
    case 'rejected':
      return permits(actor.roles, 'edit-cases');
  }
}
