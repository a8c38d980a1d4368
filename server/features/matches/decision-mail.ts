import type { MatchRow } from '#server/features/matches/store.ts';
import type { Decision } from '#shared/contracts/matches.ts';

const deeds: Record<Decision, string> = { confirm: 'confirmed', return: 'returned', reject: 'rejected' };

/** What the analyst is told about a decision. */
export function decisionMail(
  row: MatchRow,
  decision: Decision,
  reason: string,
  reviewer: string,
  baseUrl: string,
): { to: string; subject: string; text: string } {
  const { number, title, part } = row.case;
  return {
    to: row.submitter.email,
    subject: `${number}: match ${row.match.version} was ${deeds[decision]}`,
    text: [
      `${reviewer} ${deeds[decision]} your match ${row.match.version} of ${number} (${title}, ${part}).`,
      ...(reason ? ['', 'Reason:', reason] : []),
      '',
      `The case: ${baseUrl}/cases/${row.match.caseId}`,
    ].join('\n'),
  };
}
