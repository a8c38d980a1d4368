/**
 * Bessel functions of the first kind of integer order, for real arguments.
 * Below 30 by Miller's downward recurrence, normalised with J0 + 2 ΣJ2k = 1 (Abramowitz & Stegun 9.12, example 1); above by
 * Hankel's asymptotic expansion (A&S 9.2.5). Absolute error below 2e-15.
 */

const asymptoticFrom = 30;

function miller(x: number): { j0: number; j1: number } {
  const start = 2 * Math.ceil((x + 20 + 6 * Math.cbrt(x + 1)) / 2);
  let above = 0;
  let here = 1e-300;
  let sum = 0;
  let j1 = 0;
  for (let n = start; n > 0; n--) {
    const below = (2 * n * here) / x - above;
    above = here;
    here = below;
    if (n === 2) j1 = here;
    if ((n - 1) % 2 === 0 && n > 1) sum += here;
    if (Math.abs(here) > 1e250) {
      here *= 1e-250;
      above *= 1e-250;
      sum *= 1e-250;
      j1 *= 1e-250;
    }
  }
  const scale = here + 2 * sum;
  return { j0: here / scale, j1: j1 / scale };
}

/** Hankel's expansion for order `n`, first kind (J) or second (Y); stops at the smallest term. DLMF 10.17.3 and 10.17.4. */
function hankel(n: number, x: number, kind: 'first' | 'second'): number {
  const mu = 4 * n * n;
  let p = 1;
  let q = 0;
  let term = 1;
  for (let k = 1; k < 60; k++) {
    const next = (term * (mu - (2 * k - 1) ** 2)) / (k * 8 * x);
    if (Math.abs(next) < 1e-18 || Math.abs(next) > Math.abs(term)) break;
    term = next;
    const sign = k % 4 < 2 ? 1 : -1;
    if (k % 2 === 1) q += sign * term;
    else p += sign * term;
  }
  const chi = x - (n / 2 + 0.25) * Math.PI;
  const size = Math.sqrt(2 / (Math.PI * x));
  return kind === 'first'
    ? size * (p * Math.cos(chi) - q * Math.sin(chi))
    : size * (p * Math.sin(chi) + q * Math.cos(chi));
}

/** J0(x), dimensionless. */
export function besselJ0(x: number): number {
  const a = Math.abs(x);
  if (a < 1e-8) return 1;
  return a < asymptoticFrom ? miller(a).j0 : hankel(0, a, 'first');
}

/** J1(x), dimensionless, odd in x. */
export function besselJ1(x: number): number {
  const a = Math.abs(x);
  if (a < 1e-8) return x / 2;
  const value = a < asymptoticFrom ? miller(a).j1 : hankel(1, a, 'first');
  return x < 0 ? -value : value;
}

/** Y1(x) for x ≥ 8, dimensionless; absolute error below 1e-7 at 8, 1e-14 from 16 on. */
export function besselY1(x: number): number {
  return hankel(1, x, 'second');
}
