import { familyOf } from '#shared/apertures/registry.ts';
import type { Candidate } from '#shared/contracts/identifications.ts';
import { printQuantity } from '#shared/quantities.ts';
import { Measured } from '#src/ui/measured.tsx';

interface CandidateSizesProps {
  candidate: Pick<Candidate, 'family' | 'dimensions'>;
  /** With ± U behind each value. */
  withU?: boolean;
}

/** "212.4 by 84.1 µm", in the order of the family's parameters; bounds and unresolved lengths said in words. */
export function CandidateSizes({ candidate, withU }: CandidateSizesProps) {
  const shown = familyOf(candidate.family).parameters.filter(
    (p) => p.kind === 'length' && candidate.dimensions[p.key],
  );
  const lastValue = shown.findLastIndex((p) => candidate.dimensions[p.key].value !== null);
  return (
    <>
      {shown.map((p, i) => {
        const d = candidate.dimensions[p.key];
        const last = i === lastValue;
        return (
          <span key={p.key}>
            {i > 0 ? (d.value === null ? ', ' : ' by ') : ''}
            {d.value === null ? (
              'length not resolved'
            ) : d.bound ? (
              <>
                {d.bound === 'at-least' ? 'at least ' : 'at most '}
                <b className="font-[740]">{printQuantity(d.value, 'um', 3)}</b>
              </>
            ) : withU ? (
              <Measured value={d.value} u={d.u} unit="um" bareUnit={!last} />
            ) : (
              <b className="font-[740]">
                {last ? printQuantity(d.value, 'um') : printQuantity(d.value, 'um').replace(/\u00a0.*/, '')}
              </b>
            )}
          </span>
        );
      })}
    </>
  );
}

/** "slot, 27.3°" */
export function candidateName(candidate: Pick<Candidate, 'family' | 'orientation'>): string {
  const label = familyOf(candidate.family).label.toLowerCase();
  return candidate.orientation ? `${label}, ${printQuantity(candidate.orientation.value, 'deg', 3)}` : label;
}
