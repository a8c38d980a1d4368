import { besselY1 } from '#shared/physics/bessel.ts';

/**
 * A table of Y1(x) from x = 8 on, for the far field of half discs. Cubic: interpolation error below 3e-8 at 8, falling as
 * 1/√x.
 */
const from = 8;
const steps = 24;
const limit = 640;

let table: Float64Array | undefined;

/** Entry i holds Y1 at 8 + (i − 1)/steps. */
export function y1Table(): Float64Array {
  if (table) return table;
  const t = new Float64Array((limit - from) * steps + 4);
  for (let i = 0; i < t.length; i += 1) t[i] = besselY1(from + (i - 1) / steps);
  table = t;
  return t;
}

/** Y1(x) at x ≥ 8; `t` is y1Table(). */
export function tabulatedY1(t: Float64Array, x: number): number {
  const s = (x - from) * steps;
  if (x >= limit) return besselY1(x);
  const i = s | 0;
  const d = s - i;
  const y0 = t[i];
  const y1 = t[i + 1];
  const y2 = t[i + 2];
  const y3 = t[i + 3];
  const a = y3 - y0 + 3 * (y1 - y2);
  const b = 3 * (y0 - 2 * y1 + y2);
  const c = 6 * y2 - 2 * y0 - 3 * y1 - y3;
  return y1 + (d * (c + d * (b + d * a))) / 6;
}
