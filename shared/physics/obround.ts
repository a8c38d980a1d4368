/**
 * C(a, b) = ∫ cos(a cos t) cos(b sin t) cos t dt over −π/2 … π/2: the part of an obround's far field that its straight
 * middle adds (a = 2πur, b = 2πvr with the cap radius r). With a = ρ cos φ, b = ρ sin φ the Jacobi–Anger expansion
 * (Abramowitz & Stegun 9.1.44) gives C = 2J0(ρ) − 4 Σ J2k(ρ) cos 2kφ / (4k² − 1), which fills a table tile by tile as
 * arguments are asked for; between nodes a sixth-order Lagrange interpolation, absolute error below 1e-6.
 */

const step = 0.25;
const tileCells = 32;
/** Nodes per tile side: five more than cells, so that every cell has its six nodes in one tile. */
const side = tileCells + 5;
const tileExtent = tileCells * step;
const reach = 1024;
const tilesAcross = reach / tileExtent;
const tiles: (Float32Array | undefined)[] = new Array<Float32Array | undefined>(tilesAcross * tilesAcross);

/** J0, J2, J4 … of ρ by downward recurrence, normalised with J0 + 2 ΣJ2k = 1. */
function evenBessel(rho: number): Float64Array {
  const start = 2 * Math.ceil((rho + 24 + 6 * Math.cbrt(rho + 1)) / 2);
  const even = new Float64Array(start / 2 + 1);
  let above = 0;
  let here = 1e-280;
  let sum = 0;
  for (let n = start; n > 0; n--) {
    if (n % 2 === 0) {
      even[n / 2] = here;
      sum += 2 * here;
    }
    const below = (2 * n * here) / rho - above;
    above = here;
    here = below;
    if (Math.abs(here) > 1e200) {
      here *= 1e-200;
      above *= 1e-200;
      sum *= 1e-200;
      for (let k = n >> 1; k < even.length; k++) even[k] *= 1e-200;
    }
  }
  even[0] = here;
  sum += here;
  for (let k = 0; k < even.length; k++) even[k] /= sum;
  return even;
}

function exactC(a: number, b: number): number {
  const rho = Math.hypot(a, b);
  if (rho < 1e-6) return 2;
  const even = evenBessel(rho);
  const cos2 = (a * a - b * b) / (rho * rho);
  // cos 2kφ by Chebyshev's recurrence from cos 2φ.
  let before = 1;
  let here = cos2;
  let sum = 0;
  for (let k = 1; k < even.length; k++) {
    sum += (even[k] * here) / (4 * k * k - 1);
    const next = 2 * cos2 * here - before;
    before = here;
    here = next;
  }
  return 2 * even[0] - 4 * sum;
}

function fillTile(ta: number, tb: number): Float32Array {
  const tile = new Float32Array(side * side);
  for (let j = 0; j < side; j++)
    for (let i = 0; i < side; i++)
      tile[j * side + i] = exactC(
        Math.abs(ta * tileExtent + (i - 2) * step),
        Math.abs(tb * tileExtent + (j - 2) * step),
      );
  return tile;
}

const wa = new Float64Array(6);
const wb = new Float64Array(6);

/** Lagrange weights for nodes −2 … 3 at offset f in [0, 1). */
function weights(f: number, w: Float64Array): void {
  const m2 = f + 2;
  const m1 = f + 1;
  const p1 = f - 1;
  const p2 = f - 2;
  const p3 = f - 3;
  w[0] = -(m1 * f * p1 * p2 * p3) / 120;
  w[1] = (m2 * f * p1 * p2 * p3) / 24;
  w[2] = -(m2 * m1 * p1 * p2 * p3) / 12;
  w[3] = (m2 * m1 * f * p2 * p3) / 12;
  w[4] = -(m2 * m1 * f * p1 * p3) / 24;
  w[5] = (m2 * m1 * f * p1 * p2) / 120;
}

/** C(a, b) for dimensionless arguments of either sign; see the head of this file. */
export function obroundMiddle(a: number, b: number): number {
  const x = (a < 0 ? -a : a) / step;
  const y = (b < 0 ? -b : b) / step;
  const i = x | 0;
  const j = y | 0;
  const ta = (i / tileCells) | 0;
  const tb = (j / tileCells) | 0;
  if (ta >= tilesAcross || tb >= tilesAcross) return exactC(x * step, y * step);
  const tile = (tiles[tb * tilesAcross + ta] ??= fillTile(ta, tb));
  weights(x - i, wa);
  weights(y - j, wb);
  let k = (j - tb * tileCells) * side + (i - ta * tileCells);
  let sum = 0;
  for (let m = 0; m < 6; m++, k += side)
    sum +=
      wb[m] *
      (wa[0] * tile[k] +
        wa[1] * tile[k + 1] +
        wa[2] * tile[k + 2] +
        wa[3] * tile[k + 3] +
        wa[4] * tile[k + 4] +
        wa[5] * tile[k + 5]);
  return sum;
}
