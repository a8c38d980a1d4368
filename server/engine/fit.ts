import type { NoiseLaw } from '#server/engine/frame.ts';
import { slot, type Parameters, type PatternEvaluator } from '#server/engine/pattern.ts';
import { invertSymmetric, solveSymmetric } from '#shared/physics/linear-algebra.ts';

/**
 * `stabilised`: residuals of the variance-stabilising transform (Anscombe, Biometrika 35 (1948) 246, with a
 * multiplicative term): converges from far. `weighted`: linear residuals over the model's own variance (Fisher scoring):
 * unbiased at low counts.
 */
export type Residuals = 'stabilised' | 'weighted';

export interface FitOptions {
  readonly free: readonly number[];
  readonly residuals: Residuals;
  readonly maxSteps: number;
  /** Residuals beyond this many σ count linearly (Huber, Ann. Math. Stat. 35 (1964) 73). */
  readonly huber: number;
  /** Least relative variance of a bin in the transform: tolerance for what the model leaves out. */
  readonly texture: number;
  /** Gives up when the mean cost stays above this after three steps. */
  readonly hopeless?: number;
}

export interface Fit {
  readonly parameters: Parameters;
  /** Mean Huber cost per pixel, 1 for a perfect model with the right noise. */
  readonly cost: number;
  readonly steps: number;
  readonly stopped: 'converged' | 'steps' | 'hopeless' | 'stuck';
}

/** Bounds that keep a step physical: ln of sizes, blur not below the bin's own. */
function clampInPlace(p: Parameters, bin: number): void {
  const least = -(bin * bin) / 14;
  if (p[slot.blur] < least) p[slot.blur] = least;
  if (p[slot.blur] > 400) p[slot.blur] = 400;
  // Counts of slits are above 1, lengths in metres below: only lengths are bounded.
  for (let i = slot.sizes; i < p.length; i++) if (p[i] < 0) p[i] = Math.max(-20, Math.min(-2, p[i]));
}

/** A work space for one set of pixels: residuals and derivatives, reused between fits. */
export class Fitter {
  readonly pattern: PatternEvaluator;
  readonly #noise: NoiseLaw;
  readonly #expected: Float64Array;
  readonly #residual: Float64Array;
  readonly #weight: Float64Array;
  readonly #columns: Float64Array[] = [];
  readonly #transformed: Float64Array;
  readonly #base: Float64Array;

  constructor(pattern: PatternEvaluator, noise: NoiseLaw) {
    const { n } = pattern.set;
    this.pattern = pattern;
    this.#noise = noise;
    this.#expected = new Float64Array(n);
    this.#residual = new Float64Array(n);
    this.#weight = new Float64Array(n);
    this.#transformed = new Float64Array(n);
    this.#base = new Float64Array(n);
  }

  /** Levenberg–Marquardt from `start`, which is kept. Best parameters so far are always what comes back. */
  run(start: Parameters, options: FitOptions): Fit {
    const free = options.free;
    const m = free.length;
    const { n, bin } = this.pattern.set;
    while (this.#columns.length < m) this.#columns.push(new Float64Array(n));
    let p = Float64Array.from(start);
    clampInPlace(p, bin);
    this.#transform(p, options);
    let cost = this.#cost(p, options);
    let damping = 1e-3;
    let steps = 0;
    let stopped: Fit['stopped'] = 'steps';
    const normal = new Float64Array(m * m);
    const gradient = new Float64Array(m);
    while (steps < options.maxSteps) {
      steps += 1;
      this.pattern.evaluate(p, this.#expected, { free, columns: this.#columns });
      this.#residuals(options);
      this.#accumulate(m, normal, gradient);
      let accepted = false;
      let gain = 0;
      for (let attempt = 0; attempt < 7; attempt++) {
        const damped = Float64Array.from(normal);
        for (let i = 0; i < m; i++) damped[i * m + i] += damping * normal[i * m + i] + 1e-12;
        const step = solveSymmetric(damped, gradient, m);
        if (step) {
          const next = Float64Array.from(p);
          for (let i = 0; i < m; i++) {
            const limit =
              free[i] === slot.amplitude || free[i] >= slot.sizes ? 0.3 : Number.POSITIVE_INFINITY;
            next[free[i]] += Math.max(-limit, Math.min(limit, step[i]));
          }
          clampInPlace(next, bin);
          const trial = this.#cost(next, options);
          if (trial < cost) {
            gain = cost - trial;
            p = next;
            cost = trial;
            damping = Math.max(damping / 8, 1e-9);
            accepted = true;
            break;
          }
        }
        damping *= 6;
      }
      if (!accepted) {
        stopped = damping > 1e3 ? 'stuck' : 'converged';
        break;
      }
      if (gain < 1e-7 * cost * 10) {
        stopped = 'converged';
        break;
      }
      if (options.hopeless !== undefined && steps >= 3 && cost > options.hopeless) {
        stopped = 'hopeless';
        break;
      }
    }
    return { parameters: p, cost, steps, stopped };
  }

  /** Mean cost of given parameters. */
  costOf(p: Parameters, options: FitOptions): number {
    this.#transform(p, options);
    return this.#cost(p, options);
  }

  /** Covariance of the free parameters at `p` (unit variance of the residuals), or null where it is singular. */
  covariance(p: Parameters, options: FitOptions): Float64Array | null {
    const m = options.free.length;
    while (this.#columns.length < m) this.#columns.push(new Float64Array(this.pattern.set.n));
    this.#transform(p, options);
    this.pattern.evaluate(p, this.#expected, { free: options.free, columns: this.#columns });
    this.#residuals(options);
    const normal = new Float64Array(m * m);
    this.#accumulate(m, normal, new Float64Array(m));
    return invertSymmetric(normal, m);
  }

  /** Σ (∂m/∂θ)²/σ² over the free parameters, per bin and scaled to the best bin of each parameter. */
  information(p: Parameters, options: FitOptions): (k: number) => number {
    const { n } = this.pattern.set;
    while (this.#columns.length < options.free.length) this.#columns.push(new Float64Array(n));
    this.#transform(p, options);
    this.pattern.evaluate(p, this.#expected, { free: options.free, columns: this.#columns });
    this.#residuals(options);
    const worth = new Float64Array(n);
    for (let f = 0; f < options.free.length; f++) {
      const column = this.#columns[f];
      let total = 0;
      for (let k = 0; k < n; k++) total += (column[k] * this.#weight[k]) ** 2;
      if (total > 0) for (let k = 0; k < n; k++) worth[k] += (column[k] * this.#weight[k]) ** 2 / total;
    }
    return (k) => worth[k];
  }

  /** Expected counts and residuals over σ at `p`; views into the work space, valid until the next call. */
  residualsAt(p: Parameters, options: FitOptions): { expected: Float64Array; residual: Float64Array } {
    this.#transform(p, options);
    this.pattern.evaluate(p, this.#expected);
    this.#residuals(options);
    return { expected: this.#expected, residual: this.#residual };
  }

  /**
   * What stays fixed during a fit: the background of the start, the data through the transform about it, or the weights
   * from the start's model.
   */
  #transform(p: Parameters, options: FitOptions): void {
    const { set } = this.pattern;
    this.#texture = options.texture;
    for (let k = 0; k < set.n; k++) this.#base[k] = this.pattern.background(p, k);
    if (options.residuals === 'stabilised') {
      for (let k = 0; k < set.n; k++) this.#transformed[k] = this.#stabilise(set.d[k] - this.#base[k]);
      return;
    }
    this.pattern.evaluate(p, this.#expected);
    for (let k = 0; k < set.n; k++)
      this.#transformed[k] = 1 / Math.sqrt(this.#variance(this.#expected[k] - this.#base[k]));
  }

  #stabilise(x: number): number {
    const n2 = this.pattern.set.bin * this.pattern.set.bin;
    const v = this.#noise.a / n2;
    const g = this.#noise.b / n2;
    const e2 = Math.max(this.#noise.c / n2, this.#texture);
    if (x <= 0) return x / Math.sqrt(v);
    const e = Math.sqrt(e2);
    const at = (m: number) => Math.log(2 * e * Math.sqrt(v + g * m + e2 * m * m) + 2 * e2 * m + g) / e;
    return at(x) - at(0);
  }

  #variance(signal: number): number {
    const m = signal > 0 ? signal : 0;
    const { bin } = this.pattern.set;
    return (this.#noise.a + this.#noise.b * m + this.#noise.c * m * m) / (bin * bin);
  }

  #cost(p: Parameters, options: FitOptions): number {
    this.pattern.evaluate(p, this.#expected);
    this.#residuals(options);
    const { n } = this.pattern.set;
    let sum = 0;
    for (let k = 0; k < n; k++) {
      const r = Math.abs(this.#residual[k]);
      sum += r <= options.huber ? r * r : options.huber * (2 * r - options.huber);
    }
    return n === 0 || !Number.isFinite(sum) ? Number.POSITIVE_INFINITY : sum / n;
  }

  /** Residuals over σ, and the factor that turns a derivative of counts into one of the residual. */
  #residuals(options: FitOptions): void {
    const { set } = this.pattern;
    const n2 = set.bin * set.bin;
    const a = this.#noise.a / n2;
    const b = this.#noise.b / n2;
    const c = Math.max(this.#noise.c / n2, this.#texture);
    const stabilised = options.residuals === 'stabilised';
    for (let k = 0; k < set.n; k++) {
      let slope: number;
      if (stabilised) {
        const m = this.#expected[k] - this.#base[k];
        const positive = m > 0 ? m : 0;
        slope = 1 / Math.sqrt(a + b * positive + c * positive * positive);
        this.#residual[k] = this.#transformed[k] - this.#stabilise(m);
      } else {
        slope = this.#transformed[k];
        this.#residual[k] = (set.d[k] - this.#expected[k]) * slope;
      }
      const r = Math.abs(this.#residual[k]);
      // √ of Huber's weight on both residual and derivative.
      this.#weight[k] = r > options.huber ? slope * Math.sqrt(options.huber / r) : slope;
    }
    this.#huber = options.huber;
  }
  #huber = 4;
  #texture = 1e-4;

  #accumulate(m: number, normal: Float64Array, gradient: Float64Array): void {
    const { n } = this.pattern.set;
    for (let f = 0; f < m; f++) {
      const column = this.#columns[f];
      for (let k = 0; k < n; k++) column[k] *= this.#weight[k];
    }
    for (let f = 0; f < m; f++) {
      const a = this.#columns[f];
      let g = 0;
      for (let k = 0; k < n; k++) {
        const r = this.#residual[k];
        const size = r < 0 ? -r : r;
        g += a[k] * (size > this.#huber ? r * Math.sqrt(this.#huber / size) : r);
      }
      gradient[f] = g;
      for (let h = 0; h <= f; h++) {
        const b = this.#columns[h];
        let sum = 0;
        for (let k = 0; k < n; k++) sum += a[k] * b[k];
        normal[f * m + h] = sum;
        normal[h * m + f] = sum;
      }
    }
  }
}
