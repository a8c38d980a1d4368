import type { Database } from '#server/db/database.ts';
import type { Deps } from '#server/deps.ts';
import {
  insertReference,
  selectApproved,
  selectReferences,
  type NewReference,
} from '#server/features/references/store.ts';
import type { Candidate, NearReference } from '#shared/contracts/identifications.ts';
import type { Reference } from '#shared/contracts/references.ts';

/** References within this share of a candidate in every size count as near. */
const nearShare = 0.05;

export async function listLibrary(
  deps: Deps,
  query: { page: number; pageSize: number; family?: string | undefined },
) {
  const { page, pageSize, family } = query;
  const { total, rows } = await selectReferences(deps.db, family, pageSize, (page - 1) * pageSize);
  return {
    total,
    page,
    pageSize,
    rows: rows.map(({ family: id, values, approvedAt, ...row }): Reference => ({
      ...row,
      aperture: { family: id, values },
      approvedAt: approvedAt?.toISOString() ?? null,
    })),
  };
}

/** Approved references near to any of the candidates, nearest first, at most five. */
export async function nearReferences(
  db: Database,
  candidates: readonly Candidate[],
): Promise<NearReference[]> {
  const near: NearReference[] = [];
  for (const [index, candidate] of candidates.entries()) {
    for (const reference of await selectApproved(db, candidate.family)) {
      const compared = compare(candidate, reference.values);
      if (!compared || (compared.largestDifference > nearShare && !compared.agrees)) continue;
      near.push({
        referenceId: reference.id,
        number: reference.number,
        name: reference.name,
        candidate: index,
        ...compared,
      });
    }
  }
  return near
    .sort((a, b) => a.candidate - b.candidate || a.largestDifference - b.largestDifference)
    .slice(0, 5);
}

function compare(candidate: Candidate, values: Reference['aperture']['values']) {
  let largestDifference = 0;
  let agrees = true;
  for (const [key, reference] of Object.entries(values)) {
    const found = candidate.dimensions[key];
    if (!found || (found.value === null) !== (reference === null)) return undefined;
    if (found.value === null || reference === null) continue;
    const difference = Math.abs(found.value - reference);
    largestDifference = Math.max(largestDifference, difference / reference);
    // The reference is a designed one: its own uncertainty is not known, so the picture's alone decides.
    if (difference > 2 * found.u) agrees = false;
  }
  return { largestDifference, agrees };
}

export async function addReference(tx: Database, row: NewReference): Promise<void> {
  await insertReference(tx, row);
}
