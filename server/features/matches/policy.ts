import type { Actor } from '#server/actor.ts';
import type { MatchState } from '#shared/contracts/matches.ts';
import { permits } from '#shared/permissions.ts';

/** Why this person may not decide on the match, in a sentence; null when they may. */
export function whyNotDecide(actor: Actor, match: { submittedBy: string; state: MatchState }): string | null {
  if (match.state !== 'submitted') return 'This match has been decided.';
  if (match.submittedBy === actor.id)
    return 'You put this match forward yourself, so somebody else must decide on it.';
  if (!permits(actor.roles, 'decide-matches')) return 'Only a reviewer decides on matches.';
  return null;
}
