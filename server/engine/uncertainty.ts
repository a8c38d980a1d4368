import type { Candidate, CandidateDimension, Measured, Setup } from '#server/engine/outcome.ts';
import { slot } from '#server/engine/pattern.ts';
import type { Finalist, Ranking } from '#server/engine/rank.ts';
import { fitterFor, sizesOf, type Trial } from '#server/engine/trial.ts';

/** Relative standard uncertainty of λL/p: the scale of every size (JCGM 100, 5.1.6, product of powers). */
export function scaleUncertainty(setup: Setup): number {
  const relative = (q: Measured) => q.u / q.value;
  return Math.hypot(relative(setup.wavelength), relative(setup.distance), relative(setup.pixelPitch));
}

/** Standard uncertainty from image noise of each free number of a finalist, in the units of its parameters. */
function imageUncertainty(ranking: Ranking, finalist: Finalist): (which: number) => number {
  const { parameters, free } = finalist;
  const covariance = fitterFor(ranking.bench, finalist, ranking.set).covariance(parameters, {
    ...ranking.options,
    free,
  });
  const inflation = Math.max(1, finalist.cost);
  return (which) => {
    const f = free.indexOf(which);
    return covariance && f >= 0 ? Math.sqrt(Math.max(covariance[f * free.length + f], 0) * inflation) : 0;
  };
}

/** The largest size, in metres, whose first minimum would lie outside the frame: sizes below it are only bounded. */
export function smallestMeasurable({ bench }: Ranking, { parameters }: Trial): number {
  const { frame, geometry } = bench;
  const dx = Math.max(parameters[slot.x], frame.width - 1 - parameters[slot.x]);
  const dy = Math.max(parameters[slot.y], frame.height - 1 - parameters[slot.y]);
  return (geometry.wavelength * geometry.distance) / (Math.hypot(dx, dy) * geometry.pixelPitch);
}

/** A finalist as it leaves the engine: sizes with both parts of their uncertainty, direction in [0, period). */
export function candidateOf(
  ranking: Ranking,
  finalist: Finalist,
  probability: number,
  setup: Setup,
): Candidate {
  const { family, model, parameters } = finalist;
  const sizes = sizesOf(finalist);
  const values: Record<string, number | null> = { ...model.toFamily(sizes) };
  const sigma = imageUncertainty(ranking, finalist);
  const scale = scaleUncertainty(setup);
  const least = smallestMeasurable(ranking, finalist);
  const dimensions: Record<string, CandidateDimension> = {};
  for (const { key, kind } of family.parameters) {
    const i = model.keys.indexOf(key);
    const value = values[key] ?? null;
    if (i < 0 || value === null) {
      dimensions[key] = { value: null, uImage: 0, uSetup: 0, u: 0, bound: null };
      continue;
    }
    if (kind === 'length' && value < least) {
      values[key] = least;
      dimensions[key] = {
        value: least,
        uImage: 0,
        uSetup: least * scale,
        u: least * scale,
        bound: 'at-most',
      };
      continue;
    }
    const uImage = sigma(slot.sizes + i) * value;
    const uSetup = kind === 'length' ? value * scale : 0;
    dimensions[key] = { value, uImage, uSetup, u: Math.hypot(uImage, uSetup), bound: null };
  }
  const period = family.rotationPeriod;
  return {
    family: family.id,
    model: model.id,
    values,
    dimensions,
    orientation:
      period === null
        ? null
        : { value: ((parameters[slot.turn] % period) + period) % period, u: sigma(slot.turn) },
    orientationPeriod: period,
    probability,
    reducedChiSquare: finalist.reducedChiSquare,
    fit: {
      values: sizes,
      center: { x: parameters[slot.x], y: parameters[slot.y] },
      amplitude: Math.exp(parameters[slot.amplitude]),
      background: backgroundAtCenter(ranking, parameters),
      blurVariance: parameters[slot.blur],
    },
  };
}

/** Standard uncertainty of a finalist's centre, px: the larger of the two directions. */
export function centerUncertainty(ranking: Ranking, finalist: Finalist): number {
  const sigma = imageUncertainty(ranking, finalist);
  return Math.max(sigma(slot.x), sigma(slot.y));
}

function backgroundAtCenter(ranking: Ranking, p: Float64Array): Candidate['fit']['background'] {
  const { x0, y0 } = ranking.bench.frame.background;
  const slopeX = p[slot.slopeX] / 100;
  const slopeY = p[slot.slopeY] / 100;
  return { offset: p[slot.offset] + slopeX * (p[slot.x] - x0) + slopeY * (p[slot.y] - y0), slopeX, slopeY };
}
