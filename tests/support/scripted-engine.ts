import type { Outcome } from '#server/engine/outcome.ts';
import type { EnginePool } from '#server/workers/engine-pool.ts';
import { inlineEngine } from '#server/workers/inline-engine.ts';

export interface Run {
  readonly tell: (step: string, share: number) => void;
  readonly signal: AbortSignal;
  /** Ends the run with a given outcome. */
  readonly end: (outcome: Outcome) => void;
  /** Ends the run with the real engine's outcome. */
  readonly finish: () => void;
  readonly break: (error: Error) => void;
}

/** The real engine, except that an identification waits until the test lets it end. */
export function scriptedEngine(): { engine: EnginePool; nextRun: () => Promise<Run> } {
  const real = inlineEngine();
  const begun: Run[] = [];
  const waiting: ((run: Run) => void)[] = [];
  return {
    engine: {
      ...real,
      identify: (bytes, bench, tell, signal) =>
        new Promise((resolve, reject) => {
          const run: Run = {
            tell,
            signal,
            end: resolve,
            finish: () => resolve(real.identify(bytes, bench, () => undefined, signal)),
            break: reject,
          };
          signal.addEventListener('abort', () => reject(signal.reason as Error));
          const taker = waiting.shift();
          if (taker) taker(run);
          else begun.push(run);
        }),
    },
    nextRun: () =>
      new Promise((resolve) => {
        const run = begun.shift();
        if (run) resolve(run);
        else waiting.push(resolve);
      }),
  };
}
