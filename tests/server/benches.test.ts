import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { listAudit } from '#shared/contracts/audit.ts';
import { addBench, editBench, listBenches, type Bench } from '#shared/contracts/benches.ts';
import { openCase } from '#shared/contracts/cases.ts';
import { getExposure, uploadExposure } from '#shared/contracts/exposures.ts';
import type { Caller } from '#tests/support/caller.ts';
import { benchDraft, caseDraft, pinholePicture } from '#tests/support/specimens.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';

let app: TestApp;
let analyst: Caller;
let bench: Bench;
beforeAll(async () => {
  app = await createTestApp({ idle: true });
  analyst = await app.signInAs('analyst');
  bench = await analyst.call(addBench, { body: benchDraft });
});
afterAll(() => app.close());

const edit = (body: object, of: Bench = bench) => ({
  params: { benchId: of.id },
  body: { ...benchDraft, name: of.name, version: of.version, ...body },
});

describe('a bench', () => {
  it('keeps its values in metres exactly as they came, and says who made it', async () => {
    const { benches, can } = await analyst.call(listBenches);
    expect(can.add).toBe(true);
    expect(benches).toHaveLength(1);
    expect(benches[0]).toMatchObject({ ...benchDraft, version: 1, can: { edit: true } });
    expect(benches[0].createdBy.name).toBe('Tamsin Orrel');
  });

  it('is shown to a reviewer, who may not change it', async () => {
    const { benches, can } = await (await app.signInAs('reviewer')).call(listBenches);
    expect([can.add, benches[0].can.edit]).toEqual([false, false]);
  });

  it.each<[string, object, string]>([
    ['no name', { name: ' ' }, '#/name'],
    ['a negative wavelength', { wavelength: { value: -632.8e-9, u: 0 } }, '#/wavelength/value'],
    ['a wavelength of zero', { wavelength: { value: 0, u: 0 } }, '#/wavelength/value'],
    ['a wavelength typed in nanometres', { wavelength: { value: 632.8, u: 0 } }, '#/wavelength/value'],
    ['a negative distance', { distance: { value: -1, u: 0 } }, '#/distance/value'],
    [
      'a distance typed in millimetres beyond any laboratory',
      { distance: { value: 85000, u: 0 } },
      '#/distance/value',
    ],
    ['a distance as text', { distance: { value: '850 mm', u: 0 } }, '#/distance/value'],
    ['no distance', { distance: undefined }, '#/distance'],
    ['a pixel pitch of 5.2 metres', { pixelPitch: { value: 5.2, u: 0 } }, '#/pixelPitch/value'],
    ['a negative uncertainty', { distance: { value: 0.1, u: -0.001 } }, '#/distance/u'],
    ['an uncertainty as large as its value', { distance: { value: 0.1, u: 0.1 } }, '#/distance/u'],
    ['an unknown geometry', { geometry: 'mirror' }, '#/geometry'],
    ['an unknown encoding', { encoding: 'gamma' }, '#/encoding'],
    ['a camera of 9 bits', { bitDepth: 9 }, '#/bitDepth'],
    ['a negative dark level', { darkLevel: -1 }, '#/darkLevel'],
    ['a dark level above the largest code', { darkLevel: 4096 }, '#/darkLevel'],
    ['a mirror flag that is no flag', { mirrored: 'yes' }, '#/mirrored'],
  ])('with %s is refused at that field, new or changed', async (_, wrong, pointer) => {
    const added = await analyst.refused(addBench, 'invalid-input', {
      body: { ...benchDraft, name: 'X', ...wrong },
    });
    expect(added.errors?.map((e) => e.pointer)).toEqual([pointer]);
    expect(added.errors?.[0].detail).toMatch(/^[A-Z].*[.]$/);
    const changed = await analyst.refused(editBench, 'invalid-input', edit(wrong));
    expect(changed.errors?.map((e) => e.pointer)).toEqual([pointer]);
  });

  it('has a name of its own, also when two are made at the same moment', async () => {
    const taken = await analyst.refused(addBench, 'bench-name-taken', { body: benchDraft });
    expect(taken.errors?.[0].pointer).toBe('#/name');
    const body = { ...benchDraft, name: 'Made twice' };
    const answers = await Promise.all([1, 2].map(() => analyst.send(addBench, { body })));
    expect(answers.map((a) => a.status).sort()).toEqual([201, 409]);
    const other = await analyst.call(addBench, { body: { ...benchDraft, name: 'Another' } });
    await analyst.refused(editBench, 'bench-name-taken', edit({ name: benchDraft.name }, other));
  });

  it('takes a change only from whoever saw the newest version', async () => {
    const own = await analyst.call(addBench, { body: { ...benchDraft, name: 'Edited by two' } });
    const next = await analyst.call(editBench, edit({ note: 'Realigned.' }, own));
    expect(next).toMatchObject({ version: 2, note: 'Realigned.' });
    const stale = await analyst.refused(editBench, 'stale-edit', edit({ note: 'Lost.' }, own));
    expect(stale.detail).toContain('Edited by two');
  });

  it('that does not exist cannot be changed', async () => {
    await analyst.refused(editBench, 'not-found-or-not-yours', {
      ...edit({}),
      params: { benchId: '00000000-0000-4000-8000-00000000ffff' },
    });
  });

  it('leaves exposures the values they were taken with when it changes, and the audit trail both', async () => {
    const own = await analyst.call(addBench, { body: { ...benchDraft, name: 'Moved' } });
    const { id: caseId } = await analyst.call(openCase, { body: caseDraft });
    const { id: exposureId } = await analyst.call(uploadExposure, {
      params: { caseId },
      body: { benchId: own.id },
      file: pinholePicture(),
    });
    await analyst.call(editBench, edit({ distance: { value: 0.2, u: 0.0001 } }, own));
    const { bench: copy } = await analyst.call(getExposure, { params: { exposureId } });
    expect(copy).toMatchObject({ benchId: own.id, version: 1, name: 'Moved', distance: benchDraft.distance });
    const administrator = await app.signInAs('administrator');
    const { rows } = await administrator.call(listAudit, { query: { q: 'edit-bench' } });
    expect(rows[0].detail).toMatchObject({
      before: { distance: { value: 0.1 } },
      after: { distance: { value: 0.2 } },
    });
  });
});
