import { describe, expect, it } from 'vitest';
import { familyOf } from '#shared/apertures/registry.ts';
import { simulatePattern, type SimulatedPattern } from '#shared/apertures/simulate.ts';
import { spatialFrequency } from '#shared/physics/geometry.ts';

const window = { left: 0, top: 0, width: 160, height: 120, step: 1 };
const rectangle: SimulatedPattern = {
  model: familyOf('rectangle').models[0],
  values: [200e-6, 60e-6],
  orientation: 0,
  geometry: { kind: 'screen', wavelength: 632.8e-9, distance: 0.5, pixelPitch: 20e-6 },
  center: { x: 80, y: 60 },
  amplitude: 1000,
  background: { offset: 0, slopeX: 0, slopeY: 0 },
  blurVariance: 0,
};

/** Mean of the closed form over each pixel by 16 × 16 points: what a pixel truly integrates. */
function integrated(pattern: SimulatedPattern, x: number, y: number): number {
  const n = 16;
  const [c, s] = [Math.cos(pattern.orientation), Math.sin(pattern.orientation)];
  const u = new Float64Array(n * n);
  const v = new Float64Array(n * n);
  for (let k = 0; k < n * n; k++) {
    const dx = x - pattern.center.x + ((k % n) + 0.5) / n - 0.5;
    const dy = y - pattern.center.y + (Math.floor(k / n) + 0.5) / n - 0.5;
    const { fx, fy } = spatialFrequency(pattern.geometry, dx, dy);
    u[k] = c * fx + s * fy;
    v[k] = c * fy - s * fx;
  }
  const out = new Float64Array(n * n);
  pattern.model.intensity(pattern.values, u, v, out, n * n);
  return (pattern.amplitude * out.reduce((a, b) => a + b, 0)) / (n * n);
}

describe('the simulated pattern', () => {
  it('is what each pixel integrates, to 1e-4 of the peak at 79 pixels per fringe', () => {
    const pattern = { ...rectangle, orientation: 0.5, center: { x: 71.3, y: 58.8 } };
    const picture = simulatePattern(pattern, window);
    for (let y = 0; y < 120; y += 7)
      for (let x = 0; x < 160; x += 7)
        expect(Math.abs(picture[y * 160 + x] - integrated(pattern, x, y))).toBeLessThan(0.1);
  });

  it('turns counter-clockwise as displayed: an opening pointing up-right has its streak up-left and down-right', () => {
    const long = { ...rectangle, values: [400e-6, 30e-6], orientation: Math.PI / 4 };
    const picture = simulatePattern(long, window);
    const at = (dx: number, dy: number) => picture[(60 + dy) * 160 + 80 + dx];
    // Rows run down: up-left is (−, −). The pattern is long where the opening is short.
    expect(at(-40, -40)).toBeCloseTo(at(40, 40), 3);
    expect(at(-40, -40)).toBeGreaterThan(15 * at(40, -40));
  });

  it('adds the background plane about the centre', () => {
    const plane = { ...rectangle, background: { offset: 5, slopeX: 0.1, slopeY: -0.2 } };
    const bare = simulatePattern(rectangle, window);
    const picture = simulatePattern(plane, window);
    expect(picture[60 * 160 + 80] - bare[60 * 160 + 80]).toBeCloseTo(5, 3);
    expect(picture[70 * 160 + 100] - bare[70 * 160 + 100]).toBeCloseTo(5 + 2 - 2, 4);
  });

  it('fills dark fringes when it is blurred, by half the curvature times the variance', () => {
    const blurred = simulatePattern({ ...rectangle, blurVariance: 4 }, window);
    const sharp = simulatePattern(rectangle, window);
    // Along x the first minimum is at λL/(l·pitch) = 79.1 px, beyond the window on the right; use the closed form there.
    const x = 80 - 79;
    const period = (632.8e-9 * 0.5) / (200e-6 * 20e-6);
    // sinc² near its first zero is (x/period)²: curvature 2/period² → filled by variance/period².
    const filled = blurred[60 * 160 + x] - sharp[60 * 160 + x];
    expect(filled / (1000 * 4 * (1 / period ** 2))).toBeCloseTo(1, 1);
  });

  it('on every third pixel is the mean over three by three, as a binned picture would be', () => {
    const binned = simulatePattern(rectangle, { ...window, width: 159, height: 120, step: 3 });
    const full = simulatePattern(rectangle, window);
    for (const [i, j] of [
      [26, 20],
      [30, 18],
      [40, 25],
    ]) {
      let sum = 0;
      for (let b = 0; b < 3; b++) for (let a = 0; a < 3; a++) sum += full[(3 * j + b) * 160 + 3 * i + a];
      expect(Math.abs(binned[j * 53 + i] - sum / 9)).toBeLessThan(0.2);
    }
  });
});
