import { setTimeout as sleep } from 'node:timers/promises';
import { hash } from '@node-rs/argon2';
import type { Actor } from '#server/actor.ts';
import { findLaboratory, insertLaboratory } from '#server/db/laboratory-store.ts';
import { demoBenches } from '#server/demo/demo-benches.ts';
import { demoCases, demoEmptyCase, type DemoCase } from '#server/demo/demo-cases.ts';
import { demoPassword, demoPeople } from '#server/demo/demo-people.ts';
import { demoPicture } from '#server/demo/demo-picture.ts';
import { readReferencePatterns } from '#server/demo/reference-patterns.ts';
import type { Deps } from '#server/deps.ts';
import { allBenches, createBench } from '#server/features/benches/service.ts';
import { beginCase, readCase } from '#server/features/cases/service.ts';
import { takeExposure } from '#server/features/exposures/service.ts';
import { identificationsOf } from '#server/features/identifications/service.ts';
import { decide, putForward } from '#server/features/matches/service.ts';
import { addWithin, findActor, hasPeople } from '#server/features/people/service.ts';
import { addReference, listLibrary } from '#server/features/references/service.ts';
import { Refusal } from '#server/http/refusal.ts';
import { caseDraftSchema, type Case } from '#shared/contracts/cases.ts';

/**
 * Loads the demo laboratory into an installation that is empty or whose first start was killed: every step looks first
 * whether it is done already. Needs the job queue at work, since the identifications are real ones.
 */
export async function loadDemo(deps: Deps, onBegin: () => void = () => undefined): Promise<void> {
  if (await findLaboratory(deps.db)) return;
  onBegin();
  await loadPeople(deps);
  const administrator = await requireActor(deps, demoPeople.administrator.id);
  const existing = new Set((await allBenches(deps, administrator)).map((bench) => bench.id));
  for (const { id, ...bench } of Object.values(demoBenches))
    if (!existing.has(id)) await createBench(deps, administrator, bench, id);
  await loadReferences(deps);
  for (const demo of demoCases) await loadCase(deps, demo);
  const { id, by, draft } = demoEmptyCase;
  const opener = await requireActor(deps, demoPeople[by].id);
  if (!(await findCase(deps, opener, id))) await beginCase(deps, opener, caseDraftSchema.parse(draft), id);
  for (const demo of demoCases) await finishCase(deps, demo);
  await insertLaboratory(deps.db, 'demo', deps.settings.laboratory, deps.clock());
}

async function loadPeople(deps: Deps): Promise<void> {
  if (await hasPeople(deps.db)) return;
  const passwordHash = await hash(demoPassword);
  await deps.db.transaction(async (tx) => {
    for (const person of Object.values(demoPeople))
      await addWithin(tx, deps, null, { ...person, roles: [...person.roles], passwordHash });
  });
}

async function loadReferences(deps: Deps): Promise<void> {
  const { total } = await listLibrary(deps, { page: 1, pageSize: 1 });
  if (total > 0) return;
  const patterns = await readReferencePatterns();
  await deps.db.transaction(async (tx) => {
    for (const { aperture, ...pattern } of patterns)
      await addReference(tx, {
        ...pattern,
        id: deps.newId(),
        origin: 'designed',
        family: aperture.family,
        values: aperture.values,
        state: 'approved',
        approvedBy: demoPeople.curator.id,
        approvedAt: deps.clock(),
      });
  });
}

async function loadCase(deps: Deps, demo: DemoCase): Promise<void> {
  const actor = await requireActor(deps, demoPeople[demo.by].id);
  const bench = demoBenches[demo.bench];
  const known =
    (await findCase(deps, actor, demo.id)) ??
    (await beginCase(deps, actor, caseDraftSchema.parse(demo.draft), demo.id));
  for (const { id, name, picture } of demo.exposures) {
    if (known.exposures.some((e) => e.id === id)) continue;
    const file = { name, bytes: demoPicture(picture, bench) };
    await takeExposure(deps, actor, demo.id, file, { benchId: bench.id, note: '' }, id);
  }
}

/** Waits for the identification and takes the case to where the scenario has it. */
async function finishCase(deps: Deps, demo: DemoCase): Promise<void> {
  const actor = await requireActor(deps, demoPeople[demo.by].id);
  const reviewer = await requireActor(deps, demoPeople.reviewer.id);
  const identification = await finished(deps, actor, demo.exposures[0].id);
  if (demo.ending === 'identified' || identification.outcome?.kind !== 'answer') return;
  const known = await readCase(deps, actor, demo.id);
  const match =
    known.matches.at(0) ??
    (await putForward(deps, actor, demo.id, {
      identificationId: identification.id,
      candidateIndex: 0,
      comment: 'One shape fits; the others break along the seam.',
    }));
  if (demo.ending === 'submitted' || match.state !== 'submitted') return;
  const confirm = demo.ending === 'confirmed';
  await decide(deps, reviewer, match.id, {
    decision: confirm ? 'confirm' : 'return',
    reason: confirm
      ? ''
      : 'Take a second exposure with the strip turned by 90°; the drawing is lost, so one picture is thin.',
    password: demoPassword,
  });
}

async function finished(deps: Deps, actor: Actor, exposureId: string) {
  for (;;) {
    const [newest] = await identificationsOf(deps, actor, exposureId);
    if (newest.state !== 'queued' && newest.state !== 'running') return newest;
    await sleep(100);
  }
}

async function findCase(deps: Deps, actor: Actor, id: string): Promise<Case | undefined> {
  try {
    return await readCase(deps, actor, id);
  } catch (error) {
    if (error instanceof Refusal && error.code === 'not-found-or-not-yours') return undefined;
    throw error;
  }
}

async function requireActor(deps: Deps, id: string): Promise<Actor> {
  const actor = await findActor(deps.db, id);
  if (!actor) throw new Error(`the demo person ${id} is missing`);
  return actor;
}
