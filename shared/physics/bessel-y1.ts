/**
 * Y1(x) for x ≥ 8 by Hankel's expansion (DLMF 10.17.4) and a table of it; for the far field of half discs.
 * Step 1/24, cubic: interpolation error below 3e-8 at x = 8, falling as 1/√x.
 */
const from = 8;
const steps = 24;
const limit = 640;

/** Y1(x), x ≥ 8; absolute error below 1e-8 at 8 and below 1e-14 from 16 on. */
export function besselY1Exact(x: number): number {
  let term = 1;
  let p = 1;
  let q = 0;
  for (let k = 1; k < 60; k += 1) {
    const next = (term * (4 - (2 * k - 1) ** 2)) / (k * 8 * x);
    if (Math.abs(next) >= Math.abs(term) || Math.abs(next) < 1e-18) break;
    term = next;
    const turn = k & 3;
    if (turn === 1) q += term;
    else if (turn === 2) p -= term;
    else if (turn === 3) q -= term;
    else p += term;
  }
  const angle = x - 0.75 * Math.PI;
  return Math.sqrt(2 / (Math.PI * x)) * (p * Math.sin(angle) + q * Math.cos(angle));
}

let table: Float64Array | undefined;

/** Entry i holds Y1 at 8 + (i − 1)/steps. */
export function besselY1Table(): Float64Array {
  if (table) return table;
  const t = new Float64Array((limit - from) * steps + 4);
  for (let i = 0; i < t.length; i += 1) t[i] = besselY1Exact(from + (i - 1) / steps);
  table = t;
  return t;
}

/** Y1(x) at x ≥ 8; `t` is besselY1Table(). */
export function besselY1(t: Float64Array, x: number): number {
  const s = (x - from) * steps;
  if (x >= limit) return besselY1Exact(x);
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
