import { record } from '#server/audit/audit.ts';
import type { Deps } from '#server/deps.ts';
import { atlasVersion, engineVersion } from '#server/engine/version.ts';
import { progressWriter } from '#server/features/identifications/progress-writer.ts';
import { whileStoppable } from '#server/features/identifications/running.ts';
import { identifyJobName } from '#server/features/identifications/service.ts';
import {
  changeIdentification,
  findExposureFile,
  findIdentification,
  type IdentificationRow,
} from '#server/features/identifications/store.ts';
import { problemOf } from '#server/http/problem.ts';
import { Refusal } from '#server/http/refusal.ts';
import { unusableSentences } from '#server/images/unusable-sentences.ts';
import type { JobContext, JobDefinition } from '#server/jobs/job-queue.ts';
import { identificationsAtOnce } from '#server/workers/worker-pool.ts';
import { outcomeSchema, type Outcome } from '#shared/contracts/identifications.ts';
import type { Problem } from '#shared/problems.ts';

/**
 * Runs a queued identification, or one whose process was killed, from the start. An outcome is written once; whatever
 * breaks for good ends in a problem that people can read.
 */
export function identifyJob(deps: Deps): JobDefinition<{ identificationId: string }> {
  return {
    name: identifyJobName,
    attempts: 2,
    concurrency: identificationsAtOnce,
    async run({ identificationId: id }, context) {
      const row = await findIdentification(deps.db, id);
      if (!row || !(await begin(deps, id))) return;
      try {
        const outcome = await identifyExposure(deps, row, context.closing);
        if (outcome.kind === 'unusable')
          await fail(deps, id, problemOf('picture-unusable', unusableSentences[outcome.reasons[0]]));
        else await keep(deps, row, outcome);
      } catch (error) {
        // Closing leaves the row as it is: the next start runs it again.
        if (context.closing.aborted) throw error;
        if (error instanceof Refusal) await fail(deps, id, problemOf(error.code, error.message));
        else if (!(await isCancelled(deps, id))) await afterFault(deps, id, error, context);
      }
    },
  };
}

function begin(deps: Deps, id: string): Promise<boolean> {
  return changeIdentification(deps.db, id, ['queued', 'running'], {
    state: 'running',
    share: 0,
    step: 'Starting',
    startedAt: deps.clock(),
    engineVersion,
    atlasVersion,
  });
}

async function identifyExposure(
  deps: Deps,
  { identification: { id, exposureId } }: IdentificationRow,
  closing: AbortSignal,
): Promise<Outcome> {
  const file = await findExposureFile(deps.db, exposureId);
  const bytes = file && (await deps.storage.find(file.sha256));
  if (!bytes) throw new Error(`the picture of exposure ${exposureId} is missing from the store`);
  const { tell, settled } = progressWriter(deps, id);
  const outcome = await whileStoppable(id, (signal) =>
    deps.engine.identify(bytes, file.bench, tell, AbortSignal.any([signal, closing])),
  );
  await settled();
  return outcomeSchema.parse(outcome);
}

async function keep(deps: Deps, row: IdentificationRow, outcome: Outcome & { kind: 'answer' }) {
  const { id } = row.identification;
  await deps.db.transaction(async (tx) => {
    const at = deps.clock();
    const end = { state: 'done', outcome, share: 1, step: 'Done', finishedAt: at } as const;
    if (!(await changeIdentification(tx, id, ['running'], end))) return;
    const subject = { kind: 'identification', id };
    await record(tx, row.startedBy, at, 'finish-identification', subject, { verdict: outcome.verdict });
  });
}

function fail(deps: Deps, id: string, problem: Problem): Promise<boolean> {
  return changeIdentification(deps.db, id, ['running'], {
    state: 'failed',
    problem,
    finishedAt: deps.clock(),
  });
}

/** A fault may pass: it is tried once more before people are told. */
async function afterFault(deps: Deps, id: string, error: unknown, { lastAttempt }: JobContext) {
  if (!lastAttempt) {
    await changeIdentification(deps.db, id, ['running'], { state: 'queued', share: 0, step: '' });
    throw error;
  }
  deps.log.error({ err: error, identification: id }, 'an identification broke');
  await fail(
    deps,
    id,
    problemOf(
      'identification-crashed',
      'The identification broke off, and nothing was concluded from the picture. Run it again; if it breaks again, tell the administrator.',
    ),
  );
}

async function isCancelled(deps: Deps, id: string): Promise<boolean> {
  return (await findIdentification(deps.db, id))?.identification.state === 'cancelled';
}
