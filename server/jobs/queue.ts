import { setTimeout as sleep } from 'node:timers/promises';
import { sql, type SQL } from 'drizzle-orm';
import type pg from 'pg';
import PgBoss from 'pg-boss';
import type { Logger } from 'pino';
import type { Database } from '#server/db/database.ts';
import type { JobDefinition, JobQueue } from '#server/jobs/job-queue.ts';

export interface RunningQueue extends JobQueue {
  /** Begins to work on the given kinds; jobs of a killed process are put back first. */
  start(definitions: readonly JobDefinition<never>[]): Promise<void>;
  /** Takes no further job, tells those at work to stop and waits a little for them; they run again at the next start. */
  stop(): Promise<void>;
}

const stopWithin = 5000;

/** pg-boss over the application's own pool, embedded database or server alike. */
export async function createQueue(pool: pg.Pool, log: Logger): Promise<RunningQueue> {
  const closing = new AbortController();
  const atWork = new Set<Promise<void>>();
  // While closing nothing is claimed or marked any more: what is at work stays active, and the next start takes it up.
  const executeSql = async (text: string, values: unknown[] = []) =>
    closing.signal.aborted ? (undefined as never) : pool.query(text, values);
  const boss = new PgBoss({ db: { executeSql }, schedule: false });
  boss.on('error', (error) => {
    if (!closing.signal.aborted) log.error({ err: error }, 'the job queue reports an error');
  });
  await boss.start();

  async function run(definition: JobDefinition<never>, job: PgBoss.JobWithMetadata<unknown>): Promise<void> {
    const lastAttempt = job.retryCount >= job.retryLimit;
    const work = definition.run(job.data as never, { closing: closing.signal, lastAttempt });
    atWork.add(work);
    try {
      await work;
    } catch (error) {
      if (!closing.signal.aborted)
        log.error({ err: error, job: definition.name, lastAttempt }, 'a background job broke');
      throw error;
    } finally {
      atWork.delete(work);
    }
  }

  return {
    async send(tx, name, payload) {
      const db = { executeSql: (text: string, values: unknown[] = []) => executeWithin(tx, text, values) };
      const id = await boss.send(name, payload, { db });
      if (id === null) throw new Error(`the queue took no job for ${name}`);
    },
    async start(definitions) {
      const names = definitions.map((d) => d.name);
      if (new Set(names).size !== names.length) throw new Error(`two jobs share a name: ${names.join(', ')}`);
      const open = await pool.query<{ name: string }>(
        "select distinct name from pgboss.job where state in ('created', 'retry', 'active')",
      );
      const orphan = open.rows.find(({ name }) => !name.startsWith('__pgboss') && !names.includes(name));
      if (orphan) throw new Error(`the queue holds jobs "${orphan.name}" that nothing handles`);
      for (const d of definitions) {
        // An hour is more than any job needs; a crash is noticed at the next start, not by this limit.
        await boss.createQueue(d.name, {
          name: d.name,
          retryLimit: d.attempts - 1,
          retryDelay: 2,
          retryBackoff: true,
          expireInSeconds: 3600,
        });
      }
      // One server owns this queue: what is still active belonged to a process that is gone, and that costs no attempt.
      await pool.query(
        `update pgboss.job set state = 'created', started_on = null, start_after = now()
         where state = 'active' and name = any($1)`,
        [names],
      );
      for (const d of definitions)
        for (let i = 0; i < d.concurrency; i++)
          await boss.work(
            d.name,
            { pollingIntervalSeconds: 0.5, batchSize: 1, includeMetadata: true },
            async ([job]) => {
              if (job) await run(d, job);
            },
          );
    },
    async stop() {
      closing.abort();
      await Promise.race([Promise.allSettled(atWork), sleep(stopWithin, undefined, { ref: false })]);
      await boss.stop({ graceful: false, close: false });
    },
  };
}

/** Runs a statement with $1 … placeholders inside a transaction of drizzle's. */
async function executeWithin(tx: Database, text: string, values: unknown[]): Promise<{ rows: unknown[] }> {
  const chunks: SQL[] = text
    .split(/(\$\d+)/)
    .map((part) =>
      /^\$\d+$/.test(part) ? sql`${sql.param(values[Number(part.slice(1)) - 1])}` : sql.raw(part),
    );
  const result = await tx.execute(sql.join(chunks));
  return { rows: result.rows };
}
