import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { stageOf, leadingOf, type Front, type NewestMatch } from '#server/features/cases/stage.ts';
import { editCase, getCase, listCases, openCase, reopenCase, type Case } from '#shared/contracts/cases.ts';
import { decideMatch, submitMatch } from '#shared/contracts/matches.ts';
import { startIdentification } from '#shared/contracts/identifications.ts';
import { withdrawExposure } from '#shared/contracts/exposures.ts';
import { demoPassword } from '#server/demo/demo-people.ts';
import type { Caller } from '#tests/support/caller.ts';
import { caseDraft, identifiedCase } from '#tests/support/specimens.ts';
import { rememberingEngine } from '#tests/support/remembering-engine.ts';
import { createTestApp, until, type TestApp } from '#tests/support/test-app.ts';

let app: TestApp;
let analyst: Caller;
let reviewer: Caller;
beforeAll(async () => {
  app = await createTestApp({ engine: rememberingEngine() });
  analyst = await app.signInAs('analyst');
  reviewer = await app.signInAs('reviewer');
});
afterAll(() => app.close());

const um = 1e-6;
const drawing = {
  aperture: { family: 'slot', values: { length: 400 * um, width: 120 * um } },
  limits: { width: { lower: 118 * um, upper: 122 * um } },
};

const rowOf = async (caller: Caller, id: string) =>
  (await caller.call(listCases, { query: { pageSize: 200 } })).rows.find((row) => row.id === id)!;
const edit = (of: Case, body: object) => ({
  params: { caseId: of.id },
  body: { ...caseDraft, version: of.version, ...body },
});

describe('a case', () => {
  it('is opened with the next number, and keeps what the drawing says', async () => {
    const first = await analyst.call(openCase, {
      body: { ...caseDraft, drawing, lot: '9', specimen: '9-1' },
    });
    const second = await analyst.call(openCase, { body: caseDraft });
    expect(first.number).toMatch(/^FW-\d{4}$/);
    expect(Number(second.number.slice(3))).toBe(Number(first.number.slice(3)) + 1);
    expect(await analyst.call(getCase, { params: { caseId: first.id } })).toMatchObject({
      drawing,
      state: 'open',
      stage: 'no-exposure',
      version: 1,
      exposures: [],
      matches: [],
      can: { edit: true, upload: true, reopen: false },
    });
    expect((await reviewer.call(getCase, { params: { caseId: first.id } })).can).toEqual({
      edit: false,
      upload: false,
      reopen: false,
    });
  });

  it('has a number that no other has, when many are opened at the same moment', async () => {
    const opened = await Promise.all(
      Array.from({ length: 8 }, () => analyst.call(openCase, { body: caseDraft })),
    );
    expect(new Set(opened.map((c) => c.number)).size).toBe(8);
  });

  const slotOf = (values: object) => ({
    drawing: { ...drawing, limits: {}, aperture: { family: 'slot', values } },
  });
  it.each<[string, object, string]>([
    ['no title', { title: '  ' }, '#/title'],
    ['a title of 121 characters', { title: 'x'.repeat(121) }, '#/title'],
    ['a title of two lines', { title: 'a\nb' }, '#/title'],
    ['no part', { part: undefined }, '#/part'],
    ['a lot that is a number', { lot: 9 }, '#/lot'],
    [
      'a family that is not in the catalogue',
      { drawing: { aperture: { family: 'star', values: {} }, limits: {} } },
      '#/drawing/aperture/family',
    ],
    ['a size missing', slotOf({ length: 4e-4 }), '#/drawing/aperture/values/width'],
    ['a negative size', slotOf({ length: 4e-4, width: -1e-4 }), '#/drawing/aperture/values/width'],
    ['a size typed in micrometres', slotOf({ length: 400, width: 1e-4 }), '#/drawing/aperture/values/length'],
    [
      'a size that the family does not have',
      slotOf({ length: 4e-4, width: 1e-4, diameter: 1e-4 }),
      '#/drawing/aperture/values/diameter',
    ],
    [
      'limits the wrong way round',
      { drawing: { ...drawing, limits: { width: { lower: 122 * um, upper: 118 * um } } } },
      '#/drawing/limits/width',
    ],
    [
      'limits that leave the nominal size out',
      { drawing: { ...drawing, limits: { width: { lower: 121 * um, upper: 122 * um } } } },
      '#/drawing/limits/width',
    ],
    [
      'limits of a size without a nominal one',
      { drawing: { ...drawing, limits: { depth: { lower: 1e-6, upper: 2e-6 } } } },
      '#/drawing/limits/depth',
    ],
  ])('with %s is refused at that field', async (_, wrong, pointer) => {
    const before = (await analyst.call(listCases)).total;
    const { errors } = await analyst.refused(openCase, 'invalid-input', { body: { ...caseDraft, ...wrong } });
    expect(errors?.map((e) => e.pointer)).toEqual([pointer]);
    expect(errors?.[0].detail).toMatch(/^[A-Z].*[.]$/);
    expect((await analyst.call(listCases)).total).toBe(before);
  });

  it('is changed by whoever saw the newest version, and by nobody else', async () => {
    const opened = await analyst.call(openCase, { body: caseDraft });
    const changed = await analyst.call(editCase, edit(opened, { title: 'Named better', drawing }));
    expect(changed).toMatchObject({ title: 'Named better', version: 2, drawing });
    await analyst.refused(editCase, 'stale-edit', edit(opened, { title: 'Lost' }));
    expect((await analyst.call(getCase, { params: { caseId: opened.id } })).title).toBe('Named better');
  });

  it('takes one of two changes made at the same moment', async () => {
    const opened = await analyst.call(openCase, { body: caseDraft });
    const answers = await Promise.all(
      ['a', 'b'].map((title) => analyst.send(editCase, edit(opened, { title }))),
    );
    expect(answers.map((a) => a.status).sort()).toEqual([200, 409]);
  });
});

describe('the work list', () => {
  it('finds by number, title, part, lot and specimen, and takes wildcards as they are', async () => {
    const names = { title: 'Quartz orifice', part: 'Valve seat', lot: 'L-774', specimen: '50%_b' };
    const { id, number } = await analyst.call(openCase, { body: names });
    for (const q of [number, 'quartz', 'VALVE', '774', '50%_', ' orifice '])
      expect(
        (await analyst.call(listCases, { query: { q } })).rows.map((row) => row.id),
        q,
      ).toEqual([id]);
    for (const q of ['%', '_', "'", '\\'])
      for (const row of (await analyst.call(listCases, { query: { q } })).rows)
        expect(row.specimen).toContain(q);
    expect((await analyst.call(listCases, { query: { q: 'no such thing' } })).rows).toEqual([]);
  });

  it('comes in pages that together hold every case once', async () => {
    const { total } = await analyst.call(listCases);
    const seen = new Set<string>();
    for (let page = 1; (page - 1) * 3 < total; page++)
      for (const row of (await analyst.call(listCases, { query: { page, pageSize: 3 } })).rows)
        seen.add(row.id);
    expect(seen.size).toBe(total);
    expect((await analyst.call(listCases, { query: { page: 9999 } })).rows).toEqual([]);
  });
});

describe('the way of a case', () => {
  it('goes from no exposure to identified, in review, returned, identified anew, confirmed and reopened', async () => {
    const { caseId, exposure, identification } = await identifiedCase(analyst);
    const params = { caseId };
    const body = { identificationId: identification.id, candidateIndex: 0 };

    const identified = await rowOf(analyst, caseId);
    expect(identified).toMatchObject({
      stage: 'identified',
      exposureCount: 1,
      exposureId: exposure.id,
      waitsForYou: true,
    });
    expect(identified.leading.map((c) => c.family)).toEqual(['pinhole']);
    expect((await rowOf(reviewer, caseId)).waitsForYou).toBe(false);

    const match = await analyst.call(submitMatch, { params, body });
    expect(await rowOf(reviewer, caseId)).toMatchObject({
      state: 'in-review',
      stage: 'in-review',
      waitsForYou: true,
      matchId: match.id,
    });
    expect((await rowOf(analyst, caseId)).waitsForYou).toBe(false);
    const inReview = await analyst.call(getCase, { params });
    expect(inReview.can).toEqual({ edit: false, upload: false, reopen: false });
    expect((await analyst.refused(editCase, 'wrong-state', edit(inReview, { title: 'x' }))).detail).toContain(
      'under review',
    );
    await analyst.refused(startIdentification, 'wrong-state', { params: { exposureId: exposure.id } });
    await analyst.refused(withdrawExposure, 'wrong-state', {
      params: { exposureId: exposure.id },
      body: { reason: 'x' },
    });
    await analyst.refused(reopenCase, 'wrong-state', { params, body: { reason: 'x' } });

    const reason = 'Measure again with the strip turned.';
    await reviewer.call(decideMatch, {
      params: { matchId: match.id },
      body: { decision: 'return', reason, password: demoPassword },
    });
    expect(await rowOf(analyst, caseId)).toMatchObject({
      state: 'open',
      stage: 'returned',
      waitsForYou: true,
      cameBack: { by: { name: 'Maud Kestring' }, reason },
    });

    await analyst.call(startIdentification, { params: { exposureId: exposure.id } });
    const anew = await until(
      () => rowOf(analyst, caseId),
      (row) => row.stage !== 'running',
    );
    expect(anew).toMatchObject({ stage: 'identified', cameBack: null, waitsForYou: true });

    const second = await analyst.call(submitMatch, { params, body });
    expect(second.version).toBe(2);
    await reviewer.call(decideMatch, {
      params: { matchId: second.id },
      body: { decision: 'confirm', password: demoPassword },
    });
    expect(await rowOf(analyst, caseId)).toMatchObject({
      state: 'closed',
      stage: 'confirmed',
      waitsForYou: false,
    });
    const closed = await analyst.call(getCase, { params });
    expect(closed.can).toEqual({ edit: false, upload: false, reopen: true });
    expect((await analyst.refused(editCase, 'wrong-state', edit(closed, { title: 'x' }))).detail).toContain(
      'Reopen',
    );

    await analyst.refused(reopenCase, 'invalid-input', { params, body: { reason: '' } });
    const reopened = await analyst.call(reopenCase, {
      params,
      body: { reason: 'The specimen was another one.' },
    });
    expect(reopened).toMatchObject({ state: 'open', stage: 'identified', can: { edit: true, upload: true } });
    await analyst.refused(reopenCase, 'wrong-state', { params, body: { reason: 'Again' } });
  });

  it('stands without exposure again when the only one is withdrawn', async () => {
    const { caseId, exposure } = await identifiedCase(analyst);
    await analyst.call(withdrawExposure, {
      params: { exposureId: exposure.id },
      body: { reason: 'Wrong specimen.' },
    });
    expect(await rowOf(analyst, caseId)).toMatchObject({
      stage: 'no-exposure',
      exposureCount: 0,
      exposureId: null,
      leading: [],
    });
  });
});

describe('the stage', () => {
  const at = (minute: number) => new Date(Date.UTC(2026, 0, 1, 12, minute));
  const front = (more: Partial<Front>) => ({ state: 'done', queuedAt: at(0), ...more }) as Front;
  const match = (state: string, decided?: Date) => ({ state, decidedAt: decided ?? null }) as NewestMatch;
  const answer = (verdict: string, ...probabilities: number[]) =>
    ({
      kind: 'answer',
      verdict,
      candidates: probabilities.map((probability) => ({ probability })),
    }) as Front['outcome'];

  it.each([
    ['no exposure', 'open', undefined, undefined, 'no-exposure'],
    ['a queued run', 'open', front({ state: 'queued' }), undefined, 'running'],
    ['a running run', 'open', front({ state: 'running' }), undefined, 'running'],
    ['a failed run', 'open', front({ state: 'failed' }), undefined, 'failed'],
    ['a cancelled run', 'open', front({ state: 'cancelled' }), undefined, 'failed'],
    ['an exposure without any run', 'open', front({ state: null }), undefined, 'failed'],
    ['an ambiguous answer', 'open', front({ outcome: answer('ambiguous') }), undefined, 'ambiguous'],
    ['an unidentified answer', 'open', front({ outcome: answer('unidentified') }), undefined, 'unidentified'],
    [
      'a submitted match',
      'in-review',
      front({ outcome: answer('identified') }),
      match('submitted'),
      'in-review',
    ],
    [
      'a rejected match',
      'open',
      front({ outcome: answer('identified') }),
      match('rejected', at(5)),
      'rejected',
    ],
    [
      'a run begun after the return',
      'open',
      front({ state: 'running', queuedAt: at(9) }),
      match('returned', at(5)),
      'running',
    ],
    [
      'an answer after the return',
      'open',
      front({ queuedAt: at(9), outcome: answer('ambiguous') }),
      match('returned', at(5)),
      'ambiguous',
    ],
    [
      'a confirmed match',
      'closed',
      front({ outcome: answer('identified') }),
      match('confirmed', at(5)),
      'confirmed',
    ],
    [
      'a confirmed match of a reopened case',
      'open',
      front({ outcome: answer('identified') }),
      match('confirmed', at(5)),
      'identified',
    ],
  ] as const)('with %s is right', (_, state, f, m, expected) => {
    expect(stageOf(state, f, m)).toBe(expected);
  });

  it('of an ambiguous answer leads with the candidates that cannot be told apart, at most three', () => {
    const leading = (...p: number[]) =>
      leadingOf('ambiguous', front({ outcome: answer('ambiguous', ...p) }), undefined).length;
    expect(leading(0.7, 0.3)).toBe(2);
    expect(leading(0.8, 0.2, 1e-9)).toBe(2);
    expect(leading(0.4, 0.3, 0.2, 0.1)).toBe(3);
  });
});
