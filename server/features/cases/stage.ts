import type { Actor } from '#server/actor.ts';
import type { selectFronts, selectNewestMatches } from '#server/features/cases/store.ts';
import type { CaseStage } from '#shared/contracts/cases.ts';
import type { Candidate } from '#shared/contracts/identifications.ts';
import { permits } from '#shared/permissions.ts';

export type Front = Awaited<ReturnType<typeof selectFronts>>[number];
export type NewestMatch = Awaited<ReturnType<typeof selectNewestMatches>>[number];

/** Where the work of a case stands. A newer identification than a returned match's takes over from the return. */
export function stageOf(front: Front | undefined, match: NewestMatch | undefined): CaseStage {
  if (match?.state === 'submitted') return 'in-review';
  if (front?.state === 'queued' || front?.state === 'running') return 'running';
  if (match?.state === 'returned' || match?.state === 'rejected') return match.state;
  if (match?.state === 'confirmed') return 'confirmed';
  if (!front) return 'no-exposure';
  if (front.state === 'done' && front.outcome?.kind === 'answer') return front.outcome.verdict;
  return 'failed';
}

const shown: Partial<Record<CaseStage, number>> = { identified: 1, ambiguous: 3, unidentified: 0, failed: 0 };

/** The candidates that a list shows for a stage: the match's own, or the best of the newest identification. */
export function leadingOf(
  stage: CaseStage,
  front: Front | undefined,
  match: NewestMatch | undefined,
): Candidate[] {
  if (match && ['in-review', 'returned', 'rejected', 'confirmed'].includes(stage)) return [match.candidate];
  const count = shown[stage] ?? 0;
  return front?.outcome?.kind === 'answer' ? front.outcome.candidates.slice(0, count) : [];
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
