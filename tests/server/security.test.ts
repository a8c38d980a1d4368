import { mkdir, mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoPassword, demoPeople } from '#server/demo/demo-people.ts';
import { listAudit } from '#shared/contracts/audit.ts';
import { listCases, openCase } from '#shared/contracts/cases.ts';
import { signIn, signOut } from '#shared/contracts/session.ts';
import { problemIn, type Caller } from '#tests/support/caller.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';

let app: TestApp;
let analyst: Caller;
let pages: string;

beforeAll(async () => {
  pages = await mkdtemp(join(tmpdir(), 'fringeward-pages-'));
  await mkdir(join(pages, 'assets'));
  await writeFile(join(pages, 'index.html'), '<!doctype html><title>Fringeward</title>');
  await writeFile(join(pages, 'assets', 'app-1a2b.js'), 'export {};');
  app = await createTestApp({ idle: true, pages, settings: { baseUrl: 'https://fringes.example.org' } });
  // Behind a proxy that ends TLS, as the address says.
  analyst = app.anonymous();
  const headers = { 'x-forwarded-proto': 'https' };
  const response = await analyst.send(signIn, {
    body: { email: demoPeople.analyst.email, password: demoPassword },
    headers,
  });
  expect(response.status).toBe(200);
  cookie = (response.headers['set-cookie'] as unknown as string[])[0].split(';')[0];
});
let cookie = '';
afterAll(async () => {
  await app.close();
  await rm(pages, { recursive: true });
});

const draft = { title: 'A', part: 'B' };

describe('headers', () => {
  it('let pages load from this server alone, without inline script, evaluation, frames or foreign forms', async () => {
    for (const path of ['/', '/api/session', '/api/nothing']) {
      const { headers } = await app.anonymous().raw.get(path);
      const policy = new Map(
        headers['content-security-policy'].split(';').map((rule: string) => {
          const [name, ...sources] = rule.trim().split(' ');
          return [name, sources.join(' ')] as const;
        }),
      );
      expect(policy.get('default-src')).toBe("'self'");
      expect(policy.get('script-src')).toBe("'self'");
      expect(policy.get('style-src')).toBe("'self'");
      expect(policy.get('img-src')).toBe("'self' blob: data:");
      expect(policy.get('object-src')).toBe("'none'");
      expect(policy.get('frame-ancestors')).toBe("'none'");
      expect(policy.get('base-uri')).toBe("'none'");
      expect(policy.get('form-action')).toBe("'self'");
      expect(headers['x-content-type-options']).toBe('nosniff');
      expect(headers['strict-transport-security']).toContain('max-age');
      expect(headers['x-powered-by']).toBeUndefined();
    }
  });

  it('keep answers of the API out of every cache', async () => {
    expect((await app.anonymous().raw.get('/api/session')).headers['cache-control']).toBe('no-store');
  });
});

describe('a changing request', () => {
  const send = (headers: Record<string, string>) =>
    app.anonymous().send(openCase, { body: draft, headers: { cookie, ...headers } });

  it.each<[string, Record<string, string>]>([
    ['a page of another site', { 'sec-fetch-site': 'cross-site' }],
    ['a page of a neighbouring host name', { 'sec-fetch-site': 'same-site' }],
    ['another origin', { origin: 'https://elsewhere.example' }],
    ['another port of the same host', { origin: 'https://fringes.example.org:8443' }],
    ['an opaque origin', { origin: 'null' }],
    ['an origin that is no address', { origin: 'nonsense' }],
  ])('from %s is refused', async (_, headers) => {
    problemIn(await send(headers), 'foreign-origin');
    expect((await app.anonymous().call(listCases, { headers: { cookie } })).total).toBe(0);
  });

  it.each<[string, Record<string, string>]>([
    [
      'a page of the published address',
      { origin: 'https://fringes.example.org', 'sec-fetch-site': 'same-origin' },
    ],
    ['a page of the address that was asked', { host: 'inner:4817', origin: 'http://inner:4817' }],
    ['a program, which names no origin', {}],
  ])('from %s is taken', async (_, headers) => {
    // Signing out without a session is refused for that reason, and only after the origin was found to be right.
    problemIn(await app.anonymous().send(signOut, { headers }), 'not-signed-in');
  });

  it('that only reads is not asked where it comes from', async () => {
    await app.anonymous().call(listCases, { headers: { cookie, 'sec-fetch-site': 'cross-site' } });
  });
});

describe('a request that cannot be read', () => {
  const post = (body: string, type = 'application/json') =>
    app.anonymous().raw.post('/api/cases').set('cookie', cookie).set('content-type', type).send(body);

  it.each(['{', '{"title": }', 'nonsense', '"text"', '{"title":"a"}}'])(
    '%s is refused as malformed',
    async (body) => {
      expect(problemIn(await post(body), 'malformed-request').detail).toContain('JSON');
    },
  );

  it('with a body above 200 kB is refused by size', async () => {
    problemIn(await post(JSON.stringify({ title: 'x'.repeat(250_000) })), 'request-too-large');
  });

  it('in an unknown encoding is refused as malformed', async () => {
    problemIn(await post('{}', 'application/json; charset=klingon'), 'malformed-request');
  });

  it.each(['[]', '{}', '{"title":null,"part":7}', '[[[[[]]]]]', '{"__proto__":{"title":"a"}}'])(
    '%s in the place of a case points at what is missing',
    async (body) => {
      const { errors } = problemIn(await post(body), 'invalid-input');
      expect(errors?.length).toBeGreaterThan(0);
      for (const e of errors!) expect(e.detail).toMatch(/^[A-Z].*[.]$/);
    },
  );

  it('of another type than JSON has no values', async () => {
    problemIn(await post('title=a&part=b', 'application/x-www-form-urlencoded'), 'invalid-input');
  });

  it.each(['\u0000', '\ud800'])(
    'with text that no database stores (%j) points at the field',
    async (character) => {
      const body = JSON.stringify({ ...draft, question: `What${character}?` });
      expect(problemIn(await post(body), 'invalid-input').errors?.[0].pointer).toBe('#/question');
      problemIn(
        await app.anonymous().send(signIn, { body: { email: `a${character}@example.org`, password: 'x' } }),
        'invalid-input',
      );
    },
  );

  it('with a search for U+0000 is refused', async () => {
    problemIn(await app.anonymous().raw.get('/api/cases?q=%00').set('cookie', cookie), 'invalid-input');
  });

  it.each(['/api/cases/%E0%A4%A', '/api/cases/%ff'])('at the address %s is refused', async (path) => {
    const response = await app.anonymous().raw.get(path).set('cookie', cookie);
    expect([400, 404]).toContain(response.status);
    expect(response.headers['content-type']).toContain('application/problem+json');
  });

  it.each([
    'page=0',
    'page=-1',
    'page=1.5',
    'page=1e99',
    'pageSize=100000',
    'page=x',
    'state=lost',
    'page=1&page=2',
  ])('with ?%s points at the wrong value', async (query) => {
    const { errors } = problemIn(
      await app.anonymous().raw.get(`/api/cases?${query}`).set('cookie', cookie),
      'invalid-input',
    );
    expect(errors?.[0].pointer).toMatch(/^#\/(page|pageSize|state)$/);
  });
});

describe('pages', () => {
  it('are one page at every address, asked for anew each time', async () => {
    for (const path of ['/', '/cases/1', '/sign-in']) {
      const response = await app.anonymous().raw.get(path);
      expect(response.text).toContain('Fringeward');
      expect(response.headers['cache-control']).toBe('no-cache');
    }
  });

  it('have built files that never change under their names', async () => {
    const { headers } = await app.anonymous().raw.get('/assets/app-1a2b.js');
    expect(headers['cache-control']).toBe('public, max-age=31536000, immutable');
  });

  it.each(['/assets/gone.js', '/assets/..%2f..%2fpackage.json', '/assets/%2e%2e/%2e%2e/package.json'])(
    'do not answer %s with a page or with a file from elsewhere',
    async (path) => {
      const response = await app.anonymous().raw.get(path);
      expect(response.status).toBeGreaterThanOrEqual(400);
      expect(response.status).toBeLessThan(500);
      expect(response.text).not.toContain('dependencies');
    },
  );

  it('leave the health check alone', async () => {
    expect((await app.anonymous().raw.get('/healthz')).body).toEqual({ status: 'ok' });
  });
});

describe('logs', () => {
  it('hold neither cookies nor passwords', async () => {
    await app.anonymous().refused(signIn, 'wrong-credentials', {
      body: { email: demoPeople.reviewer.email, password: 'mistyped secret' },
      headers: { cookie },
    });
    await app
      .anonymous()
      .refused(listAudit, 'not-permitted', { headers: { cookie, authorization: 'Bearer abc123' } });
    const text = app.logged.join('\n');
    expect(text).toContain('/api/session');
    expect(text).toContain('[hidden]');
    for (const secret of [cookie, cookie.split('=')[1], 'mistyped secret', demoPassword, 'abc123'])
      expect(text).not.toContain(secret);
  });
});
