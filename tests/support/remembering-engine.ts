import type { EnginePool } from '#server/workers/engine-pool.ts';
import { inlineEngine } from '#server/workers/inline-engine.ts';

/** The real engine, which answers for every later picture what it found in the first: for tests that are not about pictures. */
export function rememberingEngine(): EnginePool {
  const engine = inlineEngine();
  let first: ReturnType<EnginePool['identify']> | undefined;
  return {
    ...engine,
    identify: (...picture) => (first ??= engine.identify(...picture)),
  };
}
