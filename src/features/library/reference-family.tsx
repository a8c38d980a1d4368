import { familyOf } from '#shared/apertures/registry.ts';
import type { Reference } from '#shared/contracts/references.ts';
import { fromSi } from '#shared/quantities.ts';
import { ReferenceDisc } from '#src/features/library/reference-disc.tsx';

const stateWords = { draft: ', draft', approved: '', retired: ', retired' } as const;

/** The references of one family, openings drawn to one scale; sizes in µm. */
export function ReferenceFamily({
  family: id,
  references,
}: {
  family: string;
  references: readonly Reference[];
}) {
  const family = familyOf(id);
  const span = 1.5 * Math.max(...references.map((r) => family.extent(r.aperture.values)));
  return (
    <section aria-label={family.label} className="border-t border-rule pt-2.5">
      <h2>
        {family.label}{' '}
        <span className="label ml-1 text-ink3">
          {references.length} {references.length === 1 ? 'entry' : 'entries'}
        </span>
      </h2>
      <ul className="flex flex-wrap gap-x-4 gap-y-3 pt-2.5">
        {references.map((reference) => (
          <li key={reference.id} className="w-[92px] text-center">
            <div className="flex justify-center">
              <ReferenceDisc reference={reference} span={span} />
            </div>
            <p className="label mt-1 text-ink">
              {sizes(reference)}
              {stateWords[reference.state]}
            </p>
            <p className="axis text-ink3" title={reference.note}>
              {reference.number}
            </p>
          </li>
        ))}
      </ul>
    </section>
  );
}

function sizes({ aperture }: Reference): string {
  return familyOf(aperture.family)
    .parameters.flatMap((p) => {
      const value = aperture.values[p.key];
      return value === null || value === undefined
        ? []
        : [String(p.kind === 'length' ? fromSi(value, 'um') : value)];
    })
    .join(' by ');
}
