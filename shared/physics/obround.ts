import { gaussLegendre } from '#shared/physics/gauss-legendre.ts';
import { cosPi, sinPi } from '#shared/physics/sinc.ts';
import { tabulatedY1, y1Table } from '#shared/physics/y1-table.ts';

/**
 * C(a, b) = ∫ cos(a cos t) cos(b sin t) cos t dt over −π/2 … π/2: the part of an obround's far field that its straight middle
 * adds (a = 2πur, b = 2πvr with the cap radius r). C(0, 0) = 2; absolute error below 6e-7. Own derivation:
 *
 * With a = ρ cos φ, b = ρ sin φ the integral turns into C = 2 sin φ sin b / ρ + 2 cos φ ∫_φ^{π/2} cos(ρ sin x) sin x dx.
 * Deforming the last one into the complex plane parts it into an end at x = π/2, which is −(π/2) Y1(ρ), and an end at
 * x = φ, which oscillates as exp(ib) with a *slow* factor D. So nothing that oscillates needs a two-dimensional table:
 *   ρ < 8            bicubic table of C itself in (a, b);
 *   w² = ρ − b < 25  table of the slow factor in (w, 1/ρ), Fresnel-like;
 *   else             seven terms of its asymptotic series in 1/(ρ cos² φ).
 */
const nearEnd = 8;
const nearSteps = 16;
const nearRow = nearEnd * nearSteps + 4;
const edge = 5;
const edgeSteps = 24;
const edgeRow = edge * edgeSteps + 4;
const inverseSteps = 64 * nearEnd;
const inverseRows = inverseSteps / nearEnd + 4;

interface Tables {
  readonly near: Float64Array;
  readonly real: Float64Array;
  readonly imaginary: Float64Array;
  readonly y1: Float64Array;
}

/** C(a, b) by quadrature: the definition, for the table and for tests. `nodes` must exceed about (a + b)/2 + 12. */
export function obroundMiddleByQuadrature(a: number, b: number, nodes: number): number {
  const { x, w } = gaussLegendre(nodes, 0, Math.PI / 2);
  let sum = 0;
  for (let i = 0; i < nodes; i += 1)
    sum += w[i] * Math.cos(a * Math.cos(x[i])) * Math.cos(b * Math.sin(x[i])) * Math.cos(x[i]);
  return 2 * sum;
}

function nearTable(): Float64Array {
  const t = new Float64Array(nearRow * nearRow);
  const { x, w } = gaussLegendre(24, 0, Math.PI / 2);
  const side = nearRow * 24;
  const cosA = new Float64Array(side);
  const cosB = new Float64Array(side);
  for (let i = 0; i < nearRow; i += 1)
    for (let k = 0; k < 24; k += 1) {
      const z = (i - 1) / nearSteps;
      cosA[i * 24 + k] = 2 * w[k] * Math.cos(x[k]) * Math.cos(z * Math.cos(x[k]));
      cosB[i * 24 + k] = Math.cos(z * Math.sin(x[k]));
    }
  for (let i = 0; i < nearRow; i += 1)
    for (let j = 0; j < nearRow; j += 1) {
      let sum = 0;
      for (let k = 0; k < 24; k += 1) sum += cosA[i * 24 + k] * cosB[j * 24 + k];
      t[i * nearRow + j] = sum;
    }
  return t;
}

/**
 * −√2 e^{−iπ/4} ∫_0^∞ exp(−t² − √2(1+i)wt) h(w + e^{−iπ/4}t) dt with h(σ) = (1 − σ²ε)/√(1 − σ²ε/2): the end at x = φ in
 * the variable σ, sin x = 1 − σ²ε, ε = 1/ρ.
 */
function slowFactor(w: number, e: number, x: Float64Array, weight: Float64Array): [number, number] {
  let re = 0;
  let im = 0;
  const r = Math.SQRT1_2;
  for (let k = 0; k < x.length; k += 1) {
    const t = x[k];
    const sr = w + r * t;
    const si = -r * t;
    const qr = (sr * sr - si * si) * e;
    const qi = 2 * sr * si * e;
    const rootR = 1 - qr / 2;
    const rootI = -qi / 2;
    const modulus = Math.hypot(rootR, rootI) ** -0.5;
    const phase = -Math.atan2(rootI, rootR) / 2;
    const hr = modulus * ((1 - qr) * Math.cos(phase) + qi * Math.sin(phase));
    const hi = modulus * ((1 - qr) * Math.sin(phase) - qi * Math.cos(phase));
    const size = weight[k] * Math.exp(-t * t - Math.SQRT2 * w * t);
    const angle = -Math.SQRT2 * w * t - Math.PI / 4;
    re -= size * (hr * Math.cos(angle) - hi * Math.sin(angle));
    im -= size * (hr * Math.sin(angle) + hi * Math.cos(angle));
  }
  return [Math.SQRT2 * re, Math.SQRT2 * im];
}

let tables: Tables | undefined;

/** Built at the first call: about 60 ms, 300 kB. */
function tabulate(): Tables {
  const real = new Float64Array(inverseRows * edgeRow);
  const imaginary = new Float64Array(inverseRows * edgeRow);
  const { x, w } = gaussLegendre(48, 0, 6.5);
  for (let i = 0; i < inverseRows; i += 1)
    for (let j = 0; j < edgeRow; j += 1) {
      const [re, im] = slowFactor((j - 1) / edgeSteps, (i - 1) / inverseSteps, x, w);
      real[i * edgeRow + j] = re;
      imaginary[i * edgeRow + j] = im;
    }
  return { near: nearTable(), real, imaginary, y1: y1Table() };
}

/** Sums of the last interpolation; kept outside so that nothing is allocated. */
const sums = new Float64Array(2);

/**
 * Cubic Lagrange interpolation of two tables at once, in `s` along rows and `r` along columns, shifted by one node so that
 * every stencil is complete. Writes `sums`.
 */
function bicubic(first: Float64Array, second: Float64Array | null, row: number, s: number, r: number): void {
  const i = s | 0;
  const j = r | 0;
  const d = s - i;
  const f = r - j;
  const dd = (d - 1) * (d - 2);
  const dp = d * (d + 1);
  const a0 = (-d * dd) / 6;
  const a1 = ((d + 1) * dd) / 2;
  const a2 = (-dp * (d - 2)) / 2;
  const a3 = (dp * (d - 1)) / 6;
  const ff = (f - 1) * (f - 2);
  const fp = f * (f + 1);
  const b0 = (-f * ff) / 6;
  const b1 = ((f + 1) * ff) / 2;
  const b2 = (-fp * (f - 2)) / 2;
  const b3 = (fp * (f - 1)) / 6;
  const k0 = i * row + j;
  const k1 = k0 + row;
  const k2 = k1 + row;
  const k3 = k2 + row;
  const t = first;
  sums[0] =
    a0 * (b0 * t[k0] + b1 * t[k0 + 1] + b2 * t[k0 + 2] + b3 * t[k0 + 3]) +
    a1 * (b0 * t[k1] + b1 * t[k1 + 1] + b2 * t[k1 + 2] + b3 * t[k1 + 3]) +
    a2 * (b0 * t[k2] + b1 * t[k2 + 1] + b2 * t[k2 + 2] + b3 * t[k2 + 3]) +
    a3 * (b0 * t[k3] + b1 * t[k3 + 1] + b2 * t[k3 + 2] + b3 * t[k3 + 3]);
  if (!second) return;
  const z = second;
  sums[1] =
    a0 * (b0 * z[k0] + b1 * z[k0 + 1] + b2 * z[k0 + 2] + b3 * z[k0 + 3]) +
    a1 * (b0 * z[k1] + b1 * z[k1 + 1] + b2 * z[k1 + 2] + b3 * z[k1 + 3]) +
    a2 * (b0 * z[k2] + b1 * z[k2 + 1] + b2 * z[k2 + 2] + b3 * z[k2 + 3]) +
    a3 * (b0 * z[k3] + b1 * z[k3 + 1] + b2 * z[k3 + 2] + b3 * z[k3 + 3]);
}

/** C(a, b) for dimensionless arguments of either sign; see the head of this file. Allocates nothing after the first call. */
export function obroundMiddle(signedA: number, signedB: number): number {
  const t = (tables ??= tabulate());
  const a = signedA < 0 ? -signedA : signedA;
  const b = signedB < 0 ? -signedB : signedB;
  const rho = Math.sqrt(a * a + b * b);
  if (rho < nearEnd) {
    bicubic(t.near, null, nearRow, a * nearSteps, b * nearSteps);
    return sums[0];
  }
  const e = 1 / rho;
  const y = b * e;
  const c = a * e;
  const turns = b / Math.PI;
  const sine = sinPi(turns);
  const cosine = cosPi(turns);
  const far = -Math.PI * c * tabulatedY1(t.y1, rho);
  const w2 = (a * a) / (rho + b);
  if (w2 < edge * edge) {
    const s = e * inverseSteps;
    const r = Math.sqrt(w2) * edgeSteps;
    const scale = 2 * c * Math.sqrt(e);
    bicubic(t.real, t.imaginary, edgeRow, s, r);
    return far + 2 * e * y * sine + scale * (cosine * sums[0] - sine * sums[1]);
  }
  const q = e / (c * c);
  const q2 = q * q;
  const yy = y * y;
  const p3 = 3 + 12 * yy;
  const p5 = 45 + yy * (540 + 360 * yy);
  const p7 = 1575 + yy * (37800 + yy * (75600 + 20160 * yy));
  const p4 = 45 + 60 * yy;
  const p6 = 1575 + yy * (6300 + 2520 * yy);
  const re = q * (-1 + q2 * (p3 + q2 * (-p5 + q2 * p7)));
  const im = y * q2 * (-3 + q2 * (p4 - q2 * p6));
  return far + 2 * e * (cosine * re - sine * im);
}
