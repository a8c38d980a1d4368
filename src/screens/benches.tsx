import { useQuery } from '@tanstack/react-query';
import { useTitle } from '#src/lib/title.ts';
import { ButtonLink } from '#src/ui/button.tsx';
import { EmptyState } from '#src/ui/empty-state.tsx';
import { LaserCautions } from '#src/ui/laser-cautions.tsx';
import { Loading } from '#src/ui/loading.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { BenchTable } from '#src/features/benches/bench-table.tsx';
import { benchesQuery } from '#src/features/benches/queries.ts';

export function Component() {
  useTitle('Benches');
  const benches = useQuery(benchesQuery);
  const rows = benches.data?.benches ?? [];
  const add = benches.data?.can.add ? (
    <ButtonLink to="/benches/new" look="go">
      New bench
    </ButtonLink>
  ) : null;
  return (
    <>
      <Sentence
        below="A saved set-up; every exposure keeps a copy of the values it was taken with. Uncertainties are U with k = 2."
        deeds={add}
      >
        {benches.data ? (
          <>
            <b>{rows.length === 0 ? 'No' : rows.length}</b> {rows.length === 1 ? 'bench' : 'benches'} to
            measure on
          </>
        ) : (
          'Benches'
        )}
      </Sentence>
      <ProblemNotice error={benches.error} onRetry={() => void benches.refetch()} />
      {benches.isPending ? <Loading what="the benches" /> : null}
      {benches.data && rows.length === 0 ? (
        <EmptyState
          fact="No bench is saved yet."
          next="Without wavelength, distance and pixel pitch nothing can be measured."
        />
      ) : null}
      {rows.length > 0 ? <BenchTable benches={rows} /> : null}
      <LaserCautions className="mt-6 max-w-3xl" />
    </>
  );
}
