import type { Deps } from '#server/deps.ts';
import { changeIdentification } from '#server/features/identifications/store.ts';
import type { Progress } from '#server/engine/outcome.ts';

const milliseconds = 300;

/**
 * Writes progress to the row now and then. It never falls, one write waits for the one before it, and `settled` resolves
 * once the last one is through, so that none comes after the end.
 */
export function progressWriter(deps: Deps, id: string): { tell: Progress; settled: () => Promise<void> } {
  let last = -Infinity;
  let reached = 0;
  let writing: Promise<void> | undefined;
  return {
    tell(step, share) {
      reached = Math.max(reached, Math.min(share, 0.99));
      const now = deps.clock().getTime();
      if (writing || now - last < milliseconds) return;
      last = now;
      writing = changeIdentification(deps.db, id, ['running'], { step, share: reached }).then(
        () => {
          writing = undefined;
        },
        (error: unknown) => {
          writing = undefined;
          deps.log.warn({ err: error, identification: id }, 'progress could not be written');
        },
      );
    },
    settled: async () => writing,
  };
}
