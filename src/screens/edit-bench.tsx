import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate, useParams } from 'react-router-dom';
import { call } from '#src/lib/call.ts';
import { useTitle } from '#src/lib/title.ts';
import { EmptyState } from '#src/ui/empty-state.tsx';
import { Loading } from '#src/ui/loading.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { BenchForm } from '#src/features/benches/bench-form.tsx';
import { benchesQuery } from '#src/features/benches/queries.ts';
import { editBench, type Bench } from '#shared/contracts/benches.ts';

export function Component() {
  const { benchId = '' } = useParams();
  const benches = useQuery({ ...benchesQuery, refetchOnWindowFocus: false });
  const bench = benches.data?.benches.find((b) => b.id === benchId);
  useTitle(bench ? bench.name : 'Bench');
  if (bench) return <Edit key={bench.id} bench={bench} />;
  return (
    <>
      <Sentence>Bench</Sentence>
      <ProblemNotice error={benches.error} onRetry={() => void benches.refetch()} />
      {benches.isPending ? <Loading what="the bench" /> : null}
      {benches.data ? (
        <EmptyState fact="There is no such bench." next="Go back to the list of benches." />
      ) : null}
    </>
  );
}

/** Edits the bench as it was when the form was opened; a newer version of somebody else is noticed on saving. */
function Edit({ bench }: { bench: Bench }) {
  const client = useQueryClient();
  const navigate = useNavigate();
  const [opened, setOpened] = useState(bench);
  return (
    <>
      <Sentence below={`Version ${opened.version}, by ${opened.createdBy.name}.`}>
        Change <b>{opened.name}</b>
      </Sentence>
      <BenchForm
        key={opened.version}
        bench={opened}
        save={async (draft) => {
          await call(editBench, {
            params: { benchId: opened.id },
            body: { ...draft, version: opened.version },
          });
          await client.invalidateQueries({ queryKey: ['benches'] });
          await navigate('/benches');
        }}
        onTakeTheirs={() =>
          void client.fetchQuery({ ...benchesQuery, staleTime: 0 }).then((fresh) => {
            const theirs = fresh.benches.find((b) => b.id === opened.id);
            if (theirs) setOpened(theirs);
          })
        }
      />
    </>
  );
}
