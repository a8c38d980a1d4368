import { describe, expect, it } from 'vitest';
import { identify } from '#server/engine/identify.ts';
import type { Outcome } from '#server/engine/outcome.ts';
import { families } from '#shared/apertures/registry.ts';
import { exposureOf, turnBetween, type ExposureSpec } from '#tests/engine/exposure.ts';

type Answer = Extract<Outcome, { kind: 'answer' }>;

function answerTo(spec: ExposureSpec): Answer {
  const { picture, setup } = exposureOf(spec);
  const outcome = identify(picture, setup);
  if (outcome.kind !== 'answer') throw new Error(`unusable: ${outcome.reasons.join(', ')}`);
  return outcome;
}

/** The opening is named, and every dimension and the direction lie within four standard uncertainties of the image part. */
function expectRight(spec: ExposureSpec, allowance = 4): Answer {
  const answer = answerTo(spec);
  const best = answer.candidates[0];
  expect(`${answer.verdict} ${best.family}`).toBe(`identified ${spec.family}`);
  for (const [key, value] of Object.entries(spec.values)) {
    const found = best.dimensions[key];
    if (value === null) {
      expect(found.value).toBeNull();
      continue;
    }
    expect(found.uImage).toBeGreaterThan(0);
    expect(Math.abs(found.value! - value) / found.uImage).toBeLessThan(allowance);
    expect(found.u).toBeGreaterThan(found.uSetup);
  }
  if (best.orientation) {
    const off = turnBetween(best.orientation.value, spec.orientation ?? 0, best.orientationPeriod!);
    expect(off / best.orientation.u).toBeLessThan(allowance);
    expect(best.orientation.value).toBeGreaterThanOrEqual(0);
    expect(best.orientation.value).toBeLessThan(best.orientationPeriod!);
  }
  return answer;
}

describe.each(families.map((f) => [f.id, f] as const))('an exposure of a %s', (id, family) => {
  it.each(family.examples.map((values, i) => [i + 1, values] as const))(
    'is named with dimensions within their stated uncertainty (example %i)',
    (i, values) => {
      expectRight({ family: id, values, orientation: 0.35 + 0.9 * i, seed: 10 + i });
    },
  );
});

describe('an everyday exposure', () => {
  const slot: ExposureSpec = {
    family: 'slot',
    values: { length: 150e-6, width: 60e-6 },
    orientation: 2.2,
    seed: 5,
  };

  let known: Answer | undefined;
  const plain = () => (known ??= answerTo(slot));

  it('with a saturated core is measured from its flanks', () => {
    const answer = expectRight({ ...slot, exposure: 6 });
    expect(answer.picture.saturatedShare).toBeGreaterThan(0.005);
  });

  it('far off centre is found where it is', () => {
    const answer = expectRight({ ...slot, center: { x: 65.4, y: 140.8 } });
    expect(answer.picture.center!.x).toBeCloseTo(65.4, 1);
    expect(answer.picture.center!.y).toBeCloseTo(140.8, 1);
  });

  it('over a sloping background keeps its size', () => {
    expectRight({ ...slot, background: 0.02, slopeX: 5e-5 });
  });

  it('that is blurred keeps its size', () => {
    const answer = expectRight({ ...slot, blurVariance: 1.2 });
    expect(answer.candidates[0].fit.blurVariance).toBeCloseTo(1.2, 0);
  });

  it('in 8 bits of sRGB is measured to a thousandth', () => {
    const answer = answerTo({ ...slot, bitDepth: 8, encoding: 'srgb' });
    const best = answer.candidates[0];
    expect(best.family).toBe('slot');
    expect(Math.abs(best.dimensions['length'].value! / 150e-6 - 1)).toBeLessThan(1e-3);
    expect(Math.abs(best.dimensions['width'].value! / 60e-6 - 1)).toBeLessThan(1e-3);
    expect(answer.untold).toContain('unknown-response');
  });

  it('on a sensor or a screen counts exact direction cosines', () => {
    const steep: ExposureSpec = { family: 'pinhole', values: { diameter: 9e-6 }, finestPeriod: 20, seed: 8 };
    for (const geometry of ['sensor', 'screen'] as const) {
      // λL/(9 µm · pitch) = 20 px makes L = 1.5 mm: the corner of the picture is 28° off the axis.
      const answer = expectRight({ ...steep, geometry });
      expect(answer.farField.holds).toBe(true);
    }
  });

  it('is answered the same way twice', () => {
    expect(answerTo(slot)).toEqual(plain());
  });

  it('states the part of the set-up: sizes scale with λL/p', () => {
    const best = plain().candidates[0];
    const relative = Math.hypot(0.1 / 632.8, 1e-3, 5e-9 / 5.2e-6);
    expect(best.dimensions['length'].uSetup / best.dimensions['length'].value!).toBeCloseTo(relative, 9);
  });

  it('shares its probability with "none of these"', () => {
    const sum = plain().candidates.reduce((total, c) => total + c.probability, 0);
    expect(sum).toBeGreaterThan(0.9);
    expect(sum).toBeLessThan(1);
  });
});
