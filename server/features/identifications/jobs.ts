import { record } from '#server/audit/audit.ts';
import type { Deps } from '#server/deps.ts';
import { atlasVersion, engineVersion } from '#server/engine/version.ts';
import { unusableSentences } from '#server/features/exposures/unusable-sentences.ts';
import { whileStoppable } from '#server/features/identifications/running.ts';
import { identifyJobName } from '#server/features/identifications/service.ts';
import {
  changeIdentification,
  findExposureFile,
  findIdentification,
} from '#server/features/identifications/store.ts';
import { problemOf } from '#server/http/problem.ts';
import { Refusal } from '#server/http/refusal.ts';
import type { JobDefinition } from '#server/jobs/job-queue.ts';
import type { Problem } from '#shared/problems.ts';

const progressEvery = 300;

/**
 * Runs a queued identification, or one whose process was killed, from the start. An outcome is written once; whatever
 * breaks for good ends in a problem that people can read.
 */
export function identifyJob(deps: Deps): JobDefinition<{ identificationId: string }> {
  return {
    name: identifyJobName,
    attempts: 3,
    concurrency: 2,
    async run({ identificationId: id }) {
      const row = await findIdentification(deps.db, id);
      if (!row || !['queued', 'running'].includes(row.identification.state)) return;
      const file = await findExposureFile(deps.db, row.identification.exposureId);
      if (!file) return;
      const begun = await changeIdentification(deps.db, id, ['queued', 'running'], {
        state: 'running',
        share: 0,
        step: 'Starting',
        startedAt: deps.clock(),
        engineVersion,
        atlasVersion,
      });
      if (!begun) return;
      const fail = (problem: Problem) =>
        changeIdentification(deps.db, id, ['running'], {
          state: 'failed',
          problem,
          finishedAt: deps.clock(),
        });
      try {
        const bytes = await deps.storage.find(file.sha256);
        if (!bytes)
          throw new Error(
            `the picture of exposure ${row.identification.exposureId} is missing from the store`,
          );
        const outcome = await whileStoppable(id, (signal) =>
          deps.engine.identify(bytes, file.bench, progressWriter(deps, id), signal),
        );
        if (outcome.kind === 'unusable') {
          await fail(problemOf('picture-unusable', unusableSentences[outcome.reasons[0]]));
          return;
        }
        await deps.db.transaction(async (tx) => {
          const done = {
            state: 'done',
            outcome: structuredClone(outcome) as never,
            share: 1,
            step: 'Done',
          } as const;
          if (await changeIdentification(tx, id, ['running'], { ...done, finishedAt: deps.clock() }))
            await record(
              tx,
              row.startedBy,
              deps.clock(),
              'finish-identification',
              { kind: 'identification', id },
              {
                verdict: outcome.verdict,
              },
            );
        });
      } catch (error) {
        if (error instanceof Refusal) await fail(problemOf(error.code, error.message));
        else if (isAbort(error) && (await isCancelled(deps, id))) return;
        else {
          deps.log.error({ err: error, identification: id }, 'an identification broke');
          await fail(
            problemOf(
              'identification-crashed',
              'The identification broke off, and nothing was concluded from the picture. Run it again; if it breaks again, tell the administrator.',
            ),
          );
        }
      }
    },
  };
}

function isAbort(error: unknown): boolean {
  return (
    error instanceof Error && (error.name === 'AbortError' || error.message.includes('stopped on request'))
  );
}

async function isCancelled(deps: Deps, id: string): Promise<boolean> {
  return (await findIdentification(deps.db, id))?.identification.state === 'cancelled';
}

/** Writes progress to the row now and then; never lets it fall, never lets a late write overtake the end. */
function progressWriter(deps: Deps, id: string): (step: string, share: number) => void {
  let last = 0;
  let reached = 0;
  return (step, share) => {
    reached = Math.max(reached, Math.min(share, 0.99));
    const now = deps.clock().getTime();
    if (now - last < progressEvery) return;
    last = now;
    changeIdentification(deps.db, id, ['running'], { step, share: reached }).catch((error: unknown) =>
      deps.log.warn({ err: error, identification: id }, 'progress could not be written'),
    );
  };
}
