import { familyOf } from '#shared/apertures/registry.ts';
import type { CaseRow, Drawing } from '#shared/contracts/cases.ts';
import { fromSi, units } from '#shared/quantities.ts';
import { printExactTime } from '#src/lib/time.ts';
import { ButtonLink } from '#src/ui/button.tsx';
import { CandidateSizes } from '#src/ui/candidate-words.tsx';
import { FactList } from '#src/ui/fact-list.tsx';
import { Measured } from '#src/ui/measured.tsx';
import { StateDisc } from '#src/ui/state-disc.tsx';
import { VerdictMark } from '#src/ui/verdict-mark.tsx';
import { placeOf, thumbnailOf } from '#src/features/cases/case-ledger.tsx';

/** The side preview of the case in focus. */
export function CaseGlance({ row }: { row: CaseRow }) {
  const [best] = row.leading;
  return (
    <aside aria-label={`Glance at ${row.number}`} className="space-y-3">
      <StateDisc
        stage={row.stage}
        thumbnail={thumbnailOf(row.exposureId)}
        progress={row.progress?.share ?? null}
        size={232}
      />
      <p className="glance-title">
        {best ? (
          <>
            {familyOf(best.family).label}, <CandidateSizes candidate={best} withU />
            {best.orientation ? (
              <>
                , {familyOf(best.family).axis} at <Measured {...best.orientation} unit="deg" />
              </>
            ) : null}
          </>
        ) : (
          row.title
        )}
      </p>
      <VerdictMark stage={row.stage} />
      <FactList
        facts={[
          { name: 'Case', value: row.title },
          { name: 'Part', value: placeOf(row) },
          { name: 'Drawing', value: row.drawing ? drawingText(row.drawing) : 'not given' },
          { name: 'Exposures', value: String(row.exposureCount) },
          ...(row.leading.length > 1
            ? [
                {
                  name: 'Also fits',
                  value: row.leading
                    .slice(1)
                    .map((c) => familyOf(c.family).label.toLowerCase())
                    .join(', '),
                },
              ]
            : []),
          { name: 'Opened', value: `${row.createdBy.name}, ${printExactTime(row.createdAt)}` },
        ]}
      />
      <p className="label text-ink3">{best ? 'U with k = 2.' : ''}</p>
      <div className="flex flex-wrap gap-2">
        <ButtonLink to={`/cases/${row.id}`} look="ink">
          Open the case
        </ButtonLink>
        {row.stage === 'in-review' && row.matchId ? (
          <ButtonLink to={`/reviews/${row.matchId}`}>See the match</ButtonLink>
        ) : row.exposureId ? (
          <ButtonLink to={`/exposures/${row.exposureId}`}>See the exposure</ButtonLink>
        ) : null}
      </div>
    </aside>
  );
}

/** "slot, 207 to 217 by 81 to 87 µm": family, then each size's limits, or its nominal where none are given. */
export function drawingText(drawing: Drawing): string {
  const family = familyOf(drawing.aperture.family);
  const sizes = family.parameters.flatMap((p) => {
    const limit = drawing.limits[p.key];
    const value = drawing.aperture.values[p.key];
    if (limit) return [`${fromSi(limit.lower, 'um')} to ${fromSi(limit.upper, 'um')}`];
    return value === null || value === undefined ? [] : [String(fromSi(value, 'um'))];
  });
  return `${family.label.toLowerCase()}, ${sizes.join(' by ')}\u00a0${units.um.label}`;
}
