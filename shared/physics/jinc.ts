import { besselJ0, besselJ1 } from '#shared/physics/bessel.ts';

const step = 1 / 32;
const tableEnd = 640;
let table: Float64Array | undefined;

/** Values and slopes side by side. d/dx [2J1(x)/x] = −2J2(x)/x and J2 = 2J1/x − J0 (Abramowitz & Stegun 9.1.27, 9.1.30). */
function tabulate(): Float64Array {
  const n = tableEnd / step + 1;
  const t = new Float64Array(2 * n);
  t[0] = 1;
  for (let i = 1; i < n; i++) {
    const x = i * step;
    const j1 = besselJ1(x);
    t[2 * i] = (2 * j1) / x;
    t[2 * i + 1] = (-2 * ((2 * j1) / x - besselJ0(x)) * step) / x;
  }
  return t;
}

/**
 * 2J1(x)/x, 1 at 0: amplitude behind a round opening, x = πD sin θ/λ (Born & Wolf 8.5.2). Dimensionless. Cubic Hermite
 * interpolation in a table, absolute error below 1e-9; beyond x = 640 by J1 itself.
 */
export function jinc(x: number): number {
  const a = x < 0 ? -x : x;
  if (a >= tableEnd - step) return (2 * besselJ1(a)) / a;
  const t = (table ??= tabulate());
  const s = a / step;
  const i = s | 0;
  const f = s - i;
  const k = 2 * i;
  const rise = t[k + 2] - t[k];
  const slope0 = t[k + 1];
  const slope1 = t[k + 3];
  return t[k] + f * (slope0 + f * (3 * rise - 2 * slope0 - slope1 + f * (slope0 + slope1 - 2 * rise)));
}
