import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import { call } from '#src/lib/call.ts';
import { useTitle } from '#src/lib/title.ts';
import { printExactTime } from '#src/lib/time.ts';
import { Button } from '#src/ui/button.tsx';
import { EmptyState } from '#src/ui/empty-state.tsx';
import { TextField } from '#src/ui/field.tsx';
import { Loading } from '#src/ui/loading.tsx';
import { Pager } from '#src/ui/pager.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { Table, type Column } from '#src/ui/table.tsx';
import { listAudit, type AuditEvent } from '#shared/contracts/audit.ts';

const columns: readonly Column<AuditEvent>[] = [
  {
    key: 'at',
    head: 'When',
    cell: (e) => (
      <time dateTime={e.at} className="whitespace-nowrap">
        {printExactTime(e.at)}
      </time>
    ),
  },
  {
    key: 'by',
    head: 'Who',
    cell: (e) => <span className="whitespace-nowrap">{e.by?.name ?? 'the server'}</span>,
  },
  { key: 'event', head: 'What', cell: (e) => e.event.replaceAll('-', ' ') },
  { key: 'subject', head: 'On', cell: (e) => e.subject },
  {
    key: 'detail',
    head: 'Detail, quantities in SI units',
    cell: (e) => <span className="break-words text-ink2">{detailText(e.detail)}</span>,
  },
];

function plain(value: unknown): string {
  if (typeof value === 'string') return value;
  return Array.isArray(value) ? value.map(plain).join(', ') : JSON.stringify(value);
}

/** What the record holds, as it is: quantities in SI units. */
function detailText(detail: Record<string, unknown>): string {
  return Object.entries(detail)
    .map(([key, value]) => `${key}: ${plain(value)}`)
    .join('; ');
}

export function Component() {
  useTitle('Audit trail');
  const [search, setSearch] = useSearchParams();
  const q = search.get('q')?.trim() ?? '';
  const page = Math.max(1, Number(search.get('page')) || 1);
  const [typed, setTyped] = useState(q);
  const audit = useQuery({
    queryKey: ['audit', page, q],
    queryFn: ({ signal }) => call(listAudit, { query: { page, ...(q ? { q } : {}) }, signal }),
    placeholderData: keepPreviousData,
  });
  const rows = audit.data?.rows ?? [];
  return (
    <>
      <Sentence below="Who did what, when. Nothing here is ever changed.">
        {audit.data ? (
          <>
            <b>{audit.data.total}</b> {audit.data.total === 1 ? 'entry' : 'entries'}
            {q ? ` with “${q}”` : ''}
          </>
        ) : (
          'Audit trail'
        )}
      </Sentence>
      <form
        role="search"
        aria-label="In the audit trail"
        className="mb-4 flex max-w-lg items-end gap-3"
        onSubmit={(event) => {
          event.preventDefault();
          setSearch(typed.trim() ? { q: typed.trim() } : {});
        }}
      >
        <TextField
          label="Person, deed or record"
          type="search"
          className="flex-1"
          value={typed}
          maxLength={100}
          onChange={(event) => setTyped(event.target.value)}
        />
        <Button type="submit">Find</Button>
      </form>
      <ProblemNotice error={audit.error} onRetry={() => void audit.refetch()} />
      {audit.isPending ? <Loading what="the audit trail" /> : null}
      {audit.data && rows.length === 0 ? (
        <EmptyState fact="No entry fits these words." next="Try a name, or a part of a case number." />
      ) : null}
      {rows.length > 0 ? (
        <Table caption="Audit trail" columns={columns} rows={rows} rowKey={(e) => e.id} />
      ) : null}
      {audit.data ? <Pager {...audit.data} what="entries" /> : null}
    </>
  );
}
