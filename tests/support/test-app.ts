import { randomUUID } from 'node:crypto';
import { setTimeout as sleep } from 'node:timers/promises';
import { hash } from '@node-rs/argon2';
import type { Express } from 'express';
import { allJobs, createApp } from '#server/app.ts';
import type { DatabaseClient } from '#server/db/client.ts';
import { migrateDatabase } from '#server/db/migrate.ts';
import { demoPassword, demoPeople } from '#server/demo/demo-people.ts';
import type { Deps } from '#server/deps.ts';
import { addWithin } from '#server/features/people/service.ts';
import type { FirstAdministratorCode } from '#server/features/session/first-administrator.ts';
import { createQueue } from '#server/jobs/queue.ts';
import { createLog } from '#server/log.ts';
import { memoryStorage } from '#server/storage/memory-storage.ts';
import type { EnginePool } from '#server/workers/engine-pool.ts';
import { inlineEngine } from '#server/workers/inline-engine.ts';
import { signIn } from '#shared/contracts/session.ts';
import { Caller } from '#tests/support/caller.ts';
import { freshDatabase } from '#tests/support/test-database.ts';

export type Who = keyof typeof demoPeople;

export interface TestApp {
  readonly app: Express;
  readonly deps: Deps;
  readonly client: DatabaseClient;
  /** Everything that was logged, one JSON line each. */
  readonly logged: string[];
  /** Somebody who has not signed in. */
  anonymous(): Caller;
  /** One of the people of the demo laboratory, signed in. */
  signInAs(who: Who): Promise<Caller>;
  close(): Promise<void>;
}

export interface TestAppOptions {
  readonly settings?: Partial<Deps['settings']>;
  readonly engine?: EnginePool;
  readonly clock?: () => Date;
  /** The people of the demo laboratory, and nothing else of it, are there unless this is false. */
  readonly people?: boolean;
  readonly firstCode?: FirstAdministratorCode;
  readonly pages?: string;
  /** Jobs are sent but nobody works on them. */
  readonly idle?: boolean;
}

/** The whole application over a fresh database, pictures in memory and (unless told otherwise) the real engine inline. */
export async function createTestApp(options: TestAppOptions = {}): Promise<TestApp> {
  const client = await freshDatabase();
  await migrateDatabase(client.db);
  const logged: string[] = [];
  const log = createLog('debug', { write: (line) => void logged.push(line) });
  const queue = await createQueue(client.pool, log);
  const deps: Deps = {
    db: client.db,
    storage: memoryStorage(),
    jobs: queue,
    engine: options.engine ?? inlineEngine(),
    clock: options.clock ?? (() => new Date()),
    newId: randomUUID,
    log,
    settings: {
      baseUrl: 'http://127.0.0.1:4817',
      laboratory: 'Test laboratory',
      demo: false,
      mailServer: undefined,
      mailFrom: 'fringeward@example.org',
      ...options.settings,
    },
  };
  await queue.start(options.idle ? allJobs(deps).map((job) => ({ ...job, concurrency: 0 })) : allJobs(deps));
  if (options.people !== false) await addDemoPeople(deps);
  const { app, close } = createApp(deps, {
    pool: client.pool,
    sessionSecret: 'a secret of the tests that is long enough',
    firstCode: options.firstCode,
    pages: options.pages,
  });
  return {
    app,
    deps,
    client,
    logged,
    anonymous: () => new Caller(app),
    async signInAs(who) {
      const caller = new Caller(app);
      await caller.call(signIn, { body: { email: demoPeople[who].email, password: demoPassword } });
      return caller;
    },
    async close() {
      close();
      await queue.stop();
      await client.close();
    },
  };
}

async function addDemoPeople(deps: Deps): Promise<void> {
  const passwordHash = await hash(demoPassword);
  await deps.db.transaction(async (tx) => {
    for (const person of Object.values(demoPeople))
      await addWithin(tx, deps, null, { ...person, roles: [...person.roles], passwordHash });
  });
}

/** Asks again until the answer holds; a test that waits for ever ends by the runner's own limit. */
export async function until<T>(ask: () => Promise<T>, holds: (answer: T) => boolean): Promise<T> {
  for (;;) {
    const answer = await ask();
    if (holds(answer)) return answer;
    await sleep(50);
  }
}
