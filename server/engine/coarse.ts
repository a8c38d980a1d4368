import { templateOrigin, unitAtlas, type Template } from '#server/engine/atlas.ts';
import { logPolar, type LogPolarMap } from '#server/engine/log-polar.ts';
import { fft2InPlace } from '#shared/physics/fft.ts';

/** A family's unit shape laid over the picture: where its weighted normalised correlation peaks. */
export interface CoarseCandidate {
  readonly family: string;
  readonly model: Template['model'];
  /** Fitted values of the model in metres. */
  readonly values: number[];
  /** Radians counter-clockwise, in [0, π). */
  readonly orientation: number;
  /** −1 … 1. */
  readonly score: number;
}

/**
 * Correlates the picture's map with every template over all sizes and directions at once.
 * `frequencyPerPixel`: spatial frequency (1/m) of one pixel from the axis, 1·pitch/(λL). Best first.
 */
export function coarseSearch(map: LogPolarMap, frequencyPerPixel: number): CoarseCandidate[] {
  const { angles, rows } = logPolar;
  const size = rows * angles;
  const { values, weights, used } = map;
  let w = 0;
  let wf = 0;
  for (let k = 0; k < size; k++) {
    w += weights[k];
    wf += weights[k] * values[k];
  }
  if (w === 0 || used < 4) return [];
  const mean = wf / w;
  let energy = 0;
  const aRe = new Float64Array(size);
  const aIm = new Float64Array(size);
  const wRe = new Float64Array(size);
  const wIm = new Float64Array(size);
  for (let k = 0; k < size; k++) {
    const f = values[k] - mean;
    aRe[k] = weights[k] * f;
    wRe[k] = weights[k];
    energy += weights[k] * f * f;
  }
  fft2InPlace(aRe, aIm, rows, angles, 'forward');
  fft2InPlace(wRe, wIm, rows, angles, 'forward');
  const unitFrequency = frequencyPerPixel * map.firstRadius;
  const scratch = Array.from({ length: 4 }, () => new Float64Array(size)) as [
    Float64Array,
    Float64Array,
    Float64Array,
    Float64Array,
  ];
  return unitAtlas()
    .map((template) => {
      const firstRow = smallestRow(template.extent, map);
      const peak = bestShift(
        template,
        { aRe, aIm, wRe, wIm, w, energy },
        [firstRow, rows - used - 1],
        scratch,
      );
      const size = Math.exp((peak.row - templateOrigin) * logPolar.step) / unitFrequency;
      const turn = -peak.column * logPolar.step;
      return {
        family: template.family,
        model: template.model,
        values: template.values.map((value, i) => (template.counts[i] ? value : value * size)),
        orientation: ((turn % Math.PI) + Math.PI) % Math.PI,
        score: peak.score,
      };
    })
    .sort((p, q) => q.score - p.score);
}

/** The row of the smallest size looked for: one whose first minimum lies a little outside the picture. */
function smallestRow(extent: number, map: LogPolarMap): number {
  const smallest = (0.7 * map.firstRadius) / (map.reach * extent);
  const row = Math.ceil(templateOrigin + Math.log(smallest) / logPolar.step);
  return Math.max(1, Math.min(row, logPolar.rows - map.used - 2));
}

interface Spectra {
  readonly aRe: Float64Array;
  readonly aIm: Float64Array;
  readonly wRe: Float64Array;
  readonly wIm: Float64Array;
  readonly w: number;
  readonly energy: number;
}

function bestShift(
  t: Template,
  s: Spectra,
  [firstRow, lastRow]: readonly [number, number],
  scratch: [Float64Array, Float64Array, Float64Array, Float64Array],
): { row: number; column: number; score: number } {
  const { angles, rows } = logPolar;
  const [pRe, pIm, qRe, qIm] = scratch;
  for (let k = 0; k < pRe.length; k++) {
    // conj(A)·T in the real slot, conj(W)·T in the imaginary one; conj(W)·T² alone in the second.
    const ar = s.aRe[k] * t.re[k] + s.aIm[k] * t.im[k];
    const ai = s.aRe[k] * t.im[k] - s.aIm[k] * t.re[k];
    const br = s.wRe[k] * t.re[k] + s.wIm[k] * t.im[k];
    const bi = s.wRe[k] * t.im[k] - s.wIm[k] * t.re[k];
    pRe[k] = ar - bi;
    pIm[k] = ai + br;
    qRe[k] = s.wRe[k] * t.squareRe[k] + s.wIm[k] * t.squareIm[k];
    qIm[k] = s.wRe[k] * t.squareIm[k] - s.wIm[k] * t.squareRe[k];
  }
  fft2InPlace(pRe, pIm, rows, angles, 'inverse');
  fft2InPlace(qRe, qIm, rows, angles, 'inverse');
  const score = (row: number, column: number): number => {
    const k = row * angles + ((column + angles) % angles);
    const variance = qRe[k] - (pIm[k] * pIm[k]) / s.w;
    return variance > 1e-6 * s.w ? pRe[k] / Math.sqrt(variance * s.energy) : 0;
  };
  let best = { row: firstRow, column: 0, score: -1 };
  for (let row = firstRow; row < lastRow; row++)
    for (let column = 0; column < angles; column++) {
      const value = score(row, column);
      if (value > best.score) best = { row, column, score: value };
    }
  const { row, column } = best;
  return {
    row: row + vertex(score(row - 1, column), best.score, score(row + 1, column)),
    column: column + vertex(score(row, column - 1), best.score, score(row, column + 1)),
    score: best.score,
  };
}

function vertex(before: number, here: number, after: number): number {
  const bend = before - 2 * here + after;
  return bend < 0 ? Math.max(-0.5, Math.min(0.5, (before - after) / (2 * bend))) : 0;
}
