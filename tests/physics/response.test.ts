import { describe, expect, it } from 'vitest';
import { detect, type Detector } from '#shared/physics/detector.ts';
import { poissonFrom, seededRandom } from '#shared/physics/random.ts';
import { linearTable, srgbDecode, srgbEncode } from '#shared/physics/response.ts';

describe('the response of a picture', () => {
  // IEC 61966-2-1.
  it.each([
    [0.1, 0.010022826],
    [0.25, 0.050876088],
    [0.5, 0.21404114],
    [0.75, 0.522521554],
    [128 / 255, 0.2158605],
    [64 / 255, 0.051269458],
    [10 / 255, 0.00303527],
    [11 / 255, 0.003346536],
    [200 / 255, 0.57758044],
  ])('decodes the sRGB value %d as the standard says, and encodes it back', (code, linear) => {
    expect(Math.abs(srgbDecode(code) - linear)).toBeLessThan(6e-10);
    expect(Math.abs(srgbEncode(srgbDecode(code)) - code)).toBeLessThan(1e-7);
  });

  it('encodes 0.18 and 0.5 as published', () => {
    // colour-science documentation gives 0.4613561 for 0.18.
    expect(Math.abs(srgbEncode(0.18) - 0.46135613)).toBeLessThan(6e-9);
    expect(Math.abs(srgbEncode(0.5) - 0.735356983)).toBeLessThan(6e-10);
  });

  it('keeps full scale at full scale for sRGB files and takes the dark level off linear ones', () => {
    expect(linearTable('srgb', 255, 0)[255]).toBe(255);
    expect(linearTable('linear', 4095, 64)[64]).toBe(0);
    expect(linearTable('linear', 4095, 64)[0]).toBe(-64);
  });
});

describe('the simulated camera', () => {
  const camera: Detector = {
    fullWell: 10000,
    readNoise: 6,
    bitDepth: 16,
    darkLevel: 1000,
    encoding: 'linear',
  };
  const statistics = (level: number, detector: Detector) => {
    const codes = detect(new Float64Array(40000).fill(level), detector, seededRandom(7));
    const mean = codes.reduce((a, b) => a + b, 0) / codes.length;
    const variance = codes.reduce((a, b) => a + (b - mean) ** 2, 0) / (codes.length - 1);
    return { mean, variance, codes };
  };

  it('has the variance of the EMVA 1288 linear model: read noise, shot noise, rounding', () => {
    const gain = (65535 - 1000) / 10000;
    for (const level of [0.0005, 0.01, 0.5]) {
      const { mean, variance } = statistics(level, camera);
      const electrons = level * 10000;
      const expected = gain ** 2 * (36 + electrons) + 1 / 12;
      // Five standard errors: of a variance √(2/n), of a mean σ/√n; n = 40000.
      expect(Math.abs(variance / expected - 1)).toBeLessThan(5 * Math.sqrt(2 / 40000) * 1.2);
      expect(Math.abs(mean - 1000 - gain * electrons)).toBeLessThan((5 * Math.sqrt(expected)) / 200);
    }
  });

  it('clips at both ends of its codes and encodes sRGB', () => {
    expect(statistics(3, camera).codes.every((code) => code === 65535)).toBe(true);
    const quiet = { fullWell: 1e9, readNoise: 0, bitDepth: 8, darkLevel: 0 } as const;
    expect(statistics(0.2158605, { ...quiet, encoding: 'srgb' }).mean).toBeCloseTo(128, 1);
    expect(statistics(0.5, { ...quiet, encoding: 'linear' }).mean).toBeCloseTo(127.5, 0);
  });

  it('is the same for the same seed and another for another', () => {
    const run = (seed: number) =>
      Array.from(detect(new Float64Array(50).fill(0.1), camera, seededRandom(seed)));
    expect(run(3)).toEqual(run(3));
    expect(run(3)).not.toEqual(run(4));
  });

  it('draws Poisson numbers with variance equal to the mean on both sides of the change of method', () => {
    for (const mean of [0.7, 12, 29, 31, 400]) {
      const random = seededRandom(11);
      const draws = Array.from({ length: 40000 }, () => poissonFrom(random, mean));
      const m = draws.reduce((a, b) => a + b) / draws.length;
      const v = draws.reduce((a, b) => a + (b - m) ** 2, 0) / draws.length;
      expect(Math.abs(m / mean - 1)).toBeLessThan(5 / Math.sqrt(40000 * mean));
      expect(Math.abs(v / mean - 1)).toBeLessThan(5 * Math.sqrt((2 + 1 / mean) / 40000) + 1 / (12 * mean));
    }
  });
});
