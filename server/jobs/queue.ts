import { sql, type SQL } from 'drizzle-orm';
import type pg from 'pg';
import PgBoss from 'pg-boss';
import type { Logger } from 'pino';
import type { Database } from '#server/db/database.ts';
import type { JobDefinition, JobQueue } from '#server/jobs/job-queue.ts';

export interface RunningQueue extends JobQueue {
  /** Begins to work on the given kinds; jobs of a killed process are put back first. */
  start(definitions: readonly JobDefinition<never>[]): Promise<void>;
  stop(): Promise<void>;
}

/** pg-boss over the application's own pool, embedded database or server alike. */
export async function createQueue(pool: pg.Pool, log: Logger): Promise<RunningQueue> {
  const executeSql = (text: string, values: unknown[] = []) => pool.query(text, values);
  const boss = new PgBoss({ db: { executeSql } });
  boss.on('error', (error) => log.error({ err: error }, 'the job queue reports an error'));
  await boss.start();
  return {
    async send(tx, name, payload) {
      const db = { executeSql: (text: string, values: unknown[] = []) => executeWithin(tx, text, values) };
      const id = await boss.send(name, payload, { db });
      if (id === null) throw new Error(`the queue took no job for ${name}`);
    },
    async start(definitions) {
      const names = definitions.map((d) => d.name);
      if (new Set(names).size !== names.length) throw new Error(`two jobs share a name: ${names.join(', ')}`);
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
      const known = await pool.query<{ name: string }>('select name from pgboss.queue');
      const orphan = known.rows.find(({ name }) => !name.startsWith('__pgboss') && !names.includes(name));
      if (orphan) throw new Error(`the queue holds jobs "${orphan.name}" that nothing handles`);
      // One server owns this queue: what is still active belonged to a process that is gone.
      await pool.query("update pgboss.job set state = 'retry', start_after = now() where state = 'active'");
      for (const d of definitions)
        for (let i = 0; i < d.concurrency; i++)
          await boss.work(d.name, { pollingIntervalSeconds: 0.5, batchSize: 1 }, async ([job]) => {
            if (!job) return;
            try {
              await d.run(job.data as never);
            } catch (error) {
              log.error({ err: error, job: d.name }, 'a job broke and will be tried again');
              throw error;
            }
          });
    },
    async stop() {
      await boss.stop({ graceful: false, close: false, wait: true });
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
