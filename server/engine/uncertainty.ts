import type { Candidate, CandidateDimension, Measured, Setup } from '#server/engine/outcome.ts';
import { slot } from '#server/engine/pattern.ts';
import type { Finalist, Ranking } from '#server/engine/rank.ts';
import { fitterFor, sizesOf } from '#server/engine/trial.ts';

/** Relative standard uncertainty of λL/p: the scale of every size (JCGM 100, 5.1.6, product of powers). */
export function scaleUncertainty(setup: Setup): number {
  const relative = (q: Measured) => q.u / q.value;
  return Math.hypot(relative(setup.wavelength), relative(setup.distance), relative(setup.pixelPitch));
}

/** A finalist as it leaves the engine: sizes with both parts of their uncertainty, direction in [0, period). */
export function candidateOf(
  ranking: Ranking,
  finalist: Finalist,
  probability: number,
  setup: Setup,
): Candidate {
  const { family, model, parameters, free } = finalist;
  const sizes = sizesOf(finalist);
  const values = model.toFamily(sizes);
  const covariance = fitterFor(ranking.bench, finalist, ranking.set).covariance(parameters, {
    ...ranking.options,
    free,
  });
  const inflation = Math.max(1, finalist.cost);
  const sigma = (which: number): number => {
    const f = free.indexOf(which);
    return covariance && f >= 0 ? Math.sqrt(Math.max(covariance[f * free.length + f], 0) * inflation) : 0;
  };
  const scale = scaleUncertainty(setup);
  const dimensions: Record<string, CandidateDimension> = {};
  for (const parameter of family.parameters) {
    const i = model.keys.indexOf(parameter.key);
    const value = values[parameter.key] ?? null;
    if (i < 0 || value === null) {
      dimensions[parameter.key] = { value: null, uImage: 0, uSetup: 0, u: 0, bound: null };
      continue;
    }
    const uImage = sigma(slot.sizes + i) * value;
    const uSetup = parameter.kind === 'length' ? value * scale : 0;
    dimensions[parameter.key] = { value, uImage, uSetup, u: Math.hypot(uImage, uSetup), bound: null };
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

function backgroundAtCenter(ranking: Ranking, p: Float64Array): Candidate['fit']['background'] {
  const { x0, y0 } = ranking.bench.frame.background;
  const slopeX = p[slot.slopeX] / 100;
  const slopeY = p[slot.slopeY] / 100;
  return { offset: p[slot.offset] + slopeX * (p[slot.x] - x0) + slopeY * (p[slot.y] - y0), slopeX, slopeY };
}
