import { resolve } from 'node:path';
import { describe, expect, it } from 'vitest';
import { readSettings, type Settings } from '#server/env.ts';

const settings = (environment: Record<string, string>) => readSettings(environment) as Settings;

describe('settings', () => {
  it('have defaults that work without a network', () => {
    expect(settings({})).toEqual({
      port: 4817,
      host: '127.0.0.1',
      dataDir: resolve('data'),
      databaseUrl: undefined,
      baseUrl: 'http://127.0.0.1:4817',
      sessionSecret: undefined,
      demo: true,
      laboratory: 'Demo laboratory',
      mailServer: undefined,
      mailFrom: 'fringeward@localhost',
      logLevel: 'warn',
    });
  });

  it('come from the environment; an empty one counts as left out', () => {
    const given = settings({
      PORT: '8080',
      HOST: '::1',
      DATA_DIR: '/srv/fringes',
      DATABASE_URL: '',
      DEMO: 'off',
      LABORATORY: 'Works 4',
      MAIL_SERVER: 'smtp://mail.example.org:25',
      MAIL_FROM: 'Fringeward <fringes@example.org>',
    });
    expect(given).toMatchObject({
      port: 8080,
      baseUrl: 'http://[::1]:8080',
      dataDir: '/srv/fringes',
      databaseUrl: undefined,
      demo: false,
      laboratory: 'Works 4',
    });
    expect(settings({ BASE_URL: 'https://fringes.example.org/' }).baseUrl).toBe(
      'https://fringes.example.org',
    );
  });

  it.each([
    ['PORT', 'abc'],
    ['PORT', '0'],
    ['PORT', '65536'],
    ['PORT', '-1'],
    ['PORT', '80.5'],
    ['HOST', 'not a host'],
    ['DATABASE_URL', 'mysql://localhost/x'],
    ['BASE_URL', 'fringes.example.org'],
    ['BASE_URL', 'ftp://fringes.example.org'],
    ['SESSION_SECRET', 'short'],
    ['DEMO', 'yes'],
    ['LABORATORY', 'x'.repeat(201)],
    ['MAIL_SERVER', 'mail.example.org'],
    ['MAIL_FROM', 'nobody'],
    ['LOG_LEVEL', 'loud'],
  ])('%s=%s is refused with one sentence that names it and says what it should be', (name, value) => {
    const refused = readSettings({ [name]: value });
    expect(refused).toHaveLength(1);
    const [sentence] = refused as string[];
    expect(sentence).toMatch(new RegExp(`^${name} .*[.]$`));
  });

  it('that are wrong are all named at once', () => {
    expect(readSettings({ PORT: 'x', DEMO: 'maybe', MAIL_SERVER: 'x' })).toHaveLength(3);
  });

  it.each(['0.0.0.0', '::', '192.168.1.20', 'laboratory.example.org'])(
    'do not let the demo laboratory listen on %s, and let a laboratory of its own',
    (HOST) => {
      const refused = readSettings({ HOST }) as string[];
      expect(refused[0]).toContain('loopback');
      expect(settings({ HOST, DEMO: 'off' }).host).toBe(HOST);
    },
  );

  it.each(['127.0.0.1', '127.0.0.5', '::1', 'localhost'])('let the demo laboratory listen on %s', (HOST) => {
    expect(settings({ HOST }).host).toBe(HOST);
  });

  it.each(['127.example.org', '127.0.0.1.example.org'])('do not take the name %s for loopback', (HOST) => {
    expect((readSettings({ HOST }) as string[])[0]).toContain('loopback');
  });
});
