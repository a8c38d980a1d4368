import type { z } from 'zod';
import type { Actor } from '#server/actor.ts';
import { record } from '#server/audit/audit.ts';
import type { Database } from '#server/db/database.ts';
import type { Deps } from '#server/deps.ts';
import { presentBench } from '#server/features/benches/present.ts';
import {
  findBench,
  insertBench,
  isNameTaken,
  lockBenches,
  selectBenches,
  updateBench,
} from '#server/features/benches/store.ts';
import { notFound, Refusal } from '#server/http/refusal.ts';
import {
  benchValuesSchema,
  type Bench,
  type benchDraftSchema,
  type BenchCopy,
  type editBench,
} from '#shared/contracts/benches.ts';

export async function allBenches(deps: Deps, actor: Actor): Promise<Bench[]> {
  return (await selectBenches(deps.db)).map((row) => presentBench(row, actor));
}

export async function createBench(
  deps: Deps,
  actor: Actor,
  input: z.output<typeof benchDraftSchema>,
  fixedId?: string,
): Promise<Bench> {
  return deps.db.transaction(async (tx) => {
    const id = fixedId ?? deps.newId();
    await lockBenches(tx);
    await requireFreeName(tx, input.name, id);
    const { name, note } = input;
    const values = benchValuesSchema.parse(input);
    await insertBench(tx, { id, name, note, values, createdBy: actor.id, createdAt: deps.clock() });
    await record(tx, actor, deps.clock(), 'add-bench', { kind: 'bench', id }, { name, values });
    return presentBench((await findBench(tx, id))!, actor);
  });
}

export async function changeBench(
  deps: Deps,
  actor: Actor,
  id: string,
  input: z.output<(typeof editBench)['body']>,
): Promise<Bench> {
  return deps.db.transaction(async (tx) => {
    await lockBenches(tx);
    const before = await findBench(tx, id);
    if (!before) throw notFound('bench');
    await requireFreeName(tx, input.name, id);
    const change = { name: input.name, note: input.note, values: benchValuesSchema.parse(input) };
    if (!(await updateBench(tx, id, input.version, change)))
      throw new Refusal(
        'stale-edit',
        `Somebody else changed ${before.name} meanwhile. Reload to see their values, then change again.`,
      );
    await record(
      tx,
      actor,
      deps.clock(),
      'edit-bench',
      { kind: 'bench', id },
      { before: before.values, after: change.values },
    );
    return presentBench((await findBench(tx, id))!, actor);
  });
}

/** The values an exposure keeps for ever. */
export async function copyBench(db: Database, id: string): Promise<BenchCopy | undefined> {
  const row = await findBench(db, id);
  return row && { ...row.values, benchId: row.id, name: row.name, version: row.version };
}

async function requireFreeName(tx: Database, name: string, exceptId: string): Promise<void> {
  if (await isNameTaken(tx, name, exceptId))
    throw new Refusal('bench-name-taken', `A bench called ${name} exists already. Choose another name.`, [
      { pointer: '#/name', detail: 'A bench of this name exists already. Choose another name.' },
    ]);
}
