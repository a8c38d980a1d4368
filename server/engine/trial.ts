import { Fitter, type Fit, type FitOptions } from '#server/engine/fit.ts';
import type { Frame } from '#server/engine/frame.ts';
import { createPattern, slot, type Parameters } from '#server/engine/pattern.ts';
import type { PixelSet } from '#server/engine/pixel-set.ts';
import { planeAt } from '#server/engine/frame.ts';
import type { ApertureFamily, FarFieldModel } from '#shared/apertures/family.ts';
import type { Geometry } from '#shared/physics/geometry.ts';

/** A family's model with numbers: one answer in the making. */
export interface Trial {
  readonly family: ApertureFamily;
  readonly model: FarFieldModel;
  readonly parameters: Parameters;
  /** Mean cost per pixel on the set it was fitted to last; Infinity before the first fit. */
  readonly cost: number;
}

/** What all fits of one identification share. */
export interface Bench {
  readonly frame: Frame;
  readonly geometry: Geometry;
}

/** Fitted sizes of a trial in metres, in the order of its model's keys. */
export function sizesOf(trial: Trial): number[] {
  return Array.from(trial.parameters.subarray(slot.sizes), Math.exp);
}

/** Whole numbers are compared, never fitted or scaled. */
export function isCount(family: ApertureFamily, key: string): boolean {
  return family.parameters.some((p) => p.key === key && p.kind === 'count');
}

/** Numbers free in a fit: centre, sizes, amplitude and offset always; the others when asked for. */
export function freeOf(trial: Trial, extras: { slopes?: boolean; blur?: boolean } = {}): number[] {
  const free: number[] = [slot.amplitude, slot.x, slot.y, slot.offset];
  if (trial.family.rotationPeriod !== null) free.push(slot.turn);
  if (extras.slopes) free.push(slot.slopeX, slot.slopeY);
  if (extras.blur) free.push(slot.blur);
  trial.model.keys.forEach((key, i) => {
    if (!isCount(trial.family, key)) free.push(slot.sizes + i);
  });
  return free;
}

/** Start of a fit from sizes and a direction, with the background of the frame. */
export function startTrial(
  bench: Bench,
  family: ApertureFamily,
  model: FarFieldModel,
  sizes: readonly number[],
  turn: number,
  center: { x: number; y: number },
): Trial {
  const p = new Float64Array(slot.sizes + sizes.length);
  const { background } = bench.frame;
  p[slot.x] = center.x;
  p[slot.y] = center.y;
  p[slot.turn] = turn;
  p[slot.offset] = planeAt(background, center.x, center.y);
  p[slot.slopeX] = background.slopeX * 100;
  p[slot.slopeY] = background.slopeY * 100;
  sizes.forEach((size, i) => (p[slot.sizes + i] = Math.log(size)));
  return { family, model, parameters: p, cost: Number.POSITIVE_INFINITY };
}

/** Offset and slopes are stated about this place, the same for every trial of an identification. */
export function originOf(bench: Bench): { x: number; y: number } {
  return { x: bench.frame.background.x0, y: bench.frame.background.y0 };
}

/** A fitter for a trial's model over a set of pixels. */
export function fitterFor(bench: Bench, trial: Trial, set: PixelSet): Fitter {
  return new Fitter(createPattern(trial.model, bench.geometry, set, originOf(bench)), bench.frame.noise);
}

/** Fits a trial; the result is a new trial. */
export function fitTrial(
  bench: Bench,
  trial: Trial,
  set: PixelSet,
  options: FitOptions,
): { trial: Trial; fit: Fit } {
  const fit = fitterFor(bench, trial, set).run(trial.parameters, options);
  return { trial: { ...trial, parameters: fit.parameters, cost: fit.cost }, fit };
}

/** The trial with an amplitude that makes the square roots of data and model agree best. */
export function withAmplitude(bench: Bench, trial: Trial, set: PixelSet): Trial {
  const pattern = createPattern(trial.model, bench.geometry, set, originOf(bench));
  const p = Float64Array.from(trial.parameters);
  p[slot.amplitude] = 0;
  const expected = new Float64Array(set.n);
  pattern.evaluate(p, expected);
  let both = 0;
  let own = 0;
  for (let k = 0; k < set.n; k++) {
    const base = pattern.background(p, k);
    const m = Math.max(expected[k] - base, 0);
    const d = Math.max(set.d[k] - base, 0);
    both += Math.sqrt(m * d);
    own += m;
  }
  p[slot.amplitude] = 2 * Math.log(Math.max(both / Math.max(own, 1e-12), 1e-6));
  return { ...trial, parameters: p };
}
