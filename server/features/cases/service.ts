import type { z } from 'zod';
import type { Actor } from '#server/actor.ts';
import { record } from '#server/audit/audit.ts';
import type { Database } from '#server/db/database.ts';
import type { Deps } from '#server/deps.ts';
import { presentBase, presentRow } from '#server/features/cases/present.ts';
import { stageOf } from '#server/features/cases/stage.ts';
import {
  findCase,
  insertCase,
  nextSerial,
  selectCases,
  selectFronts,
  selectNewestMatches,
  updateCase,
  type CaseRecord,
} from '#server/features/cases/store.ts';
import { exposuresOfCase } from '#server/features/exposures/service.ts';
import { matchesOfCase } from '#server/features/matches/service.ts';
import { notFound, Refusal } from '#server/http/refusal.ts';
import type { Case, caseDraftSchema, editCase, listCases } from '#shared/contracts/cases.ts';
import { permits } from '#shared/permissions.ts';

export async function workList(deps: Deps, actor: Actor, query: z.output<(typeof listCases)['query']>) {
  const { page, pageSize, q, state } = query;
  const { total, rows } = await selectCases(deps.db, { q, state }, pageSize, (page - 1) * pageSize);
  const ids = rows.map((row) => row.case.id);
  const fronts = new Map((await selectFronts(deps.db, ids)).map((f) => [f.caseId, f]));
  const newest = new Map((await selectNewestMatches(deps.db, ids)).map((m) => [m.caseId, m]));
  return {
    total,
    page,
    pageSize,
    rows: rows.map((row) => presentRow(row, fronts.get(row.case.id), newest.get(row.case.id), actor)),
  };
}

export async function beginCase(
  deps: Deps,
  actor: Actor,
  input: z.output<typeof caseDraftSchema>,
  fixedId?: string,
): Promise<Case> {
  const id = fixedId ?? deps.newId();
  await deps.db.transaction(async (tx) => {
    const serial = await nextSerial(tx);
    const at = deps.clock();
    const number = `FW-${String(serial).padStart(4, '0')}`;
    await insertCase(tx, {
      ...input,
      id,
      serial,
      number,
      state: 'open',
      createdBy: actor.id,
      createdAt: at,
      updatedAt: at,
    });
    await record(tx, actor, at, 'open-case', { kind: 'case', id }, { number, title: input.title });
  });
  return readCase(deps, actor, id);
}

export async function readCase(deps: Deps, actor: Actor, id: string): Promise<Case> {
  const row = await requireCase(deps.db, id);
  const [front] = await selectFronts(deps.db, [id]);
  const [match] = await selectNewestMatches(deps.db, [id]);
  const open = row.case.state === 'open';
  const edits = permits(actor.roles, 'edit-cases');
  return {
    ...presentBase(row),
    stage: stageOf(row.case.state, front, match),
    exposures: await exposuresOfCase(deps, actor, id),
    matches: await matchesOfCase(deps, actor, id),
    can: {
      edit: edits && open,
      upload: open && permits(actor.roles, 'upload-exposures'),
      reopen: edits && row.case.state === 'closed',
    },
  };
}

export async function changeCase(
  deps: Deps,
  actor: Actor,
  id: string,
  input: z.output<(typeof editCase)['body']>,
): Promise<Case> {
  await deps.db.transaction(async (tx) => {
    const row = await requireCase(tx, id);
    if (row.case.state !== 'open')
      throw new Refusal(
        'wrong-state',
        row.case.state === 'in-review'
          ? `${row.case.number} is under review and stays as it is until the decision.`
          : `${row.case.number} is closed and stays as it is. Reopen it first.`,
      );
    const { version, ...change } = input;
    const at = deps.clock();
    if (!(await updateCase(tx, id, { state: 'open', version }, { ...change, updatedAt: at })))
      throw new Refusal(
        'stale-edit',
        `Somebody else changed ${row.case.number} meanwhile. Copy what you typed, reload to see their values, then change again.`,
      );
    await record(tx, actor, at, 'edit-case', { kind: 'case', id }, { after: change });
  });
  return readCase(deps, actor, id);
}

export async function reopen(deps: Deps, actor: Actor, id: string, reason: string): Promise<Case> {
  await deps.db.transaction(async (tx) => {
    const row = await requireCase(tx, id);
    if (row.case.state !== 'closed')
      throw new Refusal('wrong-state', `${row.case.number} is not closed, so there is nothing to reopen.`);
    const at = deps.clock();
    const { version } = row.case;
    if (!(await updateCase(tx, id, { state: 'closed', version }, { state: 'open', updatedAt: at })))
      throw new Refusal('stale-edit', `Somebody else changed ${row.case.number} meanwhile. Reload it.`);
    await record(tx, actor, at, 'reopen-case', { kind: 'case', id }, { reason });
  });
  return readCase(deps, actor, id);
}

async function requireCase(db: Database, id: string): Promise<NonNullable<CaseRecord>> {
  const row = await findCase(db, id);
  if (!row) throw notFound('case');
  return row;
}
