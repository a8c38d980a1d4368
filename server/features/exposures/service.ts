import type { Actor } from '#server/actor.ts';
import { record } from '#server/audit/audit.ts';
import type { Database } from '#server/db/database.ts';
import type { Deps } from '#server/deps.ts';
import { copyBench } from '#server/features/benches/service.ts';
import { mayWithdraw } from '#server/features/exposures/policy.ts';
import { presentExposure } from '#server/features/exposures/present.ts';
import {
  findCaseOf,
  findExposure,
  findSameFile,
  insertExposure,
  lockCase,
  markWithdrawn,
  nextNumber,
  selectByCase,
  touchCase,
  type ExposureRow,
} from '#server/features/exposures/store.ts';
import { unusableSentences } from '#server/images/unusable-sentences.ts';
import { latestOf, queueIdentification } from '#server/features/identifications/service.ts';
import { notFound, Refusal } from '#server/http/refusal.ts';
import { sha256 } from '#server/storage/disk-storage.ts';
import type { Exposure } from '#shared/contracts/exposures.ts';

export interface UploadedFile {
  readonly name: string;
  readonly bytes: Uint8Array;
}

/** Takes a picture into a case and queues its first identification: everything or nothing. */
export async function takeExposure(
  deps: Deps,
  actor: Actor,
  caseId: string,
  file: UploadedFile,
  input: { benchId: string; note: string },
  fixedId?: string,
): Promise<Exposure> {
  const target = await findCaseOf(deps.db, caseId);
  if (!target) throw notFound('case');
  requireOpen(target);
  const bench = await copyBench(deps.db, input.benchId);
  if (!bench)
    throw new Refusal('invalid-input', 'Choose one of the benches.', [
      { pointer: '#/benchId', detail: 'There is no such bench. Choose one of the list.' },
    ]);
  const hash = sha256(file.bytes);
  await requireNew(deps.db, caseId, hash);
  const { decoded, facts, unusable } = await deps.engine.inspect(file.bytes, file.name, bench);
  if (unusable.length > 0 && unusable[0] !== 'no-center')
    throw new Refusal('picture-unusable', unusableSentences[unusable[0]]);
  await deps.storage.put(file.bytes);
  const id = fixedId ?? deps.newId();
  const at = deps.clock();
  await deps.db.transaction(async (tx) => {
    const locked = await lockCase(tx, caseId);
    if (!locked) throw notFound('case');
    requireOpen(locked);
    await requireNew(tx, caseId, hash);
    await insertExposure(tx, {
      id,
      caseId,
      number: await nextNumber(tx, caseId),
      fileName: file.name,
      sha256: hash,
      byteSize: file.bytes.length,
      ...decoded,
      note: input.note,
      bench,
      facts,
      uploadedBy: actor.id,
      uploadedAt: at,
    });
    await touchCase(tx, caseId, at);
    await record(
      tx,
      actor,
      at,
      'upload-exposure',
      { kind: 'exposure', id },
      { caseId, fileName: file.name, sha256: hash },
    );
    await queueIdentification(tx, deps, actor, id);
  });
  return readExposure(deps, actor, id);
}

export async function readExposure(deps: Deps, actor: Actor, id: string): Promise<Exposure> {
  return presentOne(deps.db, actor, await requireExposure(deps.db, id));
}

export async function exposuresOfCase(deps: Deps, actor: Actor, caseId: string): Promise<Exposure[]> {
  const rows = await selectByCase(deps.db, caseId);
  const latest = await latestOf(
    deps.db,
    rows.map((row) => row.exposure.id),
  );
  return rows.map((row) => presentExposure(row, latest.get(row.exposure.id) ?? null, actor));
}

export async function withdraw(deps: Deps, actor: Actor, id: string, reason: string): Promise<Exposure> {
  await deps.db.transaction(async (tx) => {
    const row = await requireExposure(tx, id);
    if (!mayWithdraw(actor, row))
      throw new Refusal(
        'wrong-state',
        row.exposure.withdrawnAt
          ? 'The exposure is withdrawn already.'
          : 'While a match is under review or the case is closed its exposures stay as they are. Reopen the case first.',
      );
    const at = deps.clock();
    await markWithdrawn(tx, id, { withdrawnBy: actor.id, withdrawnAt: at, withdrawnReason: reason });
    await touchCase(tx, row.exposure.caseId, at);
    await record(tx, actor, at, 'withdraw-exposure', { kind: 'exposure', id }, { reason });
  });
  return readExposure(deps, actor, id);
}

/** The file as it came. */
export async function originalOf(deps: Deps, id: string): Promise<{ row: ExposureRow; bytes: Uint8Array }> {
  const row = await requireExposure(deps.db, id);
  const bytes = await deps.storage.find(row.exposure.sha256);
  if (!bytes) throw new Error(`the picture of exposure ${id} is missing from the store`);
  return { row, bytes };
}

export async function pixelsOf(deps: Deps, id: string): Promise<Uint8Array> {
  return deps.engine.pixels((await originalOf(deps, id)).bytes);
}

export async function thumbnailOf(deps: Deps, id: string): Promise<Uint8Array> {
  const { row, bytes } = await originalOf(deps, id);
  return deps.engine.thumbnail(bytes, row.exposure.facts.center);
}

async function presentOne(db: Database, actor: Actor, row: ExposureRow): Promise<Exposure> {
  const latest = await latestOf(db, [row.exposure.id]);
  return presentExposure(row, latest.get(row.exposure.id) ?? null, actor);
}

async function requireExposure(db: Database, id: string): Promise<ExposureRow> {
  const row = await findExposure(db, id);
  if (!row) throw notFound('exposure');
  return row;
}

function requireOpen(target: { number: string; state: string }): void {
  if (target.state !== 'open')
    throw new Refusal(
      'wrong-state',
      target.state === 'in-review'
        ? `${target.number} is under review and takes no exposures. Wait for the decision.`
        : `${target.number} is closed and takes no exposures. Reopen it first.`,
    );
}

async function requireNew(db: Database, caseId: string, hash: string): Promise<void> {
  const same = await findSameFile(db, caseId, hash);
  if (same)
    throw new Refusal(
      'same-file-in-case',
      `The same picture is exposure ${same.number} of this case already (${same.fileName}). Leave it out, or withdraw the other first.`,
    );
}
