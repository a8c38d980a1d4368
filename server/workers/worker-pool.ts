import { availableParallelism } from 'node:os';
import { MessageChannel, type MessagePort } from 'node:worker_threads';
import { Piscina } from 'piscina';
import type { Outcome } from '#server/engine/outcome.ts';
import { Refusal } from '#server/http/refusal.ts';
import type { EnginePool, Inspection } from '#server/workers/engine-pool.ts';
import type { Answer } from '#server/workers/identify.worker.ts';
import type { Task } from '#server/workers/tasks.ts';

/** A picture that keeps a thread busy for longer than this costs its own job and nothing else. */
const timeLimit = 5 * 60_000;

/** As many as there are cores, within reason. */
export const identificationsAtOnce = Math.max(1, Math.min(4, availableParallelism()));

interface PoolOptions {
  /** Threads at most; otherwise one beside those that identify, so that uploads find a thread of their own. */
  readonly threads?: number;
  /** Milliseconds for one task. */
  readonly limit?: number;
}

/** The engine in worker threads. `file` is the bundled worker. */
export function createWorkerPool(file: string, options: PoolOptions = {}): EnginePool {
  const { threads = identificationsAtOnce + 1, limit = timeLimit } = options;
  const pool = new Piscina({
    filename: file,
    minThreads: 1,
    maxThreads: threads,
    idleTimeout: 60_000,
    resourceLimits: { maxOldGenerationSizeMb: 1500 },
  });

  async function run<T>(task: Task, signal: AbortSignal, transfer: readonly MessagePort[] = []): Promise<T> {
    const overdue = AbortSignal.timeout(limit);
    let answer: Answer;
    try {
      answer = (await pool.run(task, {
        signal: AbortSignal.any([signal, overdue]),
        transferList: [...transfer] as never,
      })) as Answer;
    } catch (error) {
      if (overdue.aborted && !signal.aborted) throw tooLong(limit);
      throw error;
    }
    if ('refusal' in answer) throw new Refusal(answer.refusal.code, answer.refusal.detail);
    return answer.result as T;
  }

  const never = new AbortController().signal;
  return {
    inspect: (bytes, fileName, bench) => run<Inspection>({ kind: 'inspect', bytes, fileName, bench }, never),
    thumbnail: (bytes, center) => run<Uint8Array>({ kind: 'thumbnail', bytes, center }, never),
    pixels: (bytes) => run<Uint8Array>({ kind: 'pixels', bytes }, never),
    async identify(bytes, bench, onProgress, signal) {
      const { port1, port2 } = new MessageChannel();
      port1.on('message', (message: { step: string; share: number }) =>
        onProgress(message.step, message.share),
      );
      port1.unref();
      try {
        return await run<Outcome>({ kind: 'identify', bytes, bench, progress: port2 }, signal, [port2]);
      } finally {
        port1.close();
      }
    },
    close: () => pool.destroy(),
  };
}

function tooLong(limit: number): Refusal {
  return new Refusal(
    'identification-crashed',
    `The picture kept the engine busy for more than ${Math.round(limit / 1000)} seconds, so it was broken off and nothing was concluded. Crop the picture about the pattern or bin its pixels, and upload that.`,
  );
}
