import type { Actor } from '#server/actor.ts';
import type { BenchRow } from '#server/features/benches/store.ts';
import type { Bench } from '#shared/contracts/benches.ts';
import { permits } from '#shared/permissions.ts';

export function presentBench(row: BenchRow, actor: Actor): Bench {
  const { id, name, note, version, createdBy } = row;
  return {
    ...row.values,
    id,
    name,
    note,
    version,
    createdBy,
    createdAt: row.createdAt.toISOString(),
    can: { edit: permits(actor.roles, 'edit-benches') },
  };
}
