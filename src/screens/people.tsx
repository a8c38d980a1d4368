import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { useTitle } from '#src/lib/title.ts';
import { printTime } from '#src/lib/time.ts';
import { ButtonLink } from '#src/ui/button.tsx';
import { Loading } from '#src/ui/loading.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { Table, type Column } from '#src/ui/table.tsx';
import { peopleQuery } from '#src/features/people/queries.ts';
import type { Person } from '#shared/contracts/people.ts';

const columns: readonly Column<Person>[] = [
  {
    key: 'name',
    head: 'Name',
    cell: (p) => (
      <Link to={`/people/${p.id}`} className="pressable-link inline-flex min-h-6 items-center">
        {p.name}
      </Link>
    ),
  },
  { key: 'email', head: 'E-mail', cell: (p) => p.email },
  { key: 'roles', head: 'Roles', cell: (p) => p.roles.join(', ') },
  { key: 'state', head: 'Account', cell: (p) => (p.active ? 'open' : 'closed') },
  { key: 'since', head: 'Since', right: true, wideOnly: true, cell: (p) => printTime(p.createdAt) },
];

export function Component() {
  useTitle('People');
  const people = useQuery(peopleQuery);
  const rows = people.data?.people ?? [];
  const open = rows.filter((p) => p.active).length;
  return (
    <>
      <Sentence
        deeds={
          <ButtonLink to="/people/new" look="go">
            Add a person
          </ButtonLink>
        }
      >
        {people.data ? (
          <>
            <b>{open}</b> {open === 1 ? 'person may' : 'people may'} sign in
            {rows.length > open ? `, ${rows.length - open} closed` : ''}
          </>
        ) : (
          'People'
        )}
      </Sentence>
      <ProblemNotice error={people.error} onRetry={() => void people.refetch()} />
      {people.isPending ? <Loading what="the people" /> : null}
      {people.data ? <Table caption="People" columns={columns} rows={rows} rowKey={(p) => p.id} /> : null}
    </>
  );
}
