import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { DatabaseClient } from '#server/db/client.ts';
import { migrateDatabase } from '#server/db/migrate.ts';
import type { JobContext, JobDefinition } from '#server/jobs/job-queue.ts';
import { createQueue, type RunningQueue } from '#server/jobs/queue.ts';
import { createLog } from '#server/log.ts';
import { until } from '#tests/support/test-app.ts';
import { freshDatabase } from '#tests/support/test-database.ts';

const log = createLog('silent');
let client: DatabaseClient;
let queues: RunningQueue[];
beforeEach(async () => {
  client = await freshDatabase();
  await migrateDatabase(client.db);
  queues = [];
});
afterEach(async () => {
  for (const queue of queues) await queue.stop();
  await client.close();
});

async function newQueue(): Promise<RunningQueue> {
  const queue = await createQueue(client.pool, log);
  queues.push(queue);
  return queue;
}

function job(
  name: string,
  run: (payload: { n: number }, context: JobContext) => Promise<void>,
  more: Partial<JobDefinition<never>> = {},
): JobDefinition<never> {
  return { name, attempts: 3, concurrency: 1, run, ...more };
}

const send = (queue: RunningQueue, name: string, n: number) =>
  client.db.transaction((tx) => queue.send(tx, name, { n }));
const states = async () =>
  (
    await client.pool.query<{ state: string }>("select state from pgboss.job where name not like '\\_\\_%'")
  ).rows.map((r) => r.state);

describe('the job queue', () => {
  it('runs what a committed transaction has sent, with its payload, once', async () => {
    const done: number[] = [];
    const queue = await newQueue();
    await queue.start([job('add', async ({ n }) => void done.push(n))]);
    await send(queue, 'add', 7);
    await send(queue, 'add', 8);
    await until(states, (all) => all.every((state) => state === 'completed'));
    expect(done.sort()).toEqual([7, 8]);
  });

  it('knows nothing of what a failed transaction has sent', async () => {
    const queue = await newQueue();
    await queue.start([job('add', async () => undefined)]);
    const failing = client.db.transaction(async (tx) => {
      await queue.send(tx, 'add', { n: 1 });
      throw new Error('the rest went wrong');
    });
    await expect(failing).rejects.toThrow('the rest went wrong');
    expect(await states()).toEqual([]);
  });

  it('tries a broken job again, tells it when a try is the last, and then gives up', async () => {
    const last: boolean[] = [];
    const queue = await newQueue();
    await queue.start([
      job(
        'break',
        async (_, { lastAttempt }) => {
          last.push(lastAttempt);
          throw new Error('broken');
        },
        { attempts: 2 },
      ),
    ]);
    await send(queue, 'break', 1);
    await until(states, ([state]) => state === 'failed');
    expect(last).toEqual([false, true]);
  });

  it('runs no more jobs at once than its definition allows', async () => {
    let atOnce = 0;
    let most = 0;
    let done = 0;
    let open: () => void = () => undefined;
    const gate = new Promise<void>((resolve) => (open = resolve));
    const queue = await newQueue();
    await queue.start([
      job(
        'wait',
        async () => {
          most = Math.max(most, ++atOnce);
          if (atOnce === 2) open();
          await gate;
          atOnce -= 1;
          done += 1;
        },
        { concurrency: 2 },
      ),
    ]);
    for (let n = 0; n < 5; n++) await send(queue, 'wait', n);
    await until(
      async () => done,
      (n) => n === 5,
    );
    expect(most).toBe(2);
  });

  it('tells a job at work that the server closes, and runs it again at the next start without counting a try', async () => {
    const first = await newQueue();
    let begun = () => undefined as void;
    const atWork = new Promise<void>((resolve) => (begun = resolve));
    await first.start([
      job(
        'long',
        (_, { closing }) =>
          new Promise((_resolve, reject) => {
            closing.addEventListener('abort', () => reject(new Error('cut off')));
            begun();
          }),
        { attempts: 2 },
      ),
    ]);
    await send(first, 'long', 1);
    await atWork;
    await first.stop();
    expect(await states()).toEqual(['active']);

    const second = await newQueue();
    const seen: boolean[] = [];
    await second.start([
      job('long', async (_, { lastAttempt }) => void seen.push(lastAttempt), { attempts: 2 }),
    ]);
    await until(states, ([state]) => state === 'completed');
    expect(seen).toEqual([false]);
  });

  it('takes up at once what a killed process had at work', async () => {
    const first = await newQueue();
    await first.start([job('long', () => new Promise(() => undefined))]);
    await send(first, 'long', 1);
    await until(states, ([state]) => state === 'active');
    // The process is gone without a word; another one opens the same database.
    const second = await newQueue();
    let done = 0;
    await second.start([job('long', async () => void done++)]);
    await until(states, ([state]) => state === 'completed');
    expect(done).toBe(1);
  });

  it('does not start with two kinds of one name', async () => {
    const queue = await newQueue();
    const twice = [job('same', async () => undefined), job('same', async () => undefined)];
    await expect(queue.start(twice)).rejects.toThrow('two jobs share a name');
  });

  it('does not start while it holds an open job that nothing handles, and does once that job has ended', async () => {
    const first = await newQueue();
    await first.start([job('old', async () => undefined, { concurrency: 0 })]);
    await send(first, 'old', 1);
    const second = await newQueue();
    await expect(second.start([job('new', async () => undefined)])).rejects.toThrow('holds jobs "old"');
    await client.pool.query("update pgboss.job set state = 'completed' where name = 'old'");
    await second.start([job('new', async () => undefined)]);
  });

  it('takes no job of a name that was never defined', async () => {
    const queue = await newQueue();
    await queue.start([]);
    await expect(send(queue, 'unknown', 1)).rejects.toThrow();
    expect(await states()).toEqual([]);
  });
});
