import { queryOptions, useQuery } from '@tanstack/react-query';
import { call } from '#src/lib/call.ts';
import { getSession, type Session } from '#shared/contracts/session.ts';
import type { Permission } from '#shared/permissions.ts';

export type SignedInPerson = NonNullable<Session['person']>;

export const sessionQuery = queryOptions({
  queryKey: ['session'],
  queryFn: ({ signal }) => call(getSession, { signal }),
  staleTime: 60_000,
});

/** The signed-in person, or null while unknown or signed out. */
export function usePerson(): SignedInPerson | null {
  return useQuery(sessionQuery).data?.person ?? null;
}

/** True when the signed-in person's roles hold the permission: for menus; the server decides. */
export function useMay(permission: Permission): boolean {
  return usePerson()?.permissions.includes(permission) ?? false;
}
