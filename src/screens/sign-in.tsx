import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Navigate, useSearchParams } from 'react-router-dom';
import { call } from '#src/lib/call.ts';
import { sessionQuery } from '#src/lib/session.ts';
import { useTitle } from '#src/lib/title.ts';
import { Loading } from '#src/ui/loading.tsx';
import { Mark } from '#src/ui/mark.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { FirstAdministratorForm } from '#src/features/session/first-administrator-form.tsx';
import { SignInForm } from '#src/features/session/sign-in-form.tsx';
import { SignInPattern } from '#src/features/session/sign-in-pattern.tsx';
import { ThemeSwitch } from '#src/features/session/theme-switch.tsx';
import { getSignInOptions } from '#shared/contracts/session.ts';

/** Only a path of this site is followed. */
function safePath(next: string | null): string {
  return next && /^\/(?![/\\])/.test(next) ? next : '/';
}

export function Component() {
  useTitle('Sign in');
  const [search] = useSearchParams();
  const [refused, setRefused] = useState(false);
  const session = useQuery(sessionQuery);
  const options = useQuery({
    queryKey: ['sign-in-options'],
    queryFn: ({ signal }) => call(getSignInOptions, { signal }),
  });
  if (session.data?.person) return <Navigate to={safePath(search.get('next'))} replace />;
  const first = options.data?.needsFirstAdministrator;
  return (
    <div className="flex min-h-dvh">
      <div className="sticky top-0 h-dvh min-w-0 flex-1 max-md:hidden">
        <SignInPattern apart={refused} />
      </div>
      <main className="flex w-full flex-col justify-between gap-8 px-6 py-8 md:w-[420px] lg:w-[500px] lg:pr-[120px] lg:pl-6">
        <div className="flex justify-end">
          <ThemeSwitch />
        </div>
        <div>
          <p className="mb-7 flex items-center gap-3 text-[19px] leading-6 font-[760]">
            <Mark size={32} /> Fringeward
          </p>
          <h1 className="sentence mb-5">{first ? 'First administrator' : 'Sign in'}</h1>
          {options.isPending ? <Loading what="the sign-in page" /> : null}
          <ProblemNotice error={options.error} onRetry={() => void options.refetch()} />
          {first ? <FirstAdministratorForm /> : null}
          {options.data && !first ? (
            <SignInForm demoAccounts={options.data.demoAccounts} onTry={setRefused} />
          ) : null}
        </div>
        <p className="text-ink2">Forgotten password: ask your laboratory’s administrator.</p>
      </main>
    </div>
  );
}
