import { identifyTask, inspectTask, pixelsTask, thumbnailTask } from '#server/workers/tasks.ts';
import type { EnginePool } from '#server/workers/engine-pool.ts';

/** The engine on the calling thread: for tests, where what counts is the outcome. */
export function inlineEngine(): EnginePool {
  return {
    inspect: inspectTask,
    thumbnail: thumbnailTask,
    pixels: pixelsTask,
    identify: (bytes, bench, onProgress, signal) =>
      identifyTask(bytes, bench, onProgress, () => signal.aborted),
    close: () => Promise.resolve(),
  };
}
