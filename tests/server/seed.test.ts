import { readdir, readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoAccounts } from '#server/demo/demo-people.ts';
import { loadDemo } from '#server/demo/load-demo.ts';
import { readReferencePatterns } from '#server/demo/reference-patterns.ts';
import type { Deps } from '#server/deps.ts';
import { listBenches } from '#shared/contracts/benches.ts';
import { listCases } from '#shared/contracts/cases.ts';
import { listIdentifications } from '#shared/contracts/identifications.ts';
import { listReferences } from '#shared/contracts/references.ts';
import { getSession, signIn } from '#shared/contracts/session.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';

describe('the demo laboratory', () => {
  let test: TestApp;

  /** Loads until something breaks, as a killed process would. */
  async function brokenOff(broken: Partial<Deps>): Promise<void> {
    await expect(loadDemo({ ...test.deps, ...broken })).rejects.toThrow('killed');
  }

  beforeAll(async () => {
    test = await createTestApp({ people: false, settings: { demo: true } });
    const { storage } = test.deps;
    for (const last of [1, 4, 4]) {
      let stored = 0;
      const put = (bytes: Uint8Array) =>
        ++stored === last ? Promise.reject(new Error('killed')) : storage.put(bytes);
      await brokenOff({ storage: { ...storage, put } });
    }
    // A match that is about to be put forward, then a decision that is about to be signed.
    for (const last of [4, 2]) {
      let made = 0;
      const newId = () => {
        if (++made === last) throw new Error('killed');
        return test.deps.newId();
      };
      await brokenOff({ newId });
    }
    await loadDemo(test.deps);
  }, 120_000);
  afterAll(() => test.close());

  it('is whole after starts that broke off: every case in its state, each once, with a real answer', async () => {
    const analyst = await test.signInAs('analyst');
    const { rows } = await analyst.call(listCases, {});
    const stages = Object.fromEntries(rows.map((row) => [row.title, row.stage]));
    expect(stages).toEqual({
      'Which way round was the slot cut?': 'identified',
      'Restrictor hole, drilled or punched?': 'in-review',
      'Slit jaws after cleaning': 'confirmed',
      'Encoder window out of a worn strip': 'returned',
      'Alignment pinhole without a label': 'identified',
      'Double slit from the teaching store': 'identified',
      'Slot or ellipse? Faint pattern': 'ambiguous',
      'Drill broke through twice?': 'unidentified',
      'Stencil opening, corner suspected round': 'no-exposure',
    });
    expect(rows).toHaveLength(Object.keys(stages).length);
    for (const row of rows.filter(({ exposureId }) => exposureId !== null)) {
      const { identifications } = await analyst.call(listIdentifications, {
        params: { exposureId: row.exposureId! },
      });
      expect(identifications.map((i) => i.state)).toEqual(['done']);
    }
  });

  it('finds the openings that its pictures were made of', async () => {
    const analyst = await test.signInAs('analyst');
    const { rows } = await analyst.call(listCases, { query: { q: 'slot cut' } });
    const [best] = rows[0].leading;
    expect(best.family).toBe('slot');
    for (const [key, made] of [
      ['length', 213.1e-6],
      ['width', 83.4e-6],
    ] as const) {
      const { value, u } = best.dimensions[key];
      expect(Math.abs(value! - made)).toBeLessThan(2 * u);
    }
    const turned = (27.3 * Math.PI) / 180;
    expect(Math.abs(best.orientation!.value - turned)).toBeLessThan(2 * best.orientation!.u);
  });

  it('has benches of all three geometries and the approved references of reference-patterns', async () => {
    const curator = await test.signInAs('curator');
    const { benches } = await curator.call(listBenches, {});
    expect(benches.map((bench) => bench.geometry).sort()).toEqual(['lens', 'screen', 'sensor']);
    const { rows, total } = await curator.call(listReferences, { query: { pageSize: 100 } });
    expect(total).toBe((await readReferencePatterns()).length);
    expect(new Set(rows.map((row) => row.state))).toEqual(new Set(['approved']));
  });

  it('lets each of its accounts in, and every role is among them', async () => {
    const roles = new Set<string>();
    for (const { email, password } of demoAccounts()) {
      const caller = test.anonymous();
      await caller.call(signIn, { body: { email, password } });
      const { person } = await caller.call(getSession);
      for (const role of person!.roles) roles.add(role);
    }
    expect([...roles].sort()).toEqual(['administrator', 'analyst', 'curator', 'reviewer']);
  });

  it('is loaded once', async () => {
    let begun = false;
    await loadDemo(test.deps, () => (begun = true));
    expect(begun).toBe(false);
  });
});

describe('the reference patterns', () => {
  it('are all in the manifest, keep the contract and are one of a kind', async () => {
    const files = (await readdir('reference-patterns', { recursive: true })).filter(
      (name) => name.endsWith('.json') && name !== 'manifest.json',
    );
    const manifest: unknown = JSON.parse(await readFile(join('reference-patterns', 'manifest.json'), 'utf8'));
    expect((manifest as { patterns: string[] }).patterns.toSorted()).toEqual(files.toSorted());
    const patterns = await readReferencePatterns();
    for (const unique of [patterns.map((p) => p.number), patterns.map((p) => JSON.stringify(p.aperture))])
      expect(new Set(unique).size).toBe(patterns.length);
    expect(new Set(patterns.map((p) => p.aperture.family)).size).toBe(7);
  });
});
