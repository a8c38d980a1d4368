import { Link } from 'react-router-dom';
import { address } from '#src/lib/address.ts';
import { printTime } from '#src/lib/time.ts';
import { ApertureSketch } from '#src/ui/aperture-sketch.tsx';
import { CandidateSizes, candidateName } from '#src/ui/candidate-words.tsx';
import { classNames } from '#src/ui/class-names.ts';
import { stageWords } from '#src/ui/stage-words.ts';
import { StateDisc } from '#src/ui/state-disc.tsx';
import { NextDeed } from '#src/features/cases/next-deed.tsx';
import type { CaseRow } from '#shared/contracts/cases.ts';
import { getExposureThumbnail } from '#shared/contracts/exposures.ts';

export function thumbnailOf(exposureId: string | null): string | null {
  return exposureId ? address(getExposureThumbnail, { exposureId }) : null;
}

interface CaseLedgerProps {
  title: string;
  note?: string;
  rows: readonly CaseRow[];
  current: string | null;
  onCurrent: (id: string) => void;
}

/** One group of the work list. A row is one link; the row in focus is shown in the glance. */
export function CaseLedger({ title, note, rows, current, onCurrent }: CaseLedgerProps) {
  return (
    <section aria-label={title} className="mt-4 first:mt-0">
      <h2 className="border-b border-rule pb-1.5">
        {title} <span className="label ml-1.5 text-ink3">{note ?? rows.length}</span>
      </h2>
      <ul>
        {rows.map((row) => (
          <li
            key={row.id}
            className={classNames(
              'relative border-b border-rule',
              row.id === current &&
                'bg-raised before:absolute before:inset-y-0 before:-left-3.5 before:w-1 before:bg-seam',
            )}
            onMouseEnter={() => onCurrent(row.id)}
          >
            <Link
              to={`/cases/${row.id}`}
              data-case={row.id}
              onFocus={() => onCurrent(row.id)}
              className="grid min-h-[66px] grid-cols-[64px_minmax(0,1fr)] items-center gap-x-3 py-1 sm:grid-cols-[64px_minmax(0,1.1fr)_minmax(0,1.9fr)_84px] lg:grid-cols-[64px_minmax(0,1.15fr)_minmax(0,1.8fr)_minmax(0,1.35fr)_84px]"
            >
              <StateDisc
                stage={row.stage}
                thumbnail={thumbnailOf(row.exposureId)}
                progress={row.progress?.share ?? null}
                named={false}
              />
              <span className="min-w-0">
                <span className="name block">
                  {row.number} <span className="label font-[600] text-ink3">{stageWords[row.stage]}</span>
                </span>
                <span className="block truncate text-ink2">{placeOf(row)}</span>
              </span>
              <span className="line-clamp-3 min-w-0 max-sm:col-start-2">
                <NextDeed row={row} />
              </span>
              <span className="flex min-w-0 items-center gap-2.5 max-lg:hidden">
                <RowResult row={row} />
              </span>
              <span className="pr-2 text-right text-ink2 max-sm:hidden">{printTime(row.updatedAt)}</span>
            </Link>
          </li>
        ))}
      </ul>
    </section>
  );
}

/** "Spray-orifice plate, lot 7, A3" */
export function placeOf(row: Pick<CaseRow, 'title' | 'part' | 'lot' | 'specimen'>): string {
  return (
    [row.part, /^\d/.test(row.lot) ? `lot ${row.lot}` : row.lot, row.specimen].filter(Boolean).join(', ') ||
    row.title
  );
}

function RowResult({ row }: { row: CaseRow }) {
  const [best] = row.leading;
  if (!best) return <span className="text-ink3">{row.exposureCount === 0 ? '' : 'no shape yet'}</span>;
  return (
    <>
      {row.leading.slice(0, 2).map((c) => (
        <ApertureSketch
          key={c.family}
          family={c.family}
          values={c.values}
          orientation={c.orientation?.value ?? null}
          size={33}
        />
      ))}
      <span className="min-w-0 text-ink2">
        {row.leading.length > 1 ? (
          row.leading.map(candidateName).join(' or ')
        ) : (
          <>
            <span className="text-ink">
              <CandidateSizes candidate={best} />
            </span>
            <br />
            {candidateName(best)}
          </>
        )}
      </span>
    </>
  );
}
