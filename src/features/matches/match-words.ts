import type { CaseStage } from '#shared/contracts/cases.ts';
import type { Decision, Match, MatchState } from '#shared/contracts/matches.ts';

/** The stage mark that a match's state wears. */
export const stageOfState: Record<MatchState, CaseStage> = {
  submitted: 'in-review',
  confirmed: 'confirmed',
  returned: 'returned',
  rejected: 'rejected',
  superseded: 'confirmed',
};

export const stateWords: Record<MatchState, string> = {
  submitted: 'waits for a decision',
  confirmed: 'confirmed',
  returned: 'sent back',
  rejected: 'rejected',
  superseded: 'confirmed, then superseded',
};

export const decisionDeeds: Record<Decision, { label: string; busy: string; done: string }> = {
  confirm: { label: 'Sign and confirm', busy: 'Signing', done: 'confirmed it' },
  return: { label: 'Sign and send back', busy: 'Signing', done: 'sent it back' },
  reject: { label: 'Sign and reject', busy: 'Signing', done: 'rejected it' },
};

const numbers = [
  'No',
  'One',
  'Two',
  'Three',
  'Four',
  'Five',
  'Six',
  'Seven',
  'Eight',
  'Nine',
  'Ten',
  'Eleven',
  'Twelve',
];

/** "Three matches wait for your decision" */
export function queueSentence(count: number, mayDecide: boolean): string {
  const n = numbers[count] ?? String(count);
  const verb = count === 1 ? 'match waits' : 'matches wait';
  return mayDecide ? `${n} ${verb} for your decision` : `${n} ${verb} for a reviewer`;
}

/** How a decided match ended, in one line. */
export function decisionLine(match: Pick<Match, 'decision'>, at: (iso: string) => string): string | null {
  const d = match.decision;
  if (!d) return null;
  return `${d.by.name} ${decisionDeeds[d.decision].done}, ${at(d.at)}.${d.reason ? ` “${d.reason}”` : ''}`;
}
