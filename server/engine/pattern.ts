import type { PixelSet } from '#server/engine/pixel-set.ts';
import type { FarFieldModel } from '#shared/apertures/family.ts';
import type { Geometry } from '#shared/physics/geometry.ts';

/** Places of the parameters that every pattern has, before its sizes. */
export const slot = {
  amplitude: 0,
  x: 1,
  y: 2,
  turn: 3,
  offset: 4,
  slopeX: 5,
  slopeY: 6,
  blur: 7,
  sizes: 8,
} as const;

/** ln amplitude, centre px, turn rad, offset and slopes in counts (per 100 px), blur variance px², then ln of each size. */
export type Parameters = Float64Array;

/** Evaluates one model over one set of pixels; owns its scratch memory, so calls allocate nothing. */
export interface PatternEvaluator {
  readonly set: PixelSet;
  /** Writes expected counts and, when `jacobian` is given, the derivatives by the free parameters (columns, n each). */
  evaluate(
    p: Parameters,
    expected: Float64Array,
    jacobian?: { free: readonly number[]; columns: Float64Array[] },
  ): void;
  /** Background in counts at bin k. */
  background(p: Parameters, k: number): number;
}

const slopeUnit = 100;
const sizeStep = 2e-4;

/**
 * The pattern at a bin is the mean of four nodes at ±√(bin²/12 + blur²): the variance of the bin's box and of the blur
 * together. Derivatives by centre and turn come from the nodes, those by the sizes from small changes of each.
 */
export function createPattern(
  model: FarFieldModel,
  geometry: Geometry,
  set: PixelSet,
  origin: { x: number; y: number },
): PatternEvaluator {
  const { n } = set;
  const u = new Float64Array(4 * n);
  const v = new Float64Array(4 * n);
  const nodes = new Float64Array(4 * n);
  const moved = new Float64Array(4 * n);
  const middle = new Float64Array(n);
  const values = new Float64Array(model.keys.length);
  const pixel = geometry.pixelPitch;
  const distance2 = geometry.distance * geometry.distance;
  const lens = geometry.kind === 'lens';

  function frequencies(p: Parameters, delta: number): void {
    const c = Math.cos(p[slot.turn]);
    const s = Math.sin(p[slot.turn]);
    for (let q = 0; q < 4; q++) {
      const ox = (q & 1 ? delta : -delta) - p[slot.x];
      const oy = (q & 2 ? delta : -delta) - p[slot.y];
      const base = q * n;
      for (let k = 0; k < n; k++) {
        const X = (set.x[k] + ox) * pixel;
        const Y = -(set.y[k] + oy) * pixel;
        const reach = lens ? geometry.distance : Math.sqrt(X * X + Y * Y + distance2);
        const scale = 1 / (geometry.wavelength * reach);
        u[base + k] = (c * X + s * Y) * scale;
        v[base + k] = (c * Y - s * X) * scale;
      }
    }
  }

  function sizes(p: Parameters, changed: number): void {
    for (let i = 0; i < values.length; i++)
      values[i] = Math.exp(p[slot.sizes + i]) * (i === changed ? 1 + sizeStep : 1);
  }

  const background = (p: Parameters, k: number): number =>
    p[slot.offset] +
    (p[slot.slopeX] * (set.x[k] - origin.x) + p[slot.slopeY] * (set.y[k] - origin.y)) / slopeUnit;

  return {
    set,
    background,
    evaluate(p, expected, jacobian) {
      const delta = Math.sqrt(Math.max((set.bin * set.bin) / 12 + p[slot.blur], 1e-3));
      frequencies(p, delta);
      sizes(p, -1);
      model.intensity(values, u, v, nodes, 4 * n);
      const amplitude = Math.exp(p[slot.amplitude]);
      for (let k = 0; k < n; k++) {
        const mean = (nodes[k] + nodes[n + k] + nodes[2 * n + k] + nodes[3 * n + k]) / 4;
        expected[k] = amplitude * mean + background(p, k);
      }
      if (!jacobian) return;
      const { free, columns } = jacobian;
      free.forEach((which, f) => {
        const column = columns[f];
        if (which >= slot.sizes) {
          sizes(p, which - slot.sizes);
          model.intensity(values, u, v, moved, 4 * n);
          const scale = amplitude / (4 * sizeStep);
          for (let k = 0; k < n; k++)
            column[k] =
              scale *
              (moved[k] -
                nodes[k] +
                moved[n + k] -
                nodes[n + k] +
                moved[2 * n + k] -
                nodes[2 * n + k] +
                moved[3 * n + k] -
                nodes[3 * n + k]);
          return;
        }
        for (let k = 0; k < n; k++) {
          const a = nodes[k];
          const b = nodes[n + k];
          const c = nodes[2 * n + k];
          const d = nodes[3 * n + k];
          switch (which) {
            case slot.amplitude:
              column[k] = (amplitude * (a + b + c + d)) / 4;
              break;
            case slot.x:
              column[k] = (-amplitude * (b + d - a - c)) / (4 * delta);
              break;
            case slot.y:
              column[k] = (-amplitude * (c + d - a - b)) / (4 * delta);
              break;
            case slot.turn:
              column[k] =
                (amplitude *
                  ((set.x[k] - p[slot.x]) * (c + d - a - b) - (set.y[k] - p[slot.y]) * (b + d - a - c))) /
                (4 * delta);
              break;
            case slot.offset:
              column[k] = 1;
              break;
            case slot.slopeX:
              column[k] = (set.x[k] - origin.x) / slopeUnit;
              break;
            case slot.slopeY:
              column[k] = (set.y[k] - origin.y) / slopeUnit;
              break;
            default:
              column[k] = 0;
          }
        }
        if (which === slot.blur) blurColumn(p, delta, amplitude, column);
      });
    },
  };

  /** d/dδ² of the four-node mean is half the Laplacian: (mean − middle)/δ². */
  function blurColumn(p: Parameters, delta: number, amplitude: number, column: Float64Array): void {
    const c = Math.cos(p[slot.turn]);
    const s = Math.sin(p[slot.turn]);
    for (let k = 0; k < n; k++) {
      const X = (set.x[k] - p[slot.x]) * pixel;
      const Y = -(set.y[k] - p[slot.y]) * pixel;
      const reach = lens ? geometry.distance : Math.sqrt(X * X + Y * Y + distance2);
      const scale = 1 / (geometry.wavelength * reach);
      moved[k] = (c * X + s * Y) * scale;
      moved[n + k] = (c * Y - s * X) * scale;
    }
    sizes(p, -1);
    model.intensity(values, moved.subarray(0, n), moved.subarray(n, 2 * n), middle, n);
    for (let k = 0; k < n; k++) {
      const mean = (nodes[k] + nodes[n + k] + nodes[2 * n + k] + nodes[3 * n + k]) / 4;
      column[k] = (amplitude * (mean - middle[k])) / (delta * delta);
    }
  }
}
