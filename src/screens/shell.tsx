import { useQuery } from '@tanstack/react-query';
import { useEffect, useRef, useState } from 'react';
import { Navigate, Outlet, ScrollRestoration, useLocation } from 'react-router-dom';
import { call } from '#src/lib/call.ts';
import { sessionQuery, type SignedInPerson } from '#src/lib/session.ts';
import { KeyLine } from '#src/ui/key-line.tsx';
import { Loading } from '#src/ui/loading.tsx';
import { Notice } from '#src/ui/notice.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { groupOf } from '#src/features/cases/case-groups.ts';
import { casesQuery } from '#src/features/cases/queries.ts';
import { TopLine } from '#src/features/session/top-line.tsx';
import { listMatches } from '#shared/contracts/matches.ts';

/** What stands around every screen of a signed-in person. A session that ends leaves the screen and what was typed. */
export function Shell() {
  const session = useQuery(sessionQuery);
  const { pathname, search } = useLocation();
  const person = session.data?.person ?? null;
  const [last, setLast] = useState<SignedInPerson | null>(person);
  if (person && person !== last) setLast(person);
  const shown = person ?? last;
  if (!shown) {
    if (session.data)
      return <Navigate to={`/sign-in?next=${encodeURIComponent(pathname + search)}`} replace />;
    return (
      <main className="page-margin pt-6">
        {session.error ? (
          <ProblemNotice error={session.error} onRetry={() => void session.refetch()} />
        ) : (
          <Loading what="your session" />
        )}
      </main>
    );
  }
  return <Frame person={shown} ended={!person} onSignedIn={() => void session.refetch()} />;
}

interface FrameProps {
  person: SignedInPerson;
  ended: boolean;
  onSignedIn: () => void;
}

function Frame({ person, ended, onSignedIn }: FrameProps) {
  const main = useRef<HTMLElement>(null);
  const { pathname } = useLocation();
  const arrived = useRef(pathname);
  const counts = useCounts(person, ended);
  useEffect(() => {
    if (arrived.current === pathname) return;
    arrived.current = pathname;
    main.current?.focus({ preventScroll: true });
  }, [pathname]);
  return (
    <div className="flex min-h-dvh flex-col">
      <a
        href="#content"
        className="sr-only focus:not-sr-only focus:absolute focus:top-2 focus:left-2 focus:z-30 focus:bg-ink focus:px-4 focus:py-2 focus:text-ground"
        onClick={(event) => {
          event.preventDefault();
          main.current?.focus();
        }}
      >
        Skip to the content
      </a>
      <TopLine person={person} counts={counts} />
      <main ref={main} id="content" tabIndex={-1} className="page-margin flex-1 pb-8">
        {ended ? (
          <Notice tone="warn" lead="Your session has ended." role="alert" className="mt-4">
            What you typed is kept here.{' '}
            <a href="/sign-in" target="_blank" rel="noreferrer" className="pressable-link">
              Sign in in a new window
            </a>
            , then come back and{' '}
            <button type="button" className="pressable-link min-h-6" onClick={onSignedIn}>
              go on
            </button>
            .
          </Notice>
        ) : null}
        <Outlet />
      </main>
      <KeyLine />
      <ScrollRestoration />
    </div>
  );
}

function useCounts(person: SignedInPerson, ended: boolean): Record<string, number> {
  const cases = useQuery({ ...casesQuery({ page: 1, q: '' }), enabled: !ended });
  const toDecide = useQuery({
    queryKey: ['matches', 'count-to-decide'],
    queryFn: ({ signal }) => call(listMatches, { query: { mine: 'decide', pageSize: 1 }, signal }),
    enabled: !ended && person.permissions.includes('decide-matches'),
    refetchInterval: 30_000,
  });
  return {
    '/': cases.data?.rows.filter((row) => groupOf(row) === 'wait').length ?? 0,
    '/reviews': toDecide.data?.total ?? 0,
  };
}
