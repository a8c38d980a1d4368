import { describe, expect, it } from 'vitest';
import { gaussLegendre } from '#shared/physics/gauss-legendre.ts';
import {
  chiSquareTail,
  erf,
  logGamma,
  normalCumulative,
  normalQuantile,
} from '#shared/physics/statistics.ts';

describe('statistics', () => {
  it('quantiles of the normal distribution are those of the conformity rules', () => {
    // JCGM 106:2012; z for 90, 95, 97.5 and 99 %.
    const table = [
      [0.9, 1.281551566],
      [0.95, 1.644853627],
      [0.975, 1.959963985],
      [0.99, 2.326347874],
    ];
    for (const [p, z] of table) {
      expect(Math.abs(normalQuantile(p) - z)).toBeLessThan(6e-10);
      expect(Math.abs(normalQuantile(1 - p) + z)).toBeLessThan(6e-10);
    }
    expect(normalQuantile(0.5)).toBeCloseTo(0, 14);
    expect(normalQuantile(1.5)).toBeNaN();
  });

  it('conformance probabilities are those of the worked examples', () => {
    // JCGM 106:2012, 7.3.3: an upper limit at z = 1.4, a lower limit at z = 2.125.
    expect(Math.abs(normalCumulative(1.4) - 0.919243)).toBeLessThan(5e-7);
    expect(Math.abs(normalCumulative(2.125) - 0.983207)).toBeLessThan(5e-7);
  });

  it('tails stay accurate where the body rounds to one', () => {
    // ILAC-G8:09/2019, Table 1: a guard band of 3U, U = 2u, lets less than one in a million pass.
    expect(Math.abs(normalCumulative(-6) / 9.86587645e-10 - 1)).toBeLessThan(1e-8);
  });

  it('erf and the chi-square tail agree with Abramowitz & Stegun', () => {
    // Table 7.1: erf 0.5, 1, 2. Table 26.8: 5 % points for 1, 10 and 100 degrees of freedom (from memory).
    expect(Math.abs(erf(0.5) - 0.5204998778)).toBeLessThan(6e-11);
    expect(Math.abs(erf(1) - 0.8427007929)).toBeLessThan(6e-11);
    expect(Math.abs(erf(-2) + 0.995322265)).toBeLessThan(6e-11);
    expect(Math.abs(chiSquareTail(3.84146, 1) - 0.05)).toBeLessThan(1e-6);
    expect(Math.abs(chiSquareTail(18.307, 10) - 0.05)).toBeLessThan(1e-5);
    expect(Math.abs(chiSquareTail(124.342, 100) - 0.05)).toBeLessThan(1e-5);
  });

  it('ln Γ is ln (n − 1)! at whole numbers and ln √π at a half', () => {
    expect(logGamma(6)).toBeCloseTo(Math.log(120), 12);
    expect(logGamma(0.5)).toBeCloseTo(Math.log(Math.PI) / 2, 12);
  });

  it('Gauss–Legendre quadrature is exact to degree 2n − 1 and not beyond', () => {
    const { x, w } = gaussLegendre(5, -1, 1);
    const moment = (k: number) => x.reduce((sum, xi, i) => sum + w[i] * xi ** k, 0);
    expect(moment(8)).toBeCloseTo(2 / 9, 14);
    expect(Math.abs(moment(10) - 2 / 11)).toBeGreaterThan(1e-4);
  });
});
