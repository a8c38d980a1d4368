import type { CaseRow } from '#shared/contracts/cases.ts';

export const caseGroups = ['wait', 'running', 'came-back', 'in-review', 'others', 'closed'] as const;
export type CaseGroup = (typeof caseGroups)[number];

export const groupTitles: Record<CaseGroup, string> = {
  wait: 'Wait for you',
  running: 'Running',
  'came-back': 'Came back from review',
  'in-review': 'In review',
  others: 'Wait for others',
  closed: 'Closed',
};

/** The one group of the work list that a case stands in. */
export function groupOf(row: Pick<CaseRow, 'state' | 'stage' | 'waitsForYou'>): CaseGroup {
  if (row.state === 'closed') return 'closed';
  if (row.stage === 'running') return 'running';
  if (row.stage === 'returned' || row.stage === 'rejected') return 'came-back';
  if (row.waitsForYou) return 'wait';
  return row.state === 'in-review' ? 'in-review' : 'others';
}

const small = [
  'no',
  'one',
  'two',
  'three',
  'four',
  'five',
  'six',
  'seven',
  'eight',
  'nine',
  'ten',
  'eleven',
  'twelve',
];

/** Numbers up to twelve as words, as in running text. */
export function countWord(n: number): string {
  return small[n] ?? String(n);
}
