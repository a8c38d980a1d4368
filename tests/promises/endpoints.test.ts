import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { allRoutes, createApp } from '#server/app.ts';
import { allEndpoints } from '#shared/contracts/all-endpoints.ts';
import { permits, roles, type Role } from '#shared/permissions.ts';
import { createTestApp, type TestApp, type Who } from '#tests/support/test-app.ts';
import { problemIn, type Caller } from '#tests/support/caller.ts';

const someId = '00000000-0000-4000-8000-00000000abcd';
const holders: Record<Role, Who> = {
  analyst: 'analyst',
  reviewer: 'reviewer',
  curator: 'curator',
  administrator: 'administrator',
};

let app: TestApp;
const callers = {} as Record<Role, Caller>;

beforeAll(async () => {
  app = await createTestApp({ idle: true });
  for (const role of roles) callers[role] = await app.signInAs(holders[role]);
});
afterAll(() => app.close());

const params = {
  caseId: someId,
  exposureId: someId,
  identificationId: someId,
  matchId: someId,
  benchId: someId,
  personId: someId,
};

describe('endpoints', () => {
  it('have names and addresses of their own', () => {
    const names = allEndpoints.map((e) => e.name);
    const addresses = allEndpoints.map((e) => `${e.method} ${e.path}`);
    expect(new Set(names).size).toBe(names.length);
    expect(new Set(addresses).size).toBe(addresses.length);
    for (const name of names) expect(name).toMatch(/^[a-z]+(-[a-z]+)+$/);
  });

  it('have exactly one handler each, and no handler is without an endpoint', () => {
    const bound = allRoutes(app.deps).map((route) => route.endpoint);
    expect(bound.map((e) => e.name).sort()).toEqual(allEndpoints.map((e) => e.name).sort());
  });

  it('keep the application from being made while one has no handler', () => {
    const make = (routes: ReturnType<typeof allRoutes>) =>
      createApp(app.deps, { pool: app.client.pool, sessionSecret: 'x'.repeat(40) }, () => routes).close();
    const routes = allRoutes(app.deps);
    expect(() => make(routes.slice(1))).toThrow('has 0 handlers');
    expect(() => make([...routes, routes[0]])).toThrow('has 2 handlers');
    make(routes);
  });
});

describe.each(allEndpoints.filter((e) => e.access !== 'anyone'))('$name', (endpoint) => {
  it('refuses whoever has not signed in', async () => {
    await app.anonymous().refused(endpoint, 'not-signed-in', { params });
  });

  const { access } = endpoint;
  if (access === 'signed-in' || access === 'anyone') return;
  const wrong = roles.filter((role) => !permits([role], access));
  const right = roles.filter((role) => permits([role], access));

  if (wrong.length > 0)
    it(`refuses ${wrong.join(', ')}`, async () => {
      for (const role of wrong) await callers[role].refused(endpoint, 'not-permitted', { params });
    });

  it(`lets ${right.join(', ')} past the permission check`, async () => {
    for (const role of right) {
      const response = await callers[role].send(endpoint, { params });
      expect([401, 403, 500], `${role}: ${response.text}`).not.toContain(response.status);
    }
  });
});

describe('what does not exist', () => {
  const named = allEndpoints.filter((e) => e.path.includes('/:') && e.bodyKind === 'none');

  it.each(named)(
    '$name answers the same for a missing record and for an id that cannot be one',
    async (endpoint) => {
      const caller = callers.analyst;
      const missing = problemIn(await caller.send(endpoint, { params }), 'not-found-or-not-yours');
      const absurd = problemIn(
        await caller.send(endpoint, {
          params: Object.fromEntries(Object.keys(params).map((k) => [k, "1'--"])),
        }),
        'not-found-or-not-yours',
      );
      expect(missing.title).toBe(absurd.title);
      expect(missing.errors).toBeUndefined();
    },
  );

  it('is refused as an address of the API, signed in or not', async () => {
    problemIn(await callers.analyst.raw.get('/api/no-such-thing'), 'not-found-or-not-yours');
    problemIn(await app.anonymous().raw.get('/api/no-such-thing'), 'not-found-or-not-yours');
    problemIn(await app.anonymous().raw.get('/api'), 'not-found-or-not-yours');
  });
});
