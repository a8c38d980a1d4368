import { describe, expect, it } from 'vitest';
import { identify } from '#server/engine/identify.ts';
import type { Picture } from '#server/engine/outcome.ts';
import { farField } from '#shared/physics/far-field.ts';
import { coverage } from '#shared/physics/raster.ts';
import { detect } from '#shared/physics/detector.ts';
import { seededRandom } from '#shared/physics/random.ts';
import { exposureOf } from '#tests/engine/exposure.ts';

const n = 256;

/** Far field of any mask as a 12-bit picture; the mask's plane has n cells of 2 µm. */
function pictureOf(distance: (x: number, y: number) => number): Picture {
  const mask = coverage(distance, { n, spacing: 2e-6 });
  const { intensity } = farField(mask, { n, spacing: 2e-6 });
  const shown = intensity.map((value) => 0.9 * value + 1e-3);
  const codes = detect(
    shown,
    { fullWell: 12_000, readNoise: 5, bitDepth: 12, darkLevel: 64, encoding: 'linear' },
    seededRandom(4),
  );
  return { width: n, height: n, codes, fullScale: 4095, codeStep: 1, lossy: false };
}

const { setup } = exposureOf({ family: 'pinhole', values: { diameter: 100e-6 } });
/** One pixel is 1/(n · 2 µm) in spatial frequency. */
const its = { ...setup, distance: { value: (setup.pixelPitch.value * n * 2e-6) / 632.8e-9, u: 1e-4 } };

function verdictOn(distance: (x: number, y: number) => number): string {
  const outcome = identify(pictureOf(distance), its);
  return outcome.kind === 'answer' ? outcome.verdict : 'unusable';
}

describe('an opening that is in no catalogue', () => {
  it('shaped like the letter F is not named', () => {
    const box = (x: number, y: number, cx: number, cy: number, w: number, h: number) =>
      Math.max(Math.abs(x - cx) - w / 2, Math.abs(y - cy) - h / 2);
    const verdict = verdictOn((x, y) =>
      Math.min(
        box(x, y, -24e-6, 0, 16e-6, 100e-6),
        box(x, y, 5e-6, 42e-6, 74e-6, 16e-6),
        box(x, y, -2e-6, 6e-6, 60e-6, 16e-6),
      ),
    );
    expect(verdict).not.toBe('identified');
  });

  it('a disc with a chip broken off is not named', () => {
    const verdict = verdictOn((x, y) =>
      Math.max(Math.hypot(x, y) - 50e-6, 26e-6 - Math.hypot(x - 42e-6, y - 12e-6)),
    );
    expect(verdict).not.toBe('identified');
  });

  it('a disc alone, drawn the same way, is named', () => {
    expect(verdictOn((x, y) => Math.hypot(x, y) - 50e-6)).toBe('identified');
  });
});

describe('a picture taken too near', () => {
  it('is flagged, with the distance at which the far field would hold', () => {
    const { picture, setup: near } = exposureOf({
      family: 'pinhole',
      values: { diameter: 300e-6 },
      geometry: 'sensor',
      finestPeriod: 25,
    });
    const outcome = identify(picture, near);
    if (outcome.kind !== 'answer') throw new Error('unusable');
    // N = a²/(λL), 150 µm: Goodman, Introduction to Fourier Optics, 4.3.
    const expected = 150e-6 ** 2 / (632.8e-9 * near.distance.value);
    expect(expected).toBeGreaterThan(0.3);
    expect(outcome.farField.fresnelNumber! / expected).toBeCloseTo(1, 2);
    expect(outcome.farField.holds).toBe(false);
    expect(outcome.farField.distanceNeeded! / (150e-6 ** 2 / (632.8e-9 * 0.1))).toBeCloseTo(1, 2);
    expect(outcome.untold).toContain('near-field');
  });
});

describe('two shapes that the picture cannot part', () => {
  it('are both listed, or the right one is named: never the wrong one', () => {
    const { picture, setup: faint } = exposureOf({
      family: 'rectangle',
      values: { length: 151e-6, width: 149e-6 },
      fullWell: 400,
      orientation: 0.4,
    });
    const outcome = identify(picture, faint);
    if (outcome.kind !== 'answer') throw new Error('unusable');
    const listed = outcome.candidates.map((c) => c.family);
    expect(['square', 'rectangle']).toContain(listed[0]);
    if (outcome.verdict === 'ambiguous') expect(listed).toContain('rectangle');
  });
});
