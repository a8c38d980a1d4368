import type { CaseRow } from '#shared/contracts/cases.ts';
import { familyOf } from '#shared/apertures/registry.ts';
import { printTime } from '#src/lib/time.ts';
import { ProgressBar } from '#src/ui/progress-bar.tsx';

/** What is to be done next with a case, in bold, and why. */
export function NextDeed({ row }: { row: CaseRow }) {
  if (row.stage === 'running')
    return <ProgressBar {...(row.progress ?? { share: 0, step: 'waiting for its turn' })} />;
  const { deed, why } = words(row);
  return (
    <span>
      <b className="font-[720]">{deed}</b> {why}
    </span>
  );
}

function words(row: CaseRow): { deed: string; why: string } {
  const shapes = row.leading.map((c) => familyOf(c.family).label.toLowerCase());
  switch (row.stage) {
    case 'no-exposure':
      return { deed: 'Add an exposure.', why: 'Nothing can be measured without one.' };
    case 'running':
      return { deed: 'Wait.', why: '' };
    case 'failed':
      return { deed: 'Look at the exposure.', why: 'Its picture could not be measured.' };
    case 'identified':
      return {
        deed: 'Put the match forward.',
        why: row.leading[0]
          ? `One shape fits, misfit ${row.leading[0].reducedChiSquare.toFixed(2)}.`
          : 'One shape fits.',
      };
    case 'ambiguous':
      return { deed: 'Choose or add an exposure.', why: `More than one shape fits: ${shapes.join(', ')}.` };
    case 'unidentified':
      return { deed: 'Add another exposure.', why: 'No shape of the catalogue fits.' };
    case 'in-review':
      return row.waitsForYou
        ? { deed: 'Decide on the match.', why: 'Its signature is open.' }
        : { deed: 'With review.', why: 'A second person decides.' };
    case 'returned':
    case 'rejected':
      return {
        deed: `${row.stage === 'returned' ? 'Sent back' : 'Rejected'} by ${row.cameBack?.by.name ?? 'review'}${row.cameBack ? `, ${printTime(row.cameBack.at)}` : ''}.`,
        why: row.cameBack?.reason ? `“${row.cameBack.reason}”` : '',
      };
    case 'confirmed':
      return { deed: 'Confirmed.', why: 'A second person signed the match.' };
  }
}
