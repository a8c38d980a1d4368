import { useQuery } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { useNavigate, useSearchParams } from 'react-router-dom';
import { useKeys } from '#src/lib/keys.ts';
import { useMay } from '#src/lib/session.ts';
import { useTitle } from '#src/lib/title.ts';
import { printNow } from '#src/lib/time.ts';
import { ButtonLink } from '#src/ui/button.tsx';
import { EmptyState } from '#src/ui/empty-state.tsx';
import { Loading } from '#src/ui/loading.tsx';
import { Pager } from '#src/ui/pager.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { CaseGlance } from '#src/features/cases/case-glance.tsx';
import { caseGroups, groupOf, groupTitles, type CaseGroup } from '#src/features/cases/case-groups.ts';
import { CaseLedger } from '#src/features/cases/case-ledger.tsx';
import { casesQuery } from '#src/features/cases/queries.ts';
import { WorkListRest, WorkListSentence } from '#src/features/cases/work-list-sentence.tsx';

export function Component() {
  useTitle('Work list');
  const navigate = useNavigate();
  const mayOpen = useMay('edit-cases');
  const [search, setSearch] = useSearchParams();
  const q = search.get('q')?.trim() ?? '';
  const page = Math.max(1, Number(search.get('page')) || 1);
  const asked = search.get('show');
  const show = caseGroups.find((g) => g === asked) ?? null;
  const cases = useQuery(casesQuery({ page, q }));
  const [focused, setFocused] = useState<string | null>(null);
  const now = useMinute();

  const rows = cases.data?.rows ?? [];
  const groups = caseGroups
    .map((group) => ({ group, rows: rows.filter((row) => groupOf(row) === group) }))
    .filter((g) => g.rows.length > 0);
  const counts = cases.data ? new Map(groups.map((g) => [g.group, g.rows.length])) : null;
  const shown = show ? groups.filter((g) => g.group === show) : groups;
  const order = shown.flatMap((g) => g.rows);
  const current = order.find((row) => row.id === focused) ?? order[0] ?? null;

  const filter = (group: CaseGroup | null) => {
    const next = new URLSearchParams(search);
    if (group) next.set('show', group);
    else next.delete('show');
    setSearch(next, { replace: true });
  };
  const step = (by: number) => {
    const active = document.activeElement?.getAttribute('data-case');
    const at = order.findIndex((row) => row.id === (active ?? current?.id));
    const target = order[active ? Math.min(order.length - 1, Math.max(0, at + by)) : Math.max(0, at)];
    if (target) document.querySelector<HTMLElement>(`[data-case="${target.id}"]`)?.focus();
  };
  useKeys([
    { keys: 'j', label: 'next', run: () => step(1) },
    { keys: 'k', label: 'previous', run: () => step(-1) },
    { keys: 'Enter', label: 'open', run: () => current && void navigate(`/cases/${current.id}`) },
    {
      keys: 'f',
      label: 'filter',
      run: () => {
        const names = [null, ...groups.map((g) => g.group)];
        filter(names[(names.indexOf(show) + 1) % names.length] ?? null);
      },
    },
    ...(mayOpen ? [{ keys: 'n', label: 'new case', run: () => void navigate('/cases/new') }] : []),
  ]);

  return (
    <>
      <Sentence
        below={
          q ? (
            <>
              Found for “{q}” in number, title, part, lot and specimen.{' '}
              <button type="button" className="pressable-link min-h-6" onClick={() => void navigate('/')}>
                Show all
              </button>
            </>
          ) : (
            <>
              {printNow(now)}.
              <WorkListRest counts={counts} show={show} onShow={filter} />
            </>
          )
        }
        deeds={
          mayOpen ? (
            <ButtonLink to="/cases/new" look="go" keyHint="n">
              New case
            </ButtonLink>
          ) : null
        }
      >
        <WorkListSentence
          counts={counts}
          found={q ? (cases.data?.total ?? null) : null}
          show={show}
          onShow={filter}
        />
      </Sentence>
      <ProblemNotice error={cases.error} onRetry={() => void cases.refetch()} className="mb-4" />
      {cases.isPending ? <Loading what="the cases" /> : null}
      {cases.data && order.length === 0 ? (
        <EmptyState
          fact={q ? 'No case fits these words.' : show ? 'No case stands here.' : 'No case is open yet.'}
          next={
            q ? 'Try a part of the number or of the lot.' : 'A case holds one question about one opening.'
          }
        >
          {mayOpen ? (
            <ButtonLink to="/cases/new" small>
              New case
            </ButtonLink>
          ) : null}
        </EmptyState>
      ) : null}
      {current ? (
        <div className="grid gap-x-8 lg:grid-cols-[minmax(0,1fr)_316px]">
          <div className="min-w-0">
            {shown.map(({ group, rows: inGroup }) => (
              <CaseLedger
                key={group}
                title={groupTitles[group]}
                rows={inGroup}
                current={current.id}
                onCurrent={setFocused}
              />
            ))}
            {cases.data ? <Pager {...cases.data} what="cases" /> : null}
          </div>
          <div className="border-l border-rule pl-8 max-lg:hidden">
            <div className="sticky top-4">
              <CaseGlance row={current} />
            </div>
          </div>
        </div>
      ) : null}
    </>
  );
}

function useMinute(): Date {
  const [now, setNow] = useState(() => new Date());
  useEffect(() => {
    const timer = setInterval(() => setNow(new Date()), 30_000);
    return () => clearInterval(timer);
  }, []);
  return now;
}
