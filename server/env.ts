import { isIP } from 'node:net';
import { resolve } from 'node:path';
import { z } from 'zod';

function isLoopback(host: string): boolean {
  return host === 'localhost' || host === '::1' || (isIP(host) === 4 && host.startsWith('127.'));
}

const text = (fallback: string) => z.string().trim().min(1).max(200).default(fallback);

const schema = z.object({
  PORT: z
    .string()
    .regex(/^\d{1,5}$/)
    .transform(Number)
    .refine((n) => n >= 1 && n <= 65535)
    .default(4817),
  HOST: z
    .string()
    .trim()
    .refine((h) => isIP(h) !== 0 || /^[a-z0-9.-]+$/i.test(h))
    .default('127.0.0.1'),
  DATA_DIR: text('data').transform((folder) => resolve(folder)),
  DATABASE_URL: z
    .string()
    .regex(/^postgres(ql)?:\/\//)
    .optional(),
  BASE_URL: z.url({ protocol: /^https?$/ }).optional(),
  SESSION_SECRET: z.string().min(32).optional(),
  DEMO: z.enum(['on', 'off']).default('on'),
  LABORATORY: z.string().trim().min(1).max(200).optional(),
  MAIL_SERVER: z
    .string()
    .regex(/^smtps?:\/\//)
    .optional(),
  MAIL_FROM: text('fringeward@localhost').refine((from) =>
    /^[^\s@]+@[^\s@]+$|^[^<>]*<[^\s@<>]+@[^\s@<>]+>$/.test(from),
  ),
  LOG_LEVEL: z.enum(['silent', 'fatal', 'error', 'warn', 'info', 'debug', 'trace']).default('warn'),
});

const mends: Record<string, string> = {
  PORT: 'PORT must be a whole number from 1 to 65535, such as 4817.',
  HOST: 'HOST must be an address or a host name, such as 127.0.0.1.',
  DATA_DIR: 'DATA_DIR must name a folder, such as ./data.',
  DATABASE_URL:
    'DATABASE_URL must start with postgres:// or postgresql://; leave it out to use the embedded database.',
  BASE_URL: 'BASE_URL must be a whole address such as https://fringes.example.org.',
  SESSION_SECRET: 'SESSION_SECRET must have at least 32 characters; leave it out to have one made and kept.',
  DEMO: 'DEMO must be "on" or "off".',
  LABORATORY: 'LABORATORY must be a name of at most 200 characters.',
  MAIL_SERVER:
    'MAIL_SERVER must be an address such as smtp://mail.example.org:25; leave it out to keep mail in the outbox.',
  MAIL_FROM: 'MAIL_FROM must be a mail address such as fringes@example.org.',
  LOG_LEVEL: 'LOG_LEVEL must be one of silent, fatal, error, warn, info, debug, trace.',
};

export interface Settings {
  readonly port: number;
  readonly host: string;
  readonly dataDir: string;
  readonly databaseUrl: string | undefined;
  readonly baseUrl: string;
  readonly sessionSecret: string | undefined;
  readonly demo: boolean;
  readonly laboratory: string;
  readonly mailServer: string | undefined;
  readonly mailFrom: string;
  readonly logLevel: string;
}

/** Reads the settings once. Answers either them or one sentence per wrong setting. */
export function readSettings(environment: Record<string, string | undefined>): Settings | readonly string[] {
  const given = Object.fromEntries(
    Object.entries(environment).filter(([, value]) => value !== undefined && value !== ''),
  );
  const parsed = schema.safeParse(given);
  if (!parsed.success) {
    const names = new Set(parsed.error.issues.map((issue) => String(issue.path[0])));
    return [...names].map((name) => mends[name] ?? `${name} is not right.`);
  }
  const e = parsed.data;
  if (e.DEMO === 'on' && !isLoopback(e.HOST))
    return [
      `HOST is ${e.HOST}, but the demo laboratory has published passwords and listens on loopback only. ` +
        'Set DEMO=off to serve others, or HOST=127.0.0.1.',
    ];
  const host = e.HOST.includes(':') ? `[${e.HOST}]` : e.HOST;
  return {
    port: e.PORT,
    host: e.HOST,
    dataDir: e.DATA_DIR,
    databaseUrl: e.DATABASE_URL,
    baseUrl: e.BASE_URL?.replace(/\/+$/, '') ?? `http://${host}:${e.PORT}`,
    sessionSecret: e.SESSION_SECRET,
    demo: e.DEMO === 'on',
    laboratory: e.LABORATORY ?? (e.DEMO === 'on' ? 'Demo laboratory' : 'Laboratory'),
    mailServer: e.MAIL_SERVER,
    mailFrom: e.MAIL_FROM,
    logLevel: e.LOG_LEVEL,
  };
}
