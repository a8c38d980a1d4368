import { logPolar } from '#server/engine/log-polar.ts';
import { isCount } from '#server/engine/trial.ts';
import { families } from '#shared/apertures/registry.ts';
import type { ApertureFamily, FarFieldModel } from '#shared/apertures/family.ts';
import { fft2InPlace } from '#shared/physics/fft.ts';

/** A unit shape's log-polar pattern: its transform and that of its square. Row t holds ln ρ = (t − origin)·step. */
export interface Template {
  readonly family: string;
  readonly model: FarFieldModel;
  readonly values: readonly number[];
  /** Which of the values are whole numbers, which do not scale. */
  readonly counts: readonly boolean[];
  /** Largest extent in unit lengths. */
  readonly extent: number;
  readonly re: Float64Array;
  readonly im: Float64Array;
  readonly squareRe: Float64Array;
  readonly squareIm: Float64Array;
}

/** The row of ρ = 1 cycle per unit length. */
export const templateOrigin = 64;
const firstRow = 20;
const lastRow = 108;
const subsamples = 4;

let atlas: readonly Template[] | undefined;

/** Forward-simulated unit patterns of every family in the registry; built once (about half a second). */
export function unitAtlas(): readonly Template[] {
  return (atlas ??= families.flatMap((family) =>
    family.unitShapes.map((shape) => {
      const model = family.models.find((m) => m.id === shape.model);
      if (!model) throw new Error(`${family.id} has no model ${shape.model}`);
      return buildTemplate(family, model, shape.values);
    }),
  ));
}

function buildTemplate(family: ApertureFamily, model: FarFieldModel, values: readonly number[]): Template {
  const { angles, rows, step } = logPolar;
  const n = subsamples * subsamples;
  const u = new Float64Array(n * angles);
  const v = new Float64Array(n * angles);
  const out = new Float64Array(n * angles);
  const re = new Float64Array(rows * angles);
  const squareRe = new Float64Array(rows * angles);
  for (let t = 0; t < rows; t++) {
    if (t < firstRow || t > lastRow) {
      const value = t < firstRow ? 1 : 0;
      re.fill(value, t * angles, (t + 1) * angles);
      squareRe.fill(value, t * angles, (t + 1) * angles);
      continue;
    }
    for (let j = 0; j < angles; j++)
      for (let a = 0; a < subsamples; a++)
        for (let b = 0; b < subsamples; b++) {
          const rho = Math.exp((t - templateOrigin + (a + 0.5) / subsamples) * step);
          const phi = (j + (b + 0.5) / subsamples) * step;
          const k = j * n + a * subsamples + b;
          u[k] = rho * Math.cos(phi);
          v[k] = rho * Math.sin(phi);
        }
    model.intensity(values, u, v, out, n * angles);
    for (let j = 0; j < angles; j++) {
      let sum = 0;
      for (let k = j * n; k < (j + 1) * n; k++) sum += out[k];
      re[t * angles + j] = Math.sqrt(sum / n);
      squareRe[t * angles + j] = sum / n;
    }
  }
  const im = new Float64Array(rows * angles);
  const squareIm = new Float64Array(rows * angles);
  fft2InPlace(re, im, rows, angles, 'forward');
  fft2InPlace(squareRe, squareIm, rows, angles, 'forward');
  const counts = model.keys.map((key) => isCount(family, key));
  const extent = family.extent(model.toFamily(values));
  return { family: family.id, model, values, counts, extent, re, im, squareRe, squareIm };
}
