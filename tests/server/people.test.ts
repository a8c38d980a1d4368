import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoPeople } from '#server/demo/demo-people.ts';
import { listAudit } from '#shared/contracts/audit.ts';
import { addPerson, editPerson, listPeople, type Person } from '#shared/contracts/people.ts';
import { signIn } from '#shared/contracts/session.ts';
import type { Caller } from '#tests/support/caller.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';

let app: TestApp;
let administrator: Caller;
beforeAll(async () => {
  app = await createTestApp({ idle: true });
  administrator = await app.signInAs('administrator');
});
afterAll(() => app.close());

const draft = {
  name: 'Wren Aldous',
  email: 'Wren@Example.org',
  roles: ['analyst'],
  password: 'kettle orbit plum',
};

async function person(id: string): Promise<Person> {
  return (await administrator.call(listPeople)).people.find((p) => p.id === id)!;
}

function change(before: Person, body: object) {
  const { name, roles, active, version } = before;
  return { params: { personId: before.id }, body: { name, roles, active, version, ...body } };
}

describe('a new person', () => {
  it('can sign in, stands in the list without any word of the password, and in the audit trail', async () => {
    const added = await administrator.call(addPerson, { body: draft });
    expect(added).toMatchObject({ email: 'wren@example.org', active: true, version: 1 });
    await app.anonymous().call(signIn, { body: { email: draft.email, password: draft.password } });
    const list = await administrator.send(listPeople);
    expect(list.text).not.toContain('argon2');
    expect(list.text).not.toContain('password');
    const { rows } = await administrator.call(listAudit, { query: { q: 'add-person' } });
    expect(rows[0]).toMatchObject({ subjectId: added.id, by: { name: demoPeople.administrator.name } });
    expect(JSON.stringify(rows[0])).not.toContain(draft.password);
  });

  it('needs an address that nobody has, in any case of letters', async () => {
    const email = demoPeople.analyst.email.toUpperCase();
    const { errors } = await administrator.refused(addPerson, 'email-taken', { body: { ...draft, email } });
    expect(errors?.[0].pointer).toBe('#/email');
  });

  it('is one of two who are added with the same address at the same moment', async () => {
    const body = { ...draft, email: 'twice@example.org' };
    const answers = await Promise.all([1, 2].map(() => administrator.send(addPerson, { body })));
    expect(answers.map((a) => a.status).sort()).toEqual([201, 409]);
  });

  it.each([
    ['name', '', '#/name'],
    ['name', 'Two\nlines', '#/name'],
    ['email', 'no address', '#/email'],
    ['roles', [], '#/roles'],
    ['roles', ['king'], '#/roles/0'],
    ['password', 'too short', '#/password'],
    ['password', 'x'.repeat(201), '#/password'],
  ])('is refused with a wrong %s (%j) at that field', async (key, value, pointer) => {
    const { errors } = await administrator.refused(addPerson, 'invalid-input', {
      body: { ...draft, email: 'other@example.org', [key]: value },
    });
    expect(errors?.map((e) => e.pointer)).toEqual([pointer]);
  });
});

describe('a change of a person', () => {
  it('is refused to whoever saw an older version, and leaves the newer one as it is', async () => {
    const before = await person(demoPeople.secondAnalyst.id);
    const after = await administrator.call(editPerson, change(before, { name: 'First change' }));
    expect(after.version).toBe(before.version + 1);
    await administrator.refused(editPerson, 'stale-edit', change(before, { name: 'Second change' }));
    expect((await person(before.id)).name).toBe('First change');
  });

  it.each([0, -1, 1.5, 1e15, '1', null])('with the absurd version %j points at it', async (version) => {
    const before = await person(demoPeople.secondAnalyst.id);
    const { errors } = await administrator.refused(editPerson, 'invalid-input', change(before, { version }));
    expect(errors?.[0].pointer).toBe('#/version');
  });

  it('never takes away the last active administrator', async () => {
    const only = await person(demoPeople.administrator.id);
    await administrator.refused(editPerson, 'last-administrator', change(only, { active: false }));
    await administrator.refused(editPerson, 'last-administrator', change(only, { roles: ['analyst'] }));
    expect(await person(only.id)).toEqual(only);
  });

  it('takes away one of two administrators, and of two such changes at the same moment only one', async () => {
    const second = await administrator.call(addPerson, {
      body: { ...draft, email: 'second@example.org', roles: ['administrator'] },
    });
    const first = await person(demoPeople.administrator.id);
    const other = app.anonymous();
    await other.call(signIn, { body: { email: second.email, password: draft.password } });
    const answers = await Promise.all([
      administrator.send(editPerson, change(second, { roles: ['analyst'] })),
      other.send(editPerson, change(first, { roles: ['analyst'] })),
    ]);
    const { rows } = await app.client.pool.query(
      "select 1 from people where active and 'administrator' = any(roles)",
    );
    expect(rows).toHaveLength(1);
    expect(answers.filter((a) => a.status === 200)).toHaveLength(1);
  });
});
