import { describe, expect, it } from 'vitest';
import { farField } from '#shared/physics/far-field.ts';
import { fft2InPlace } from '#shared/physics/fft.ts';
import { spatialFrequency } from '#shared/physics/geometry.ts';
import { coordinate, originIndex, transformSpacing } from '#shared/physics/grid.ts';
import { seededRandom } from '#shared/physics/random.ts';
import { coverage } from '#shared/physics/raster.ts';
import { farFieldDistance, fresnelLimit, fresnelNumber, pixelsPerFringe } from '#shared/physics/sampling.ts';

function noise(n: number, seed: number): Float64Array {
  const random = seededRandom(seed);
  return Float64Array.from({ length: n }, () => random() - 0.5);
}

/** The definition, term by term: Σ x exp(∓2πi(jq/rows + ip/columns)). */
function directSum(real: Float64Array, imaginary: Float64Array, rows: number, columns: number) {
  const re = new Float64Array(rows * columns);
  const im = new Float64Array(rows * columns);
  for (let q = 0; q < rows; q++)
    for (let p = 0; p < columns; p++)
      for (let j = 0; j < rows; j++)
        for (let i = 0; i < columns; i++) {
          const angle = -2 * Math.PI * ((j * q) / rows + (i * p) / columns);
          const k = j * columns + i;
          re[q * columns + p] += real[k] * Math.cos(angle) - imaginary[k] * Math.sin(angle);
          im[q * columns + p] += real[k] * Math.sin(angle) + imaginary[k] * Math.cos(angle);
        }
  return { re, im };
}

describe('the Fourier transform', () => {
  it.each([
    [8, 8],
    [4, 16],
    [6, 10],
    [7, 5],
  ])('of %d × %d samples is the direct sum with the minus sign', (rows, columns) => {
    const real = noise(rows * columns, 1);
    const imaginary = noise(rows * columns, 2);
    const { re, im } = directSum(real, imaginary, rows, columns);
    fft2InPlace(real, imaginary, rows, columns, 'forward');
    re.forEach((value, k) => {
      expect(Math.abs(real[k] - value)).toBeLessThan(1e-12);
      expect(Math.abs(imaginary[k] - im[k])).toBeLessThan(1e-12);
    });
  });

  it('turns a sample one step right of the origin into exp(−2πip/n)', () => {
    const real = new Float64Array(64);
    const imaginary = new Float64Array(64);
    real[1] = 1;
    fft2InPlace(real, imaginary, 8, 8, 'forward');
    expect(imaginary[1]).toBeCloseTo(-Math.sin(Math.PI / 4), 14);
  });

  it('comes back to where it was and keeps the energy (Parseval)', () => {
    const real = noise(32 * 64, 3);
    const imaginary = noise(32 * 64, 4);
    const before = real.slice();
    const energy = real.reduce((sum, x, k) => sum + x * x + imaginary[k] ** 2, 0);
    fft2InPlace(real, imaginary, 32, 64, 'forward');
    const after = real.reduce((sum, x, k) => sum + x * x + imaginary[k] ** 2, 0) / (32 * 64);
    expect(after / energy).toBeCloseTo(1, 12);
    fft2InPlace(real, imaginary, 32, 64, 'inverse');
    before.forEach((value, k) => expect(Math.abs(real[k] - value)).toBeLessThan(1e-13));
  });

  it('refuses arrays that are not of the stated size', () => {
    expect(() => fft2InPlace(new Float64Array(15), new Float64Array(16), 4, 4, 'forward')).toThrow(
      RangeError,
    );
  });
});

describe('the far field of a mask', () => {
  const grid = { n: 64, spacing: 1e-6 };
  /** An L: no symmetry at all. */
  const letter = (x: number, y: number) =>
    Math.min(
      Math.max(Math.abs(x + 4e-6) - 2e-6, Math.abs(y) - 9e-6),
      Math.max(Math.abs(x) - 6e-6, Math.abs(y + 7e-6) - 2e-6),
    );
  const pattern = (distance: (x: number, y: number) => number) => farField(coverage(distance, grid), grid);
  const here = pattern(letter);
  const gap = (a: Float64Array, b: Float64Array) => Math.max(...a.map((value, k) => Math.abs(value - b[k])));

  it('is 1 on the axis, has spacing 1/(nδ), and opposite points are alike', () => {
    const { intensity, spacing } = here;
    expect(spacing).toBeCloseTo(1 / 64e-6, 6);
    expect(intensity[32 * 64 + 32]).toBe(1);
    for (let j = 1; j < 64; j++)
      for (let i = 1; i < 64; i++)
        expect(Math.abs(intensity[j * 64 + i] - intensity[(64 - j) * 64 + 64 - i])).toBeLessThan(1e-14);
  });

  it('does not notice a shift of the opening by whole samples, nor a turn by 180°', () => {
    // Goodman, Introduction to Fourier Optics, 2.1: shift theorem; |F| of a real opening.
    expect(gap(here.intensity, pattern((x, y) => letter(x - 5e-6, y + 3e-6)).intensity)).toBeLessThan(1e-12);
    expect(gap(here.intensity, pattern((x, y) => letter(-x, -y)).intensity)).toBeLessThan(1e-12);
  });

  it('turns by 90° counter-clockwise when the opening does', () => {
    const turned = pattern((x, y) => letter(y, -x)).intensity;
    for (let j = 1; j < 64; j++)
      for (let i = 1; i < 64; i++)
        // The point (i, j) about the centre goes to (−j, i).
        expect(Math.abs(turned[i * 64 + 64 - j] - here.intensity[j * 64 + i])).toBeLessThan(1e-12);
  });

  it('is the same off the axis for an opening and its complement (Babinet)', () => {
    const mask = coverage(letter, grid);
    const total = mask.reduce((a, b) => a + b, 0);
    const other = farField(
      mask.map((value) => 1 - value),
      grid,
    ).intensity;
    const scale = ((64 * 64 - total) / total) ** 2;
    for (let k = 0; k < 64 * 64; k++)
      if (k !== 32 * 64 + 32) expect(Math.abs(other[k] * scale - here.intensity[k])).toBeLessThan(1e-11);
  });

  it('has the autocorrelation of the opening as its transform, of exactly twice the extent', () => {
    // Wiener–Khinchin theorem (Bracewell). The L is 12 by 18 µm about its own middle.
    const real = new Float64Array(64 * 64);
    for (let j = 0; j < 64; j++)
      for (let i = 0; i < 64; i++) real[((j + 32) % 64) * 64 + ((i + 32) % 64)] = here.intensity[j * 64 + i];
    fft2InPlace(real, new Float64Array(64 * 64), 64, 64, 'inverse');
    const mask = coverage(letter, grid);
    const columns = Array.from({ length: 64 }, (_, i) => i).filter((i) =>
      Array.from({ length: 64 }, (_, j) => mask[j * 64 + i]).some((value) => value > 0),
    );
    const width = columns.at(-1)! - columns[0];
    const lags = Array.from({ length: 32 }, (_, lag) => lag).filter((lag) =>
      Array.from({ length: 64 }, (_, j) => real[j * 64 + lag]).some((value) => value > 1e-9),
    );
    expect(lags.at(-1)).toBe(width);
  });

  it('refuses an odd grid and a closed mask', () => {
    expect(() => farField(new Float64Array(9), { n: 3, spacing: 1 })).toThrow(RangeError);
    expect(() => farField(new Float64Array(16), { n: 4, spacing: 1 })).toThrow(RangeError);
  });
});

describe('the conventions', () => {
  it('sample n/2 is the origin', () => {
    expect([originIndex(8), originIndex(7)]).toEqual([4, 3]);
    expect(coordinate(4, 8, 2)).toBe(0);
    expect(coordinate(5, 8, 2)).toBe(2);
    expect(transformSpacing(100, 0.5)).toBeCloseTo(0.02, 15);
  });

  it('a picture’s rows run down and the frequencies’ y runs up', () => {
    const bench = { kind: 'lens', wavelength: 5e-7, distance: 0.1, pixelPitch: 1e-5 } as const;
    expect(spatialFrequency(bench, 3, 0).fx).toBeCloseTo(600, 9);
    expect(spatialFrequency(bench, 0, 3).fy).toBeCloseTo(-600, 9);
  });

  it('a screen is read by the direction cosine: 1.543 % less than X/L at 10°', () => {
    // 1/cos θ − 1 = 1.542661 % at 10°.
    const bench = { kind: 'screen', wavelength: 5e-7, distance: 0.1, pixelPitch: 1e-5 } as const;
    const pixels = (0.1 * Math.tan(Math.PI / 18)) / 1e-5;
    const lens = spatialFrequency({ ...bench, kind: 'lens' }, pixels, 0).fx;
    expect(lens / spatialFrequency(bench, pixels, 0).fx - 1).toBeCloseTo(0.01542661, 8);
  });

  it('coverage fills half a cell at an edge through its middle and is exact for a straight edge', () => {
    const mask = coverage((x) => x, { n: 8, spacing: 1 });
    expect(Array.from(mask.slice(0, 8))).toEqual([1, 1, 1, 1, 0.5, 0, 0, 0]);
    const shifted = coverage((x) => x - 0.25, { n: 8, spacing: 1 });
    expect(shifted[4]).toBeCloseTo(0.75, 12);
  });
});

describe('the sampling advice', () => {
  it('takes the far field for granted below a Fresnel number of 0.1 and says how far that is', () => {
    // The limit: common practice, no source. N = a²/(λL), Goodman, Introduction to Fourier Optics, 4.3.
    expect(fresnelLimit).toBe(0.1);
    expect(fresnelNumber(100e-6, 632.8e-9, 0.2)).toBeCloseTo(0.019753, 6);
    const far = farFieldDistance(1e-3, 632.8e-9);
    expect(fresnelNumber(1e-3, 632.8e-9, far)).toBeCloseTo(0.1, 12);
    // The antenna rule L > 2D²/λ (Federal Standard 1037C) is N < 1/8: slightly weaker than ours.
    expect(fresnelNumber(1e-3, 632.8e-9, (2 * 1e-3 ** 2) / 632.8e-9)).toBeCloseTo(1 / 8, 12);
  });

  it('counts λL/(extent · pitch) pixels per fringe', () => {
    expect(pixelsPerFringe(100e-6, 632.8e-9, 0.2, 5e-6)).toBeCloseTo(253.12, 8);
  });
});
