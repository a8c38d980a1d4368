import { useMutation } from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import { Link, useLocation } from 'react-router-dom';
import { call } from '#src/lib/call.ts';
import type { SignedInPerson } from '#src/lib/session.ts';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { ThemeSwitch } from '#src/features/session/theme-switch.tsx';
import { signOut } from '#shared/contracts/session.ts';

/** The person's name; underneath their roles, password and sign-out. */
export function PersonMenu({ person }: { person: SignedInPerson }) {
  const ref = useRef<HTMLDetailsElement>(null);
  const { pathname } = useLocation();
  // A fresh page, so that nothing of this person stays in memory.
  const leave = useMutation({
    mutationFn: () => call(signOut),
    onSuccess: () => location.assign('/sign-in'),
  });
  useEffect(() => {
    if (ref.current) ref.current.open = false;
  }, [pathname]);
  return (
    <details
      ref={ref}
      className="relative"
      onBlur={(event) => {
        if (!event.currentTarget.contains(event.relatedTarget)) event.currentTarget.open = false;
      }}
      onKeyDown={(event) => {
        if (event.key !== 'Escape') return;
        event.currentTarget.open = false;
        event.currentTarget.querySelector('summary')?.focus();
      }}
    >
      <summary className="flex min-h-8 list-none items-center gap-2 font-[620] [&::-webkit-details-marker]:hidden">
        {person.name}
        <svg
          viewBox="0 0 16 16"
          width="10"
          height="10"
          aria-hidden="true"
          fill="none"
          stroke="currentColor"
          strokeWidth="1.8"
        >
          <path d="m3 5.5 5 5 5-5" />
        </svg>
      </summary>
      <div className="absolute right-0 z-20 mt-2 w-64 border border-ink bg-raised p-4">
        <p className="label text-ink3">{person.email}</p>
        <p className="label mb-3 text-ink3">{person.roles.join(', ')}</p>
        <div className="mb-3 lg:hidden">
          <ThemeSwitch />
        </div>
        <ul className="space-y-1">
          <li>
            <Link to="/password" className="pressable-link inline-flex min-h-6 items-center">
              Change password
            </Link>
          </li>
          <li>
            <button type="button" className="pressable-link min-h-6" onClick={() => leave.mutate()}>
              {leave.isPending ? 'Signing out' : 'Sign out'}
            </button>
          </li>
        </ul>
        <ProblemNotice error={leave.error} />
      </div>
    </details>
  );
}
