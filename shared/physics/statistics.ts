/** ln Γ(x), x > 0: Stirling's series after shifting to x ≥ 10 (DLMF 5.11.1, 5.5.1); relative error below 1e-13. */
export function logGamma(x: number): number {
  let shift = 0;
  let z = x;
  for (; z < 10; z += 1) shift -= Math.log(z);
  const i = 1 / (z * z);
  const series = (1 / 12 - i * (1 / 360 - i * (1 / 1260 - i * (1 / 1680 - i / 1188)))) / z;
  return shift + (z - 0.5) * Math.log(z) - z + Math.log(2 * Math.PI) / 2 + series;
}

/**
 * Q(a, x) = Γ(a, x)/Γ(a), the upper regularised incomplete gamma function, a > 0, x ≥ 0: series below a + 1 (DLMF 8.11.4),
 * continued fraction above (DLMF 8.9.2, by Lentz's method). Absolute error below 1e-13 for a up to 1e4.
 */
export function upperGamma(a: number, x: number): number {
  if (x <= 0) return 1;
  const front = Math.exp(a * Math.log(x) - x - logGamma(a));
  if (x < a + 1) {
    let term = 1 / a;
    let sum = term;
    for (let k = 1; k < 100000 && term > sum * 1e-17; k++) {
      term *= x / (a + k);
      sum += term;
    }
    return 1 - front * sum;
  }
  let b = x + 1 - a;
  let c = 1e300;
  let d = 1 / b;
  let h = d;
  for (let k = 1; k < 100000; k++) {
    const m = k * (a - k);
    b += 2;
    d = 1 / (m * d + b);
    c = b + m / c;
    h *= c * d;
    if (Math.abs(c * d - 1) < 1e-16) break;
  }
  return front * h;
}

/** Probability that a chi-square of `degrees` degrees of freedom exceeds `value` (Abramowitz & Stegun 26.4). */
export function chiSquareTail(value: number, degrees: number): number {
  return upperGamma(degrees / 2, value / 2);
}

/** Error function, by the incomplete gamma function (DLMF 7.11.1). */
export function erf(x: number): number {
  const tail = 1 - upperGamma(0.5, x * x);
  return x < 0 ? -tail : tail;
}

/** Φ(z) of the standard normal distribution, with full relative accuracy in the lower tail. */
export function normalCumulative(z: number): number {
  const tail = upperGamma(0.5, (z * z) / 2) / 2;
  return z < 0 ? tail : 1 - tail;
}

/** z with Φ(z) = p, 0 < p < 1; NaN outside. Newton's method with Halley's correction from the logistic start. */
export function normalQuantile(p: number): number {
  if (!(p > 0 && p < 1)) return Number.NaN;
  if (p > 0.5) return -normalQuantile(1 - p);
  const t = Math.sqrt(-2 * Math.log(p));
  let z = p < 0.02 ? -t + Math.log(t * Math.sqrt(2 * Math.PI)) / t : Math.log(p / (1 - p)) / 1.702;
  for (let k = 0; k < 50; k++) {
    const ratio = ((normalCumulative(z) - p) * Math.sqrt(2 * Math.PI)) / Math.exp((-z * z) / 2);
    const step = ratio / (1 + (z * ratio) / 2);
    z -= step;
    if (Math.abs(step) < 1e-14 * (1 + Math.abs(z))) break;
  }
  return z;
}
