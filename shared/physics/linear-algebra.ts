/**
 * Solves A x = b for a symmetric positive definite n × n matrix (row-major) by Cholesky's method; null when A is not
 * positive definite. Arguments are kept.
 */
export function solveSymmetric(a: Float64Array, b: Float64Array, n: number): Float64Array | null {
  const l = cholesky(a, n);
  if (!l) return null;
  const x = Float64Array.from(b);
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < i; k++) x[i] -= l[i * n + k] * x[k];
    x[i] /= l[i * n + i];
  }
  for (let i = n - 1; i >= 0; i--) {
    for (let k = i + 1; k < n; k++) x[i] -= l[k * n + i] * x[k];
    x[i] /= l[i * n + i];
  }
  return x;
}

/** Inverse of a symmetric positive definite matrix, or null. */
export function invertSymmetric(a: Float64Array, n: number): Float64Array | null {
  const inverse = new Float64Array(n * n);
  const unit = new Float64Array(n);
  for (let j = 0; j < n; j++) {
    unit.fill(0);
    unit[j] = 1;
    const column = solveSymmetric(a, unit, n);
    if (!column) return null;
    for (let i = 0; i < n; i++) inverse[i * n + j] = column[i];
  }
  return inverse;
}

function cholesky(a: Float64Array, n: number): Float64Array | null {
  const l = new Float64Array(n * n);
  for (let i = 0; i < n; i++)
    for (let j = 0; j <= i; j++) {
      let sum = a[i * n + j];
      for (let k = 0; k < j; k++) sum -= l[i * n + k] * l[j * n + k];
      if (i === j) {
        if (!(sum > 1e-14 * a[i * n + i]) || !Number.isFinite(sum)) return null;
        l[i * n + i] = Math.sqrt(sum);
      } else l[i * n + j] = sum / l[j * n + j];
    }
  return l;
}
