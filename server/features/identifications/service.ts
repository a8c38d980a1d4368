import type { Actor } from '#server/actor.ts';
import { record } from '#server/audit/audit.ts';
import type { Database } from '#server/db/database.ts';
import type { Deps } from '#server/deps.ts';
import { atlasVersion, engineVersion } from '#server/engine/version.ts';
import { presentIdentification } from '#server/features/identifications/present.ts';
import { stopRunning } from '#server/features/identifications/running.ts';
import {
  changeIdentification,
  findExposureFile,
  findIdentification,
  hasOneUnderWay,
  insertIdentification,
  nextRun,
  selectByExposure,
  selectLatest,
  type IdentificationRow,
} from '#server/features/identifications/store.ts';
import { nearReferences } from '#server/features/references/service.ts';
import { notFound, Refusal } from '#server/http/refusal.ts';
import type { Exposure } from '#shared/contracts/exposures.ts';
import type { Identification } from '#shared/contracts/identifications.ts';

export const identifyJobName = 'identify-exposure';

/** A queued run with its job, inside the caller's transaction. */
export async function queueIdentification(
  tx: Database,
  deps: Deps,
  actor: Actor,
  exposureId: string,
): Promise<string> {
  const id = deps.newId();
  await insertIdentification(tx, {
    id,
    exposureId,
    run: await nextRun(tx, exposureId),
    state: 'queued',
    engineVersion,
    atlasVersion,
    startedBy: actor.id,
    queuedAt: deps.clock(),
  });
  await deps.jobs.send(tx, identifyJobName, { identificationId: id });
  return id;
}

export async function startAnew(deps: Deps, actor: Actor, exposureId: string): Promise<Identification> {
  const id = await deps.db.transaction(async (tx) => {
    const exposure = await findExposureFile(tx, exposureId);
    if (!exposure) throw notFound('exposure');
    if (exposure.withdrawnAt)
      throw new Refusal(
        'wrong-state',
        'The exposure is withdrawn and can no longer be identified. Upload another one.',
      );
    if (exposure.caseState !== 'open')
      throw new Refusal(
        'wrong-state',
        `${exposure.caseNumber} is not open, so nothing new is identified in it. Reopen it first.`,
      );
    if (await hasOneUnderWay(tx, exposureId))
      throw new Refusal(
        'identification-running',
        'An identification of this exposure is under way. Wait for it, or cancel it first.',
      );
    const created = await queueIdentification(tx, deps, actor, exposureId);
    await record(
      tx,
      actor,
      deps.clock(),
      'start-identification',
      { kind: 'identification', id: created },
      { exposureId },
    );
    return created;
  });
  return readIdentification(deps, actor, id);
}

export async function readIdentification(deps: Deps, actor: Actor, id: string): Promise<Identification> {
  return presentWithReferences(deps, actor, await requireIdentification(deps.db, id));
}

export async function identificationsOf(
  deps: Deps,
  actor: Actor,
  exposureId: string,
): Promise<Identification[]> {
  if (!(await findExposureFile(deps.db, exposureId))) throw notFound('exposure');
  const presented: Identification[] = [];
  for (const row of await selectByExposure(deps.db, exposureId))
    presented.push(await presentWithReferences(deps, actor, row));
  return presented;
}

export async function cancel(deps: Deps, actor: Actor, id: string): Promise<Identification> {
  await deps.db.transaction(async (tx) => {
    await requireIdentification(tx, id);
    const changed = await changeIdentification(tx, id, ['queued', 'running'], {
      state: 'cancelled',
      finishedAt: deps.clock(),
      step: 'Cancelled',
    });
    if (!changed)
      throw new Refusal(
        'wrong-state',
        'The identification has ended already, so there is nothing to cancel.',
      );
    await record(tx, actor, deps.clock(), 'cancel-identification', { kind: 'identification', id });
  });
  stopRunning(id);
  return readIdentification(deps, actor, id);
}

/** The newest run of each exposure, for lists. */
export async function latestOf(
  db: Database,
  exposureIds: readonly string[],
): Promise<Map<string, NonNullable<Exposure['latest']>>> {
  const rows = await selectLatest(db, exposureIds);
  return new Map(
    rows.map((row) => [
      row.exposureId,
      {
        identificationId: row.id,
        state: row.state,
        share: row.share,
        step: row.step,
        verdict: row.outcome?.kind === 'answer' ? row.outcome.verdict : null,
      },
    ]),
  );
}

async function presentWithReferences(
  deps: Deps,
  actor: Actor,
  row: IdentificationRow,
): Promise<Identification> {
  const { outcome } = row.identification;
  const near = outcome?.kind === 'answer' ? await nearReferences(deps.db, outcome.candidates) : [];
  return presentIdentification(row, near, actor);
}

async function requireIdentification(db: Database, id: string): Promise<IdentificationRow> {
  const row = await findIdentification(db, id);
  if (!row) throw notFound('identification');
  return row;
}
