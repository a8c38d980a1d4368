import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { allJobs } from '#server/app.ts';
import { demoPicture } from '#server/demo/demo-picture.ts';
import { demoPeople } from '#server/demo/demo-people.ts';
import { addReference } from '#server/features/references/service.ts';
import { Refusal } from '#server/http/refusal.ts';
import { createQueue } from '#server/jobs/queue.ts';
import { inlineEngine } from '#server/workers/inline-engine.ts';
import { addBench } from '#shared/contracts/benches.ts';
import { openCase } from '#shared/contracts/cases.ts';
import { uploadExposure, withdrawExposure } from '#shared/contracts/exposures.ts';
import {
  cancelIdentification,
  getIdentification,
  listIdentifications,
  startIdentification,
  type Identification,
} from '#shared/contracts/identifications.ts';
import { submitMatch } from '#shared/contracts/matches.ts';
import type { Caller } from '#tests/support/caller.ts';
import { scriptedEngine } from '#tests/support/scripted-engine.ts';
import { benchDraft, caseDraft, identifiedCase, pinholePicture } from '#tests/support/specimens.ts';
import { createTestApp, until, type TestApp } from '#tests/support/test-app.ts';

const noSuchId = '7b0c2f2e-43f0-4b7c-9e1f-0f6c1f3c9a10';
let seeds = 100;

/** Uploads a picture into a case of its own; its first identification is queued. */
async function taken(analyst: Caller, file = pinholePicture(++seeds)) {
  const bench = await analyst.call(addBench, { body: { ...benchDraft, name: `Bench ${++seeds}` } });
  const { id: caseId } = await analyst.call(openCase, { body: caseDraft });
  const exposure = await analyst.call(uploadExposure, {
    params: { caseId },
    body: { benchId: bench.id },
    file,
  });
  const identificationId = exposure.latest!.identificationId;
  const params = { identificationId };
  return { caseId, exposureId: exposure.id, params, read: () => analyst.call(getIdentification, { params }) };
}

const ended = ({ state }: Identification) => !['queued', 'running'].includes(state);
const inState = (state: Identification['state']) => (now: Identification) => now.state === state;

describe('an identification of a real picture', () => {
  let test: TestApp;
  let analyst: Caller;
  beforeAll(async () => {
    test = await createTestApp();
    analyst = await test.signInAs('analyst');
  });
  afterAll(() => test.close());

  it('starts with the upload and ends with the size within its expanded uncertainty', async () => {
    const { identification } = await identifiedCase(analyst);
    expect(identification).toMatchObject({ run: 1, state: 'done', progress: { share: 1 }, problem: null });
    expect(identification.can).toEqual({ cancel: false, submit: true });
    const { outcome } = identification;
    if (outcome?.kind !== 'answer') throw new Error('no answer');
    expect(outcome.verdict).toBe('identified');
    const [best] = outcome.candidates;
    const { value, u } = best.dimensions['diameter'];
    expect(best.family).toBe('pinhole');
    expect(Math.abs(value! - 0.6e-3)).toBeLessThan(2 * u);
  });

  it('can be run again, and the list has the newest first', async () => {
    const { exposure, identification } = await identifiedCase(analyst);
    const params = { exposureId: exposure.id };
    const again = await analyst.call(startIdentification, { params });
    expect(again).toMatchObject({ run: 2, state: expect.stringMatching(/queued|running|done/) });
    const { identifications } = await until(
      () => analyst.call(listIdentifications, { params }),
      ({ identifications: [newest] }) => ended(newest),
    );
    expect(identifications.map((i) => i.run)).toEqual([2, 1]);
    // The same picture and set-up give the same outcome.
    expect(identifications[0].outcome).toEqual(identification.outcome);
  });

  it('names approved references of the family whose sizes are near', async () => {
    const reference = (number: string, diameter: number, state: 'approved' | 'draft') => ({
      id: test.deps.newId(),
      number,
      name: `Pinhole ${number}`,
      origin: 'designed' as const,
      family: 'pinhole',
      values: { diameter },
      note: '',
      state,
      approvedBy: demoPeople.curator.id,
      approvedAt: new Date(),
    });
    for (const [number, diameter, state] of [
      ['PH-101', 0.6e-3, 'approved'],
      ['PH-102', 0.62e-3, 'approved'],
      ['PH-103', 0.7e-3, 'approved'],
      ['PH-104', 0.6e-3, 'draft'],
    ] as const)
      await addReference(test.deps.db, reference(number, diameter, state));
    const { identification } = await identifiedCase(analyst);
    expect(identification.nearReferences.map(({ number, agrees }) => [number, agrees])).toEqual([
      ['PH-101', true],
      ['PH-102', false],
    ]);
    expect(identification.nearReferences[1].largestDifference).toBeCloseTo(0.02 / 0.62, 2);
  });

  it.each([
    ['with fringes finer than 3.5 pixels', { diameter: 4.6e-3, peak: 40 }, /finer than 3.5 pixels/],
    ['without a dark fringe in the frame', { diameter: 0.03e-3, peak: 0.9 }, /Not a single dark fringe/],
  ])('of a picture %s fails with the mend', async (_, { diameter, peak }, says) => {
    const bytes = demoPicture(
      {
        opening: { family: 'pinhole', values: { diameter } },
        orientation: 0,
        width: 200,
        height: 180,
        center: { x: 98.4, y: 91.7 },
        peak,
        seed: ++seeds,
      },
      benchDraft,
    );
    const { read } = await taken(analyst, { name: 'a.png', bytes });
    const failed = await until(read, ended);
    expect(failed).toMatchObject({ state: 'failed', outcome: null, problem: { code: 'picture-unusable' } });
    expect(failed.problem?.detail).toMatch(says);
    expect(failed.problem?.detail).toMatch(/photograph it again/);
  });

  it('is not started in a withdrawn exposure', async () => {
    const { exposure } = await identifiedCase(analyst);
    const params = { exposureId: exposure.id };
    await analyst.call(withdrawExposure, { params, body: { reason: 'Out of focus' } });
    await analyst.refused(startIdentification, 'wrong-state', { params });
  });

  it('is not started, nor an exposure taken, while the case is under review', async () => {
    const { caseId, exposure, identification } = await identifiedCase(analyst);
    await analyst.call(submitMatch, {
      params: { caseId },
      body: { identificationId: identification.id, candidateIndex: 0 },
    });
    await analyst.refused(startIdentification, 'wrong-state', { params: { exposureId: exposure.id } });
    const problem = await analyst.refused(uploadExposure, 'wrong-state', {
      params: { caseId },
      body: { benchId: exposure.bench.benchId },
      file: pinholePicture(++seeds),
    });
    expect(problem.detail).toMatch(/under review/);
  });

  it('that does not exist is not found', async () => {
    const exposure = { params: { exposureId: noSuchId } };
    const identification = { params: { identificationId: noSuchId } };
    await analyst.refused(startIdentification, 'not-found-or-not-yours', exposure);
    await analyst.refused(listIdentifications, 'not-found-or-not-yours', exposure);
    await analyst.refused(getIdentification, 'not-found-or-not-yours', identification);
    await analyst.refused(cancelIdentification, 'not-found-or-not-yours', identification);
  });

  it('may be read by a reviewer, not cancelled', async () => {
    const { identification } = await identifiedCase(analyst);
    const reviewer = await test.signInAs('reviewer');
    const params = { identificationId: identification.id };
    const read = await reviewer.call(getIdentification, { params });
    expect(read.can).toEqual({ cancel: false, submit: false });
    await reviewer.refused(cancelIdentification, 'not-permitted', { params });
  });
});

describe('an identification under way', () => {
  const { engine, nextRun } = scriptedEngine();
  let test: TestApp;
  let analyst: Caller;
  beforeAll(async () => {
    test = await createTestApp({ engine });
    analyst = await test.signInAs('analyst');
  });
  afterAll(() => test.close());

  it('tells how far it is, and never falls back', async () => {
    const { read } = await taken(analyst);
    const run = await nextRun();
    const seen: number[] = [];
    for (const share of [0.2, 0.5, 0.4, 0.1, 0.7]) {
      // Progress is written at most every 300 ms.
      await sleep(310);
      run.tell('Comparing', share);
      seen.push((await until(read, (now) => now.progress.step === 'Comparing')).progress.share);
    }
    run.finish();
    const done = await until(read, inState('done'));
    expect(done.progress).toEqual({ share: 1, step: 'Done' });
    expect(seen).toEqual([...seen].sort((a, b) => a - b));
    expect(seen.at(-1)).toBeGreaterThan(0.19);
  });

  it('is the only one of its exposure', async () => {
    const { exposureId, read } = await taken(analyst);
    const run = await nextRun();
    await analyst.refused(startIdentification, 'identification-running', { params: { exposureId } });
    run.finish();
    await until(read, inState('done'));
  });

  it('can be cancelled: the engine is stopped, and the exposure may be run again', async () => {
    const { exposureId, params, read } = await taken(analyst);
    const run = await nextRun();
    expect((await read()).can.cancel).toBe(true);
    const cancelled = await analyst.call(cancelIdentification, { params });
    expect(cancelled).toMatchObject({ state: 'cancelled', outcome: null, problem: null });
    expect(run.signal.aborted).toBe(true);
    await analyst.refused(cancelIdentification, 'wrong-state', { params });
    const again = await analyst.call(startIdentification, { params: { exposureId } });
    expect(again.run).toBe(2);
    (await nextRun()).finish();
    await until(
      () => analyst.call(getIdentification, { params: { identificationId: again.id } }),
      inState('done'),
    );
    expect((await read()).state).toBe('cancelled');
  });

  it('survives one fault and is told after the second', async () => {
    const passing = await taken(analyst);
    (await nextRun()).break(new Error('a thread ended'));
    (await nextRun()).finish();
    expect((await until(passing.read, ended)).state).toBe('done');
    const lasting = await taken(analyst);
    (await nextRun()).break(new Error('a thread ended'));
    (await nextRun()).break(new Error('a thread ended'));
    const failed = await until(lasting.read, ended);
    expect(failed).toMatchObject({ state: 'failed', problem: { code: 'identification-crashed' } });
    expect(failed.problem?.detail).toMatch(/Run it again/);
    expect(failed.problem?.detail).not.toMatch(/thread/);
  });

  it('ends with the problem when the engine refuses', async () => {
    const { read } = await taken(analyst);
    (await nextRun()).break(new Refusal('picture-damaged', 'The picture file is damaged.'));
    expect(await until(read, ended)).toMatchObject({
      state: 'failed',
      problem: { code: 'picture-damaged', detail: 'The picture file is damaged.' },
    });
  });

  it('ends with the mend when the engine finds no centre', async () => {
    const { read } = await taken(analyst);
    const picture = { saturatedShare: 0, maskedShare: 0, center: null, noise: null };
    (await nextRun()).end({ kind: 'unusable', reasons: ['no-center'], picture });
    const failed = await until(read, ended);
    expect(failed).toMatchObject({ state: 'failed', outcome: null, problem: { code: 'picture-unusable' } });
    expect(failed.problem?.detail).toMatch(/No centre was found.*photograph it again/);
  });

  it('is not done twice when its job comes a second time', async () => {
    const { params, read } = await taken(analyst);
    (await nextRun()).finish();
    const done = await until(read, inState('done'));
    await test.deps.jobs.send(test.deps.db, 'identify-exposure', params);
    const other = await taken(analyst);
    (await nextRun()).finish();
    await until(other.read, inState('done'));
    expect(await read()).toEqual(done);
  });

  it('of a process that is gone is taken up by the next start, and a late answer changes nothing', async () => {
    const { read } = await taken(analyst);
    const lost = await nextRun();
    const queue = await createQueue(test.client.pool, test.deps.log);
    await queue.start(allJobs({ ...test.deps, jobs: queue, engine: inlineEngine() }));
    const done = await until(read, ended);
    expect(done.state).toBe('done');
    lost.break(new Error('too late'));
    await sleep(50);
    expect(await read()).toEqual(done);
    await queue.stop();
  });
});
