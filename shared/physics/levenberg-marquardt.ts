import { invertSymmetric, solveSymmetric } from '#shared/physics/linear-algebra.ts';

/** What a least-squares problem of few parameters and many residuals has to give. */
export interface LeastSquaresProblem {
  /** Half the sum of squares at `p`; not finite where `p` is not allowed. */
  cost(p: Float64Array): number;
  /** Writes JᵀJ (m × m, row-major, both triangles) and Jᵀr at `p`. */
  normalEquations(p: Float64Array, normal: Float64Array, gradient: Float64Array): void;
}

export interface LeastSquaresOptions {
  readonly maxSteps?: number;
  /** Stops when a step changes every parameter by less than this share of its size. */
  readonly tolerance?: number;
}

/**
 * `converged`: steps have become negligible at a point without slope; `runaway`: parameters leave without end
 * while the sum of squares hardly falls, a minimum at infinity; `stuck`: no step lowers the sum though the slope is not
 * zero; `steps`: out of steps. Only `converged` is an answer; the best point met is returned in every case.
 */
export type StopReason = 'converged' | 'runaway' | 'stuck' | 'steps';

export interface LeastSquaresSolution {
  readonly parameters: Float64Array;
  readonly cost: number;
  readonly steps: number;
  readonly stopped: StopReason;
  /** Inverse of JᵀJ at the end (m × m), or null where the residuals do not determine every parameter. */
  readonly covariance: Float64Array | null;
}

/** Inverse through the matrix scaled to unit diagonal, which takes the units out of its condition. */
function scaledInverse(normal: Float64Array, m: number): Float64Array | null {
  const scale = Float64Array.from({ length: m }, (_, i) => Math.sqrt(normal[i * m + i]));
  if (scale.some((s) => !(s > 0))) return null;
  const unit = normal.map((value, k) => value / (scale[Math.floor(k / m)] * scale[k % m]));
  const inverse = invertSymmetric(unit, m);
  return inverse && inverse.map((value, k) => value / (scale[Math.floor(k / m)] * scale[k % m]));
}

/** The damped step in units of the scaled parameters, or null where the damped matrix is still singular. */
function dampedStep(
  normal: Float64Array,
  gradient: Float64Array,
  scale: Float64Array,
  damping: number,
): Float64Array | null {
  const m = gradient.length;
  const a = new Float64Array(m * m);
  const b = new Float64Array(m);
  for (let i = 0; i < m; i++) {
    b[i] = -gradient[i] / scale[i];
    for (let j = 0; j < m; j++) a[i * m + j] = normal[i * m + j] / (scale[i] * scale[j]);
    a[i * m + i] += damping;
  }
  const step = solveSymmetric(a, b, m);
  if (step) for (let i = 0; i < m; i++) step[i] /= scale[i];
  return step;
}

/**
 * Minimises half a sum of squares from `start` (kept) by Marquardt's method (SIAM J. 11 (1963) 431) with Moré's scaling
 * by the largest column norms met (Lecture Notes in Mathematics 630 (1978) 105) and Nielsen's damping update. Throws nothing.
 */
export function levenbergMarquardt(
  problem: LeastSquaresProblem,
  start: ArrayLike<number>,
  options: LeastSquaresOptions = {},
): LeastSquaresSolution {
  const { maxSteps = 500, tolerance = 1e-10 } = options;
  const m = start.length;
  let p = Float64Array.from(start);
  let cost = problem.cost(p);
  const normal = new Float64Array(m * m);
  const gradient = new Float64Array(m);
  const scale = new Float64Array(m);
  let damping = 1e-3;
  let growth = 2;
  let steps = 0;
  let stopped: StopReason = 'steps';
  problem.normalEquations(p, normal, gradient);
  while (steps < maxSteps) {
    steps += 1;
    for (let i = 0; i < m; i++) scale[i] = Math.max(scale[i], Math.sqrt(normal[i * m + i])) || 1;
    const step = dampedStep(normal, gradient, scale, damping);
    const next = step ? p.map((value, i) => value + step[i]) : p;
    const small = step !== null && step.every((s, i) => Math.abs(s) <= tolerance * (Math.abs(p[i]) + 1e-300));
    const trial = step ? problem.cost(next) : Number.POSITIVE_INFINITY;
    const gain = cost - trial;
    if (step && gain > 0) {
      let foretold = 0;
      for (let i = 0; i < m; i++)
        foretold += (step[i] * (damping * scale[i] * scale[i] * step[i] - gradient[i])) / 2;
      const quality = gain / foretold;
      damping = Math.max(damping * Math.max(1 / 5, 1 - (2 * quality - 1) ** 3), 1e-14);
      growth = 2;
      p = next;
      cost = trial;
      problem.normalEquations(p, normal, gradient);
    } else {
      damping *= growth;
      growth *= 2;
    }
    if (small || damping > 1e18) {
      stopped = judge(normal, gradient, cost, p, start, small);
      break;
    }
  }
  if (stopped === 'steps' && ranAway(p, start)) stopped = 'runaway';
  return { parameters: p, cost, steps, stopped, covariance: scaledInverse(normal, m) };
}

/** Parameters a million times their start: nothing that an everyday start is meant for. */
function ranAway(p: Float64Array, start: ArrayLike<number>): boolean {
  return p.some((value, i) => Math.abs(value) > 1e6 * (Math.abs(start[i]) + 1e-300) && start[i] !== 0);
}

/**
 * A point is a minimum when the undamped step promises nothing: the gain it foretells is below rounding, or the residual
 * has no component along any column.
 */
function judge(
  normal: Float64Array,
  gradient: Float64Array,
  cost: number,
  p: Float64Array,
  start: ArrayLike<number>,
  small: boolean,
): StopReason {
  if (ranAway(p, start)) return 'runaway';
  const m = gradient.length;
  let cosine = 0;
  for (let i = 0; i < m; i++) {
    const length = Math.sqrt(2 * cost * normal[i * m + i]);
    if (length > 0) cosine = Math.max(cosine, Math.abs(gradient[i]) / length);
  }
  return small || cosine < 1e-6 ? 'converged' : 'stuck';
}

/**
 * A problem from its residuals alone: `residuals(p, out)` writes all of them; derivatives by central differences with the
 * step that balances rounding and curvature, ∛ε of the parameter's size. Exact derivatives are better where they are cheap.
 */
export function residualProblem(
  count: number,
  residuals: (p: Float64Array, out: Float64Array) => void,
): LeastSquaresProblem {
  const here = new Float64Array(count);
  const above = new Float64Array(count);
  const below = new Float64Array(count);
  return {
    cost(p) {
      residuals(p, here);
      let sum = 0;
      for (let k = 0; k < count; k++) sum += here[k] * here[k];
      return sum / 2;
    },
    normalEquations(p, normal, gradient) {
      const m = p.length;
      residuals(p, here);
      const columns: Float64Array[] = [];
      for (let i = 0; i < m; i++) {
        const h = Math.cbrt(Number.EPSILON) * (Math.abs(p[i]) || 1e-8);
        const moved = Float64Array.from(p);
        moved[i] = p[i] + h;
        residuals(moved, above);
        const high = moved[i];
        moved[i] = p[i] - h;
        residuals(moved, below);
        const width = high - moved[i];
        columns.push(above.map((value, k) => (value - below[k]) / width));
      }
      for (let i = 0; i < m; i++) {
        gradient[i] = columns[i].reduce((sum, value, k) => sum + value * here[k], 0);
        for (let j = 0; j <= i; j++) {
          const dot = columns[i].reduce((sum, value, k) => sum + value * columns[j][k], 0);
          normal[i * m + j] = dot;
          normal[j * m + i] = dot;
        }
      }
    },
  };
}
