import { familyOf } from '#shared/apertures/registry.ts';
import type { Candidate } from '#shared/contracts/identifications.ts';
import { printQuantity } from '#shared/quantities.ts';
import { ApertureSketch } from '#src/ui/aperture-sketch.tsx';
import { CandidateSizes } from '#src/ui/candidate-words.tsx';
import { classNames } from '#src/ui/class-names.ts';
import { Measured } from '#src/ui/measured.tsx';
import { printProbability } from '#src/ui/print-probability.ts';

interface CandidateListProps {
  candidates: readonly Candidate[];
  chosen: number;
  onChoose: (index: number) => void;
  /** Two may stay in play; nothing is claimed where none is. */
  claimed: boolean;
}

/** Ranked candidates at a common scale. Radio buttons underneath: ↑ ↓ choose. */
export function CandidateList({ candidates, chosen, onChoose, claimed }: CandidateListProps) {
  const span = 1.3 * Math.max(...candidates.map((c) => familyOf(c.family).extent(c.values)));
  return (
    <fieldset>
      <legend className="flex w-full items-baseline justify-between gap-4 border-b border-rule pb-1.5">
        <span className="text-[13px] font-[750]">
          {claimed ? 'Candidates' : 'Nearest shapes, not claimed'}
        </span>
        <span className="label ml-4 text-ink3">
          {claimed ? 'probability, reduced chi-square' : 'probability'}
        </span>
      </legend>
      {candidates.map((candidate, i) => (
        <CandidateRow
          key={`${candidate.family} ${candidate.model}`}
          candidate={candidate}
          rank={i + 1}
          chosen={i === chosen}
          span={span}
          claimed={claimed}
          onChoose={() => onChoose(i)}
        />
      ))}
    </fieldset>
  );
}

interface RowProps {
  candidate: Candidate;
  rank: number;
  chosen: boolean;
  span: number;
  /** The chi-square of a shape that is not claimed rests on a noise law fitted to its own misfit, so it is not shown. */
  claimed: boolean;
  onChoose: () => void;
}

function CandidateRow({ candidate: c, rank, chosen, span, claimed, onChoose }: RowProps) {
  const family = familyOf(c.family);
  return (
    <label
      className={classNames(
        'relative flex min-h-[58px] items-center gap-3 border-b border-rule py-1.5 pr-1 has-focus-visible:outline-3 has-focus-visible:outline-ink',
        chosen && 'bg-raised before:absolute before:inset-y-0 before:-left-3 before:w-1 before:bg-seam',
      )}
    >
      <input type="radio" name="candidate" className="sr-only" checked={chosen} onChange={onChoose} />
      <span className="w-4 shrink-0 text-right font-[680]">{rank}</span>
      <ApertureSketch
        family={c.family}
        values={c.values}
        orientation={c.orientation?.value ?? null}
        span={span}
        size={44}
      />
      <span className="min-w-0 flex-1">
        <span className="name block">{family.label}</span>
        <span className="block text-ink2">
          <CandidateSizes candidate={c} withU />
          {c.orientation ? (
            <>
              , <Measured value={c.orientation.value} u={c.orientation.u} unit="deg" />{' '}
              <span className="label text-ink3">
                repeats every {printQuantity(c.orientationPeriod ?? 0, 'deg', 3)}
              </span>
            </>
          ) : null}
        </span>
      </span>
      <span className="shrink-0 text-right">
        <span className="block font-[720]">{printProbability(c.probability)}</span>
        {claimed ? (
          <span className="label block text-ink3">
            <span className="sr-only">reduced chi-square </span>
            {printChiSquare(c.reducedChiSquare)}
          </span>
        ) : null}
      </span>
    </label>
  );
}

function printChiSquare(value: number): string {
  return value < 10 ? value.toFixed(2) : value.toPrecision(3).replace(/e\+?/, ' e');
}
