import { hash, verify } from '@node-rs/argon2';
import type { z } from 'zod';
import type { Actor } from '#server/actor.ts';
import { record } from '#server/audit/audit.ts';
import type { Database } from '#server/db/database.ts';
import type { Deps } from '#server/deps.ts';
import { presentPerson } from '#server/features/people/present.ts';
import {
  countActiveAdministrators,
  countPeople,
  endSessions,
  findPerson,
  findPersonByEmail,
  insertPerson,
  lockPeople,
  selectPeople,
  updatePerson,
  type PersonRow,
} from '#server/features/people/store.ts';
import { notFound, Refusal } from '#server/http/refusal.ts';
import type { addPersonSchema, editPersonSchema, Person } from '#shared/contracts/people.ts';

type NewPerson = Pick<PersonRow, 'name' | 'email' | 'roles' | 'passwordHash'> & { readonly id?: string };

export async function listAllPeople(deps: Deps): Promise<Person[]> {
  return (await selectPeople(deps.db)).map(presentPerson);
}

export async function createPerson(
  deps: Deps,
  actor: Actor | null,
  input: z.output<typeof addPersonSchema>,
): Promise<Person> {
  const passwordHash = await hash(input.password);
  return deps.db.transaction((tx) => addWithin(tx, deps, actor, { ...input, passwordHash }));
}

/** The first account of an installation; refused when there is any. */
export async function addFirst(
  tx: Database,
  deps: Pick<Deps, 'newId' | 'clock'>,
  input: NewPerson,
): Promise<Person> {
  await lockPeople(tx);
  if ((await countPeople(tx)) > 0)
    throw new Refusal('wrong-state', 'The first administrator exists already. Sign in instead.');
  return addWithin(tx, deps, null, input);
}

/** The same inside a transaction of the caller's, with the password hashed already. */
export async function addWithin(
  tx: Database,
  deps: Pick<Deps, 'newId' | 'clock'>,
  actor: Actor | null,
  input: NewPerson,
): Promise<Person> {
  await lockPeople(tx);
  if (await findPersonByEmail(tx, input.email))
    throw new Refusal('email-taken', 'There is an account of this e-mail address already.', [
      {
        pointer: '#/email',
        detail: 'There is an account of this e-mail address already. Change its roles instead.',
      },
    ]);
  const row: PersonRow = {
    id: input.id ?? deps.newId(),
    name: input.name,
    email: input.email,
    roles: input.roles,
    passwordHash: input.passwordHash,
    active: true,
    version: 1,
    createdAt: deps.clock(),
  };
  await insertPerson(tx, row);
  await record(
    tx,
    actor,
    row.createdAt,
    'add-person',
    { kind: 'person', id: row.id },
    { name: row.name, roles: row.roles },
  );
  return presentPerson(row);
}

export async function changePerson(
  deps: Deps,
  actor: Actor,
  id: string,
  input: z.output<typeof editPersonSchema>,
): Promise<Person> {
  return deps.db.transaction(async (tx) => {
    await lockPeople(tx);
    const row = await findPerson(tx, id);
    if (!row) throw notFound('person');
    const loses =
      row.active &&
      row.roles.includes('administrator') &&
      !(input.active && input.roles.includes('administrator'));
    if (loses && (await countActiveAdministrators(tx)) <= 1)
      throw new Refusal(
        'last-administrator',
        'This is the only active administrator. Make somebody else administrator first.',
      );
    const { version, ...change } = input;
    if (!(await updatePerson(tx, id, version, change)))
      throw new Refusal(
        'stale-edit',
        `${row.name} was changed by somebody else meanwhile. Reload, then change again.`,
      );
    if (!input.active) await endSessions(tx, id);
    await record(tx, actor, deps.clock(), 'edit-person', { kind: 'person', id }, change);
    return presentPerson({ ...row, ...change, version: version + 1 });
  });
}

/** Ends the person's other sessions: whoever changes a password may fear that somebody else knows it. */
export async function changeOwnPassword(
  deps: Deps,
  actor: Actor,
  current: string,
  next: string,
  keepSession: string,
): Promise<void> {
  if (!(await passwordIsRight(deps.db, actor.id, current)))
    throw new Refusal('wrong-password', 'The present password is not right.', [
      { pointer: '#/currentPassword', detail: 'This is not your present password.' },
    ]);
  const passwordHash = await hash(next);
  await deps.db.transaction(async (tx) => {
    const row = await findPerson(tx, actor.id);
    if (!row || !(await updatePerson(tx, actor.id, row.version, { passwordHash })))
      throw new Refusal('stale-edit', 'Your account was changed meanwhile. Try again.');
    await endSessions(tx, actor.id, keepSession);
    await record(tx, actor, deps.clock(), 'change-password', { kind: 'person', id: actor.id });
  });
}

/** The active person of this id, as of now. */
export async function findActor(db: Database, id: string): Promise<Actor | undefined> {
  const row = await findPerson(db, id);
  return row?.active ? { id: row.id, name: row.name, email: row.email, roles: row.roles } : undefined;
}

export async function hasPeople(db: Database): Promise<boolean> {
  return (await countPeople(db)) > 0;
}

export async function passwordIsRight(db: Database, id: string, password: string): Promise<boolean> {
  const row = await findPerson(db, id);
  return row !== undefined && row.active && (await verify(row.passwordHash, password));
}

let decoy: Promise<string> | undefined;

/** Takes as long for an unknown address as for a known one. */
export async function checkCredentials(
  db: Database,
  email: string,
  password: string,
): Promise<Actor | undefined> {
  decoy ??= hash('a password that nobody has');
  const row = await findPersonByEmail(db, email);
  const right = await verify(row?.passwordHash ?? (await decoy), password);
  return row && right && row.active
    ? { id: row.id, name: row.name, email: row.email, roles: row.roles }
    : undefined;
}
