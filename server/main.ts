import { randomBytes, randomUUID } from 'node:crypto';
import { mkdir, readFile, writeFile } from 'node:fs/promises';
import { createServer } from 'node:http';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { allJobs, createApp } from '#server/app.ts';
import { connectEmbedded, connectServer } from '#server/db/client.ts';
import { DataInUse, lockDataFolder } from '#server/db/data-folder-lock.ts';
import { lockDatabase } from '#server/db/database-lock.ts';
import { migrateDatabase } from '#server/db/migrate.ts';
import { loadDemo } from '#server/demo/load-demo.ts';
import { requireKind, WrongKind } from '#server/demo/require-kind.ts';
import type { Deps } from '#server/deps.ts';
import { readSettings, type Settings } from '#server/env.ts';
import { hasPeople } from '#server/features/people/service.ts';
import { FirstAdministratorCode } from '#server/features/session/first-administrator.ts';
import { createQueue } from '#server/jobs/queue.ts';
import { createLog } from '#server/log.ts';
import { startTrouble } from '#server/start-trouble.ts';
import { diskStorage } from '#server/storage/disk-storage.ts';
import { createWorkerPool } from '#server/workers/worker-pool.ts';

const here = (path: string) => fileURLToPath(new URL(path, import.meta.url));
const say = (text: string) => process.stdout.write(`${text}\n`);
const complain = (text: string) => process.stderr.write(`${text}\n`);

const settings = readSettings(process.env);
if (!('port' in settings)) {
  for (const sentence of settings) complain(sentence);
  process.exit(2);
}
const log = createLog(settings.logLevel);

/** What was opened is closed in reverse order. */
const closers: (() => Promise<unknown> | void)[] = [];
let closing: Promise<void> | undefined;

function close(): Promise<void> {
  return (closing ??= (async () => {
    for (const closer of closers.reverse()) {
      try {
        await closer();
      } catch (error) {
        log.error({ err: error }, 'closing met a fault');
      }
    }
  })());
}

/** Made once and kept, so that sessions outlive a restart. */
async function sessionSecret({ sessionSecret: given, dataDir }: Settings): Promise<string> {
  if (given) return given;
  const file = join(dataDir, 'session-secret');
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

async function connect({ databaseUrl, dataDir }: Settings) {
  if (databaseUrl === undefined) {
    const client = await connectEmbedded(dataDir);
    closers.push(() => client.close());
    return client;
  }
  const client = connectServer(databaseUrl);
  closers.push(() => client.close());
  closers.push(await lockDatabase(client.pool));
  return client;
}

async function start(settings: Settings): Promise<void> {
  await mkdir(settings.dataDir, { recursive: true });
  closers.push(await lockDataFolder(settings.dataDir));
  const client = await connect(settings);
  await migrateDatabase(client.db);
  await requireKind(client.db, settings.demo);
  const engine = createWorkerPool(here('./identify.worker.js'));
  closers.push(() => engine.close());
  const queue = await createQueue(client.pool, log);
  closers.push(() => queue.stop());
  const { baseUrl, laboratory, demo, mailServer, mailFrom } = settings;
  const deps: Deps = {
    db: client.db,
    storage: diskStorage(join(settings.dataDir, 'pictures')),
    jobs: queue,
    engine,
    clock: () => new Date(),
    newId: randomUUID,
    log,
    settings: { baseUrl, laboratory, demo, mailServer, mailFrom },
  };
  await queue.start(allJobs(deps));
  if (demo) await loadDemo(deps, () => say('Loading the demo laboratory …'));
  const firstCode = (await hasPeople(deps.db)) ? undefined : new FirstAdministratorCode();
  const { app, close: closeApp } = createApp(deps, {
    pool: client.pool,
    sessionSecret: await sessionSecret(settings),
    firstCode,
    pages: here('../client'),
  });
  closers.push(closeApp);
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
  if (firstCode) say(`Open ${baseUrl} and create the administrator with the one-time code ${firstCode.code}`);
  say(`Fringeward is ready: ${baseUrl}`);
}

for (const signal of ['SIGTERM', 'SIGINT'] as const)
  process.on(signal, () => void close().then(() => process.exit(0)));
process.on('unhandledRejection', (error) =>
  log.error({ err: error }, 'a promise broke and nobody was waiting'),
);
process.on('uncaughtException', (error) => {
  log.fatal({ err: error }, 'the server broke');
  void close().then(() => process.exit(1));
});

start(settings).catch(async (error: unknown) => {
  // A signal during the start closes what the start still uses.
  if (closing) return;
  const refused = error instanceof DataInUse || error instanceof WrongKind;
  complain(refused ? error.message : startTrouble(error, settings));
  await close();
  process.exit(refused ? 2 : 1);
});
