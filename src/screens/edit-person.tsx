import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate, useParams } from 'react-router-dom';
import { call } from '#src/lib/call.ts';
import { useTitle } from '#src/lib/title.ts';
import { EmptyState } from '#src/ui/empty-state.tsx';
import { Loading } from '#src/ui/loading.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { EditPersonForm } from '#src/features/people/edit-person-form.tsx';
import { peopleQuery } from '#src/features/people/queries.ts';
import { editPerson, type Person } from '#shared/contracts/people.ts';

export function Component() {
  const { personId = '' } = useParams();
  const people = useQuery(peopleQuery);
  const person = people.data?.people.find((p) => p.id === personId);
  useTitle(person ? person.name : 'Person');
  if (person) return <Edit key={person.id} person={person} />;
  return (
    <>
      <Sentence>Person</Sentence>
      <ProblemNotice error={people.error} onRetry={() => void people.refetch()} />
      {people.isPending ? <Loading what="the person" /> : null}
      {people.data ? <EmptyState fact="There is no such person." next="Go back to the list." /> : null}
    </>
  );
}

function Edit({ person }: { person: Person }) {
  const client = useQueryClient();
  const navigate = useNavigate();
  const [opened, setOpened] = useState(person);
  return (
    <>
      <Sentence below={opened.email}>
        Change <b>{opened.name}</b>
      </Sentence>
      <EditPersonForm
        key={opened.version}
        person={opened}
        save={async (body) => {
          await call(editPerson, { params: { personId: opened.id }, body });
          await client.invalidateQueries({ queryKey: ['people'] });
          void client.invalidateQueries({ queryKey: ['session'] });
          await navigate('/people');
        }}
        onTakeTheirs={() =>
          void client.fetchQuery({ ...peopleQuery, staleTime: 0 }).then((fresh) => {
            const theirs = fresh.people.find((p) => p.id === opened.id);
            if (theirs) setOpened(theirs);
          })
        }
      />
    </>
  );
}
