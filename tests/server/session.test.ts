import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { demoPassword, demoPeople } from '#server/demo/demo-people.ts';
import { findLaboratory } from '#server/db/laboratory-store.ts';
import { FirstAdministratorCode } from '#server/features/session/first-administrator.ts';
import { listCases } from '#shared/contracts/cases.ts';
import { addPerson, editPerson, listPeople } from '#shared/contracts/people.ts';
import {
  changePassword,
  createFirstAdministrator,
  getSession,
  getSignInOptions,
  signIn,
  signOut,
} from '#shared/contracts/session.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';

const { analyst } = demoPeople;
const right = { email: analyst.email, password: demoPassword };
const newPassword = 'kettle orbit plum seven';

const cookieOf = (headers: Record<string, unknown>) =>
  (headers['set-cookie'] as string[] | undefined)?.[0] ?? '';

describe('with the people of a laboratory', () => {
  let app: TestApp;
  beforeAll(async () => {
    app = await createTestApp({ idle: true });
  });
  afterAll(() => app.close());

  it('says to whoever is not signed in that nobody is', async () => {
    expect(await app.anonymous().call(getSession)).toEqual({ person: null, laboratory: 'Test laboratory' });
  });

  it('signs in by e-mail (in any case, with spaces about it) and password, and says what the person may do', async () => {
    const caller = app.anonymous();
    const body = { email: ` ${analyst.email.toUpperCase()} `, password: demoPassword };
    const { person } = await caller.call(signIn, { body });
    expect(person).toMatchObject({ id: analyst.id, name: analyst.name, roles: ['analyst'] });
    expect(person?.permissions).toContain('upload-exposures');
    expect(person?.permissions).not.toContain('decide-matches');
    expect((await caller.call(getSession)).person).toEqual(person);
  });

  it('gives a cookie that scripts and other sites cannot use and that ends after twelve idle hours', async () => {
    const cookie = cookieOf((await app.anonymous().send(signIn, { body: right })).headers);
    expect(cookie).toMatch(/^fringeward=/);
    expect(cookie).toContain('HttpOnly');
    expect(cookie).toContain('SameSite=Lax');
    expect(cookie).not.toContain('Secure');
    const hours = (Date.parse(/Expires=([^;]+)/.exec(cookie)?.[1] ?? '') - Date.now()) / 3600_000;
    expect(hours).toBeGreaterThan(11.9);
    expect(hours).toBeLessThanOrEqual(12.01);
  });

  it('makes the cookie secure where the address is https', async () => {
    const secure = await createTestApp({ idle: true, settings: { baseUrl: 'https://fringes.example.org' } });
    const headers = { 'x-forwarded-proto': 'https' };
    const response = await secure.anonymous().send(signIn, { body: right, headers });
    expect(cookieOf(response.headers)).toContain('Secure');
    expect(response.headers['strict-transport-security']).toBeTruthy();
    await secure.close();
  });

  it('begins a new session at every sign-in and ends the one before', async () => {
    const caller = app.anonymous();
    const first = cookieOf((await caller.send(signIn, { body: right })).headers).split(';')[0];
    const second = cookieOf((await caller.send(signIn, { body: right })).headers).split(';')[0];
    expect(second).not.toBe(first);
    await app.anonymous().refused(listCases, 'not-signed-in', { headers: { cookie: first } });
    await app.anonymous().call(listCases, { headers: { cookie: second } });
  });

  it('takes no session that it has not signed itself', async () => {
    const { rows } = await app.client.pool.query<{ sid: string }>('select sid from sessions limit 1');
    const forged = `fringeward=${encodeURIComponent(`s:${rows[0].sid}.c2lnbmF0dXJl`)}`;
    await app.anonymous().refused(listCases, 'not-signed-in', { headers: { cookie: forged } });
  });

  it('answers the same to a wrong password, an unknown address and an account that is closed', async () => {
    const administrator = await app.signInAs('administrator');
    const { people } = await administrator.call(listPeople);
    const { id, name, roles, version } = people.find((p) => p.id === demoPeople.curator.id)!;
    await administrator.call(editPerson, {
      params: { personId: id },
      body: { name, roles, version, active: false },
    });
    const answers = [];
    for (const body of [
      { ...right, password: 'wrong' },
      { ...right, email: 'nobody@example.org' },
      { ...right, email: demoPeople.curator.email },
    ]) {
      const problem = await app.anonymous().refused(signIn, 'wrong-credentials', { body });
      answers.push({ ...problem, requestId: undefined });
    }
    expect(answers[1]).toEqual(answers[0]);
    expect(answers[2]).toEqual(answers[0]);
  });

  it('points at each field that is missing or of another type', async () => {
    const { errors } = await app.anonymous().refused(signIn, 'invalid-input', { body: { email: 7 } });
    expect(errors?.map((e) => e.pointer).sort()).toEqual(['#/email', '#/password']);
    const empty = await app
      .anonymous()
      .refused(signIn, 'invalid-input', { body: { email: ' ', password: '' } });
    expect(empty.errors?.map((e) => e.detail)).toEqual([
      'Enter your e-mail address.',
      'Enter your password.',
    ]);
  });

  it('ends a session at sign-out, in the database too', async () => {
    const caller = app.anonymous();
    const cookie = cookieOf((await caller.send(signIn, { body: right })).headers).split(';')[0];
    const count = async () =>
      (
        await app.client.pool.query("select 1 from sessions where sess->'passport'->>'user' = $1", [
          analyst.id,
        ])
      ).rowCount;
    const before = await count();
    await caller.call(signOut);
    expect(await count()).toBe(before! - 1);
    await app.anonymous().refused(listCases, 'not-signed-in', { headers: { cookie } });
  });

  it('forgets a session that was idle for too long', async () => {
    const caller = await app.signInAs('secondAnalyst');
    await caller.call(listCases);
    await app.client.pool.query("update sessions set expire = now() - interval '1 second'");
    await caller.refused(listCases, 'not-signed-in');
  });

  it('reads roles anew at every request, and closes the sessions of a closed account at once', async () => {
    const administrator = await app.signInAs('administrator');
    const caller = await app.signInAs('reviewer');
    const { people } = await administrator.call(listPeople);
    const { id, name, version } = people.find((p) => p.id === demoPeople.reviewer.id)!;
    const change = (body: object) => administrator.call(editPerson, { params: { personId: id }, body });
    await caller.refused(listPeople, 'not-permitted');
    await change({ name, version, active: true, roles: ['reviewer', 'administrator'] });
    await caller.call(listPeople);
    await change({ name, version: version + 1, active: false, roles: ['reviewer'] });
    await caller.refused(listCases, 'not-signed-in');
    await change({ name, version: version + 2, active: true, roles: ['reviewer'] });
    await caller.refused(listCases, 'not-signed-in');
  });

  it('offers no accounts outside the demo laboratory', async () => {
    expect(await app.anonymous().call(getSignInOptions)).toEqual({
      demoAccounts: [],
      needsFirstAdministrator: false,
    });
  });

  describe('a change of password', () => {
    it('asks for the present one and for a new one of twelve characters', async () => {
      const caller = await app.signInAs('secondAnalyst');
      const wrong = await caller.refused(changePassword, 'wrong-password', {
        body: { currentPassword: 'not it', newPassword },
      });
      expect(wrong.errors?.[0].pointer).toBe('#/currentPassword');
      const short = await caller.refused(changePassword, 'invalid-input', {
        body: { currentPassword: demoPassword, newPassword: 'short' },
      });
      expect(short.errors?.[0].pointer).toBe('#/newPassword');
    });

    it('ends the other sessions of the person, keeps this one, and retires the old password', async () => {
      const administrator = await app.signInAs('administrator');
      const body = {
        name: 'Wren Aldous',
        email: 'wren@example.org',
        roles: ['analyst'],
        password: 'first password of all',
      };
      await administrator.call(addPerson, { body });
      const here = app.anonymous();
      const elsewhere = app.anonymous();
      for (const caller of [here, elsewhere]) await caller.call(signIn, { body });
      await here.call(changePassword, { body: { currentPassword: body.password, newPassword } });
      await here.call(listCases);
      await elsewhere.refused(listCases, 'not-signed-in');
      await elsewhere.refused(signIn, 'wrong-credentials', { body });
      await elsewhere.call(signIn, { body: { ...body, password: newPassword } });
      await administrator.call(listCases);
    });
  });
});

describe('guessing', () => {
  let app: TestApp;
  afterEach(() => app.close());

  it('is stopped after ten wrong passwords for one account, even with the right one, and for no other account', async () => {
    app = await createTestApp({ idle: true });
    const caller = app.anonymous();
    for (let i = 0; i < 5; i++)
      await caller.refused(signIn, 'invalid-input', { body: { email: right.email } });
    for (let i = 0; i < 10; i++)
      await caller.refused(signIn, 'wrong-credentials', { body: { ...right, password: `guess ${i}` } });
    const { detail } = await caller.refused(signIn, 'too-many-attempts', { body: right });
    expect(detail).toContain('quarter of an hour');
    await app.signInAs('reviewer');
  });

  it('is stopped after a hundred wrong passwords from one address, whatever the accounts', async () => {
    app = await createTestApp({ idle: true });
    const caller = app.anonymous();
    for (let i = 0; i < 100; i++)
      await caller.refused(signIn, 'wrong-credentials', {
        body: { email: `nobody${i}@example.org`, password: 'guess' },
      });
    await caller.refused(signIn, 'too-many-attempts', { body: right });
  });

  it('does not count sign-ins that succeed', async () => {
    app = await createTestApp({ idle: true });
    for (let i = 0; i < 15; i++) await app.signInAs('analyst');
  });
});

describe('the first administrator', () => {
  let app: TestApp;
  afterEach(() => app.close());
  const person = { name: 'Ada Quill', email: 'ada@example.org', password: newPassword };

  it('is created with the code from the console, once, and is then signed in', async () => {
    const firstCode = new FirstAdministratorCode();
    app = await createTestApp({ idle: true, people: false, firstCode });
    const caller = app.anonymous();
    expect(await caller.call(getSignInOptions)).toEqual({ demoAccounts: [], needsFirstAdministrator: true });
    const wrong = await caller.refused(createFirstAdministrator, 'wrong-code', {
      body: { ...person, code: 'AAAA-BBBB-CCCC' },
    });
    expect(wrong.errors?.[0].pointer).toBe('#/code');
    const session = await caller.call(createFirstAdministrator, {
      body: { ...person, code: ` ${firstCode.code.toLowerCase()} ` },
    });
    expect(session.person?.roles).toContain('administrator');
    await caller.call(listPeople);
    expect((await findLaboratory(app.deps.db))?.kind).toBe('own');
    expect((await caller.call(getSignInOptions)).needsFirstAdministrator).toBe(false);
    await app.anonymous().refused(createFirstAdministrator, 'wrong-state', {
      body: { ...person, email: 'second@example.org', code: firstCode.code },
    });
  });

  it('is one of two who try with the right code at the same moment', async () => {
    const firstCode = new FirstAdministratorCode();
    app = await createTestApp({ idle: true, people: false, firstCode });
    const answers = await Promise.all(
      ['a', 'b'].map((n) =>
        app.anonymous().send(createFirstAdministrator, {
          body: { ...person, email: `${n}@example.org`, code: firstCode.code },
        }),
      ),
    );
    expect(answers.map((a) => a.status).sort()).toEqual([201, 409]);
  });

  it('is not created without a code, and its code is not guessed', async () => {
    app = await createTestApp({ idle: true, people: false, firstCode: new FirstAdministratorCode() });
    const caller = app.anonymous();
    const body = { ...person, code: 'AAAA-BBBB-CCCC' };
    for (let i = 0; i < 10; i++) await caller.refused(createFirstAdministrator, 'wrong-code', { body });
    await caller.refused(createFirstAdministrator, 'too-many-attempts', { body });
    const { errors } = await caller.refused(createFirstAdministrator, 'too-many-attempts', { body: {} });
    expect(errors).toBeUndefined();
  });
});

it('the one-time code has twelve clear characters and differs from start to start', () => {
  const codes = Array.from({ length: 50 }, () => new FirstAdministratorCode());
  expect(new Set(codes.map((c) => c.code)).size).toBe(50);
  for (const c of codes) {
    expect(c.code).toMatch(/^[A-HJ-NP-Z2-9]{4}(-[A-HJ-NP-Z2-9]{4}){2}$/);
    expect(c.isRight(c.code)).toBe(true);
    expect(c.isRight(codes[0] === c ? codes[1].code : codes[0].code)).toBe(false);
    expect(c.isRight('')).toBe(false);
    expect(c.isRight(`${c.code}x`)).toBe(false);
  }
});

describe('the demo laboratory', () => {
  it('offers its accounts, and each of them signs in', async () => {
    const app = await createTestApp({ idle: true, settings: { demo: true } });
    const { demoAccounts } = await app.anonymous().call(getSignInOptions);
    expect(demoAccounts.map((a) => a.roles).flat()).toEqual(
      expect.arrayContaining(['analyst', 'reviewer', 'curator', 'administrator']),
    );
    for (const { email, password, roles } of demoAccounts) {
      const { person } = await app.anonymous().call(signIn, { body: { email, password } });
      expect(person?.roles).toEqual(roles);
    }
    await app.close();
  });
});
