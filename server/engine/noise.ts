import type { NoiseLaw } from '#server/engine/frame.ts';
import { quantileInPlace } from '#server/engine/median.ts';

const bins = 24;

/**
 * Variance law from the picture itself, before any model: mixed second differences (which a plane does not feel) in
 * log-spaced bins of the local mean. `floor` is the variance that quantisation alone gives. Linear counts.
 */
export function estimateNoise(
  data: Float32Array,
  mask: Uint8Array,
  width: number,
  height: number,
  background: number,
  floor: number,
): NoiseLaw {
  const stride = Math.max(1, Math.floor(Math.sqrt((width * height) / 120_000)));
  const room = Math.ceil(width / stride) * Math.ceil(height / stride);
  const means = new Float64Array(room);
  const differences = new Float64Array(room);
  let n = 0;
  for (let y = 0; y + 1 < height; y += stride)
    for (let x = 0; x + 1 < width; x += stride) {
      const k = y * width + x;
      if (mask[k] | mask[k + 1] | mask[k + width] | mask[k + width + 1]) continue;
      const a = data[k];
      const b = data[k + 1];
      const c = data[k + width];
      const e = data[k + width + 1];
      means[n] = (a + b + c + e) / 4 - background;
      differences[n] = (a - b - c + e) / 2;
      n += 1;
    }
  return lawFromResiduals(
    n,
    (i) => means[i],
    (i) => differences[i],
    floor,
  );
}

/**
 * Fits a + b·I + c·I² to residuals whose means over the picture are known: robust scatter in log-spaced bins of intensity,
 * then a least-squares fit of relative errors with non-negative coefficients.
 */
export function lawFromResiduals(
  n: number,
  intensity: (i: number) => number,
  residual: (i: number) => number,
  floor: number,
): NoiseLaw {
  let top = 0;
  for (let i = 0; i < n; i++) top = Math.max(top, intensity(i));
  const low = Math.max(top * 1e-5, Math.sqrt(floor), 1e-6);
  const groups: number[][] = Array.from({ length: bins + 1 }, () => []);
  const means = new Float64Array(bins + 1);
  const ratio = Math.log(Math.max(top / low, 2));
  for (let i = 0; i < n; i++) {
    const m = intensity(i);
    const g = m <= low ? 0 : 1 + Math.min(bins - 1, Math.floor((bins * Math.log(m / low)) / ratio));
    groups[g].push(residual(i));
    means[g] += Math.max(m, 0);
  }
  const points: { m: number; v: number; w: number }[] = [];
  groups.forEach((group, g) => {
    if (group.length < 24) return;
    const spread = 1.4826 * quantileInPlace(Float64Array.from(group, Math.abs), 0.5);
    points.push({
      m: means[g] / group.length,
      v: Math.max(spread * spread, floor),
      w: Math.min(group.length, 2000),
    });
  });
  if (points.length === 0) return { a: Math.max(floor, 1e-12), b: 0, c: 0 };
  return fitLaw(points, floor);
}

/** Multiplicative updates keep all three coefficients non-negative; each step lowers the weighted relative misfit. */
function fitLaw(points: { m: number; v: number; w: number }[], floor: number): NoiseLaw {
  const base = Math.min(...points.map((p) => p.v));
  const brightest = points.reduce((x, y) => (y.m > x.m ? y : x));
  let a = Math.max(base, floor);
  let b = Math.max(brightest.v - base, 0) / Math.max(brightest.m, 1e-9) / 2 + 1e-9;
  let c = b / Math.max(brightest.m, 1e-9) / 4;
  for (let round = 0; round < 400; round++) {
    let upA = 0;
    let downA = 0;
    let upB = 0;
    let downB = 0;
    let upC = 0;
    let downC = 0;
    for (const p of points) {
      const model = a + b * p.m + c * p.m * p.m;
      // Gamma likelihood of a variance: gradient (v − model)/model².
      const up = (p.w * p.v) / (model * model);
      const down = p.w / model;
      upA += up;
      downA += down;
      upB += up * p.m;
      downB += down * p.m;
      upC += up * p.m * p.m;
      downC += down * p.m * p.m;
    }
    a = Math.max(a * Math.sqrt(upA / downA), floor);
    if (downB > 0) b *= Math.sqrt(upB / downB);
    if (downC > 0) c *= Math.sqrt(upC / downC);
  }
  return { a: Math.max(a, 1e-12), b, c };
}
