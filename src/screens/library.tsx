import { useQuery } from '@tanstack/react-query';
import { call } from '#src/lib/call.ts';
import { useTitle } from '#src/lib/title.ts';
import { EmptyState } from '#src/ui/empty-state.tsx';
import { Loading } from '#src/ui/loading.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { countWord } from '#src/features/cases/case-groups.ts';
import { ReferenceFamily } from '#src/features/library/reference-family.tsx';
import { families } from '#shared/apertures/registry.ts';
import { listReferences } from '#shared/contracts/references.ts';

export function Component() {
  useTitle('Library');
  const library = useQuery({
    queryKey: ['references'],
    queryFn: ({ signal }) => call(listReferences, { query: { pageSize: 200 }, signal }),
  });
  const rows = library.data?.rows ?? [];
  const groups = families
    .map((f) => ({ family: f.id, references: rows.filter((r) => r.aperture.family === f.id) }))
    .filter((g) => g.references.length > 0);
  const approved = rows.filter((r) => r.state === 'approved').length;
  const word = countWord(groups.length);
  return (
    <>
      <Sentence below="Each disc: the opening on one side of the seam, its computed fringes on the other. Sizes in µm; within a family openings are drawn to one scale.">
        {library.data ? (
          <>
            {word.charAt(0).toUpperCase() + word.slice(1)} {groups.length === 1 ? 'family' : 'families'},{' '}
            <b>{approved} approved</b>
          </>
        ) : (
          'Library'
        )}
      </Sentence>
      <ProblemNotice error={library.error} onRetry={() => void library.refetch()} />
      {library.isPending ? <Loading what="the library" /> : null}
      {library.data && rows.length === 0 ? (
        <EmptyState
          fact="The library is empty."
          next="Identifications still work: they compare with the catalogue’s families."
        />
      ) : null}
      <div className="grid gap-x-7 gap-y-6 md:grid-cols-2 lg:grid-cols-3">
        {groups.map((g) => (
          <ReferenceFamily key={g.family} {...g} />
        ))}
      </div>
    </>
  );
}
