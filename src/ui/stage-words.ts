import type { CaseStage } from '#shared/contracts/cases.ts';

/** The word that always stands with the figure of a stage. */
export const stageWords: Record<CaseStage, string> = {
  'no-exposure': 'No exposure',
  running: 'Running',
  failed: 'Not measured',
  identified: 'Identified',
  ambiguous: 'Ambiguous',
  unidentified: 'Unidentified',
  'in-review': 'In review',
  returned: 'Sent back',
  rejected: 'Rejected',
  confirmed: 'Confirmed',
};
