/** Nodes and weights of Gauss–Legendre quadrature on [from, to] by Newton's method; exact to degree 2n − 1. */
export function gaussLegendre(n: number, from: number, to: number): { x: Float64Array; w: Float64Array } {
  const x = new Float64Array(n);
  const w = new Float64Array(n);
  for (let i = 0; i < n; i += 1) {
    let z = Math.cos((Math.PI * (i + 0.75)) / (n + 0.5));
    let slope = 1;
    for (let turn = 0; turn < 100; turn += 1) {
      let p = 1;
      let before = 0;
      for (let k = 1; k <= n; k += 1) {
        const next = ((2 * k - 1) * z * p - (k - 1) * before) / k;
        before = p;
        p = next;
      }
      slope = (n * (before - z * p)) / (1 - z * z);
      const step = p / slope;
      z -= step;
      if (Math.abs(step) < 1e-15) break;
    }
    x[i] = (from + to) / 2 + ((to - from) / 2) * z;
    w[i] = (to - from) / ((1 - z * z) * slope * slope);
  }
  return { x, w };
}
