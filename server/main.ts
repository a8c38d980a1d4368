import { randomBytes, randomUUID } from 'node:crypto';
import { mkdir, readFile, writeFile } from 'node:fs/promises';
import { createServer } from 'node:http';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { pino } from 'pino';
import { allJobs, createApp } from '#server/app.ts';
import { connectEmbedded, connectServer } from '#server/db/client.ts';
import { FolderInUse, lockDataFolder } from '#server/db/data-folder-lock.ts';
import { migrateDatabase } from '#server/db/migrate.ts';
import { loadDemo } from '#server/demo/load-demo.ts';
import type { Deps } from '#server/deps.ts';
import { readSettings, type Settings } from '#server/env.ts';
import { hasPeople } from '#server/features/people/service.ts';
import { FirstAdministratorCode } from '#server/features/session/first-administrator.ts';
import { createQueue } from '#server/jobs/queue.ts';
import { diskStorage } from '#server/storage/disk-storage.ts';
import { createWorkerPool } from '#server/workers/worker-pool.ts';

const here = (path: string) => fileURLToPath(new URL(path, import.meta.url));
const say = (text: string) => process.stdout.write(`${text}\n`);

function refuse(sentences: readonly string[]): never {
  for (const sentence of sentences) process.stderr.write(`${sentence}\n`);
  process.exit(2);
}

/** What was opened is closed in reverse order. */
const closers: (() => Promise<unknown> | void)[] = [];
let closing = false;

async function close(code: number): Promise<never> {
  if (!closing) {
    closing = true;
    for (const closer of closers.reverse()) {
      try {
        await closer();
      } catch (error) {
        process.stderr.write(`While closing: ${(error as Error).message}\n`);
      }
    }
  }
  process.exit(code);
}

/** Made once and kept, so that sessions outlive a restart. */
async function sessionSecret(settings: Settings): Promise<string> {
  if (settings.sessionSecret) return settings.sessionSecret;
  const file = join(settings.dataDir, 'session-secret');
  try {
    const kept = (await readFile(file, 'utf8')).trim();
    if (kept.length >= 32) return kept;
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'ENOENT') throw error;
  }
  const made = randomBytes(32).toString('base64url');
  await writeFile(file, made, { mode: 0o600 });
  return made;
}

async function start(settings: Settings): Promise<void> {
  const log = pino({ level: process.env['LOG_LEVEL'] ?? 'warn' });
  await mkdir(settings.dataDir, { recursive: true });
  closers.push(await lockDataFolder(settings.dataDir));
  const client = settings.databaseUrl
    ? connectServer(settings.databaseUrl)
    : await connectEmbedded(settings.dataDir);
  closers.push(() => client.close());
  await migrateDatabase(client.db);
  const engine = createWorkerPool(here('./identify.worker.js'));
  closers.push(() => engine.close());
  const queue = await createQueue(client.pool, log);
  closers.push(() => queue.stop());
  const deps: Deps = {
    db: client.db,
    storage: diskStorage(join(settings.dataDir, 'pictures')),
    jobs: queue,
    engine,
    clock: () => new Date(),
    newId: randomUUID,
    log,
    settings: {
      baseUrl: settings.baseUrl,
      laboratory: settings.laboratory,
      demo: settings.demo,
      mailServer: settings.mailServer,
      mailFrom: settings.mailFrom,
    },
  };
  await queue.start(allJobs(deps));
  let firstCode: FirstAdministratorCode | undefined;
  if (settings.demo) {
    say('Preparing the demo laboratory …');
    await loadDemo(deps);
  } else if (!(await hasPeople(deps.db))) firstCode = new FirstAdministratorCode();
  const { app, close: closeSessions } = createApp(deps, {
    pool: client.pool,
    sessionSecret: await sessionSecret(settings),
    firstCode,
    pages: here('../client'),
  });
  closers.push(closeSessions);
  const server = createServer(app);
  server.requestTimeout = 5 * 60_000;
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(settings.port, settings.host, resolve);
  });
  closers.push(
    () =>
      new Promise<void>((resolve) => {
        server.close(() => resolve());
        server.closeIdleConnections();
        setTimeout(() => server.closeAllConnections(), 3000).unref();
      }),
  );
  if (firstCode)
    say(`Open ${settings.baseUrl} and create the administrator with the one-time code ${firstCode.code}`);
  say(`Fringeward is ready: ${settings.baseUrl}`);
}

const settings = readSettings(process.env);
if (!('port' in settings)) refuse(settings);
for (const signal of ['SIGTERM', 'SIGINT'] as const) process.on(signal, () => void close(0));
start(settings).catch((error: unknown) => {
  if (error instanceof FolderInUse) refuse([error.message]);
  if ((error as NodeJS.ErrnoException).code === 'EADDRINUSE')
    process.stderr.write(
      `Port ${settings.port} is taken by another program. Stop it, or set PORT to another number.\n`,
    );
  else
    process.stderr.write(
      `Fringeward could not start: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}\n`,
    );
  void close(1);
});
