import type { z } from 'zod';
import { hash } from '@node-rs/argon2';
import type { Actor } from '#server/actor.ts';
import { insertLaboratory } from '#server/db/laboratory-store.ts';
import type { Deps } from '#server/deps.ts';
import type { FirstAdministratorCode } from '#server/features/session/first-administrator.ts';
import { addFirst, hasPeople } from '#server/features/people/service.ts';
import { Refusal } from '#server/http/refusal.ts';
import type { firstAdministratorSchema, Session } from '#shared/contracts/session.ts';
import { permissions, permits, type Permission } from '#shared/permissions.ts';

export function presentSession(deps: Deps, actor: Actor | undefined): Session {
  const all = Object.keys(permissions) as Permission[];
  return {
    laboratory: deps.settings.laboratory,
    person: actor
      ? {
          id: actor.id,
          name: actor.name,
          email: actor.email,
          roles: [...actor.roles],
          permissions: all.filter((p) => permits(actor.roles, p)),
        }
      : null,
  };
}

/** Creates the first account; only while there is none, and only with the code from the console. */
export async function makeFirstAdministrator(
  deps: Deps,
  code: FirstAdministratorCode | undefined,
  input: z.output<typeof firstAdministratorSchema>,
): Promise<Actor> {
  if (!code || (await hasPeople(deps.db)))
    throw new Refusal('wrong-state', 'The first administrator exists already. Sign in instead.');
  if (!code.isRight(input.code))
    throw new Refusal('wrong-code', 'The code does not agree with the one on the console of the server.', [
      { pointer: '#/code', detail: 'This is not the code that the server printed at its last start.' },
    ]);
  const passwordHash = await hash(input.password);
  const person = await deps.db.transaction(async (tx) => {
    const { name, email } = input;
    const first = await addFirst(tx, deps, {
      name,
      email,
      passwordHash,
      roles: ['administrator', 'analyst'],
    });
    await insertLaboratory(tx, 'own', deps.settings.laboratory, deps.clock());
    return first;
  });
  return { id: person.id, name: person.name, email: person.email, roles: person.roles };
}
