import type { Request } from 'express';
import type { Deps } from '#server/deps.ts';
import { demoAccounts } from '#server/demo/demo-people.ts';
import { changeOwnPassword, hasPeople } from '#server/features/people/service.ts';
import type { FirstAdministratorCode } from '#server/features/session/first-administrator.ts';
import { makeFirstAdministrator, presentSession } from '#server/features/session/service.ts';
import { Refusal } from '#server/http/refusal.ts';
import { route, type Route } from '#server/http/route.ts';
import { attemptLimit } from '#server/http/security.ts';
import { beginSession, endSession } from '#server/http/session.ts';
import {
  changePassword,
  createFirstAdministrator,
  getSession,
  getSignInOptions,
  signIn,
  signOut,
} from '#shared/contracts/session.ts';

function accountOf(req: Request): string {
  const email = (req.body as { email?: unknown } | undefined)?.email;
  return typeof email === 'string' ? email.trim().toLowerCase() : '';
}

export function sessionRoutes(deps: Deps, firstCode: FirstAdministratorCode | undefined): Route[] {
  return [
    route(getSession, async ({ maybeActor }) => presentSession(deps, maybeActor)),
    route(
      signIn,
      async ({ req }) => {
        const actor = await req.checkCredentials();
        if (!actor)
          throw new Refusal(
            'wrong-credentials',
            'No active account has this e-mail address and password. Check both and try again.',
          );
        await beginSession(req, actor);
        return presentSession(deps, actor);
      },
      // Ten for one account, and a hundred for one address whatever the accounts.
      [attemptLimit(100, () => ''), attemptLimit(10, accountOf)],
    ),
    route(signOut, async ({ req }) => endSession(req)),
    route(getSignInOptions, async () => ({
      demoAccounts: deps.settings.demo ? demoAccounts() : [],
      needsFirstAdministrator: firstCode !== undefined && !(await hasPeople(deps.db)),
    })),
    route(
      createFirstAdministrator,
      async ({ req, body }) => {
        const actor = await makeFirstAdministrator(deps, firstCode, body);
        await beginSession(req, actor);
        return presentSession(deps, actor);
      },
      [attemptLimit(10, () => '')],
    ),
    route(
      changePassword,
      ({ actor, body, req }) =>
        changeOwnPassword(deps, actor, body.currentPassword, body.newPassword, req.sessionID),
      [attemptLimit(10, (req) => req.user?.id ?? '')],
    ),
  ];
}
