import type { FitOptions } from '#server/engine/fit.ts';
import { varianceAt, type Frame, type NoiseLaw } from '#server/engine/frame.ts';
import { lawFromResiduals } from '#server/engine/noise.ts';
import { slot } from '#server/engine/pattern.ts';
import { allBins, pick, type PixelSet } from '#server/engine/pixel-set.ts';
import { binFor, canonical, keyOf, kinStarts } from '#server/engine/search.ts';
import { fitterFor, fitTrial, freeOf, sizesOf, type Bench, type Trial } from '#server/engine/trial.ts';

/** A finalist: fitted to the same pixels with the same weights as all other finalists. */
export interface Finalist extends Trial {
  /** −2 ln evidence in units of the best finalist's dispersion; lower is better. */
  readonly evidence: number;
  /** Mean squared residual over σ. */
  readonly reducedChiSquare: number;
  /** Numbers that were free. */
  readonly free: readonly number[];
}

export interface Ranking {
  readonly bench: Bench;
  readonly finalists: readonly Finalist[];
  readonly set: PixelSet;
  readonly options: FitOptions;
  /** Noise as estimated without any model: what a misfit is measured against. */
  readonly plainNoise: NoiseLaw;
}

const middle = { residuals: 'stabilised', maxSteps: 20, huber: 4, texture: 1e-4 } as const;
const last = { residuals: 'weighted', maxSteps: 8, huber: 4, texture: 1e-4 } as const;
const finalPixels = 28_000;
/** A finalist this many times worse after the middle fit cannot win: it is listed, not polished. */
const outOfReach = 2.5;

/** Takes the leading trials through the middle and the last fit and orders them by evidence. */
export function rankTrials(
  bench: Bench,
  trials: readonly Trial[],
  random: () => number,
  onStep: (step: string, share: number) => void,
): Ranking {
  const leader = trials[0];
  const extent = leader.family.extent(leader.model.toFamily(sizesOf(leader)));
  const center = { x: leader.parameters[slot.x], y: leader.parameters[slot.y] };
  const bin = binFor(bench, extent * 1.2);
  const all = allBins(bench.frame, bin, center, Number.POSITIVE_INFINITY);
  const some = pick(all, 5000, 0.8, worthOf(bench, leader, all), random);
  onStep('Refining the best shapes', 0);
  const contenders = trials.filter((t) => t.cost < 8 * leader.cost + 1).slice(0, 6);
  let fitted = contenders
    .map((t) => canonical(fitTrial(bench, t, some, { ...middle, free: freeOf(t, { slopes: true }) }).trial))
    .sort((p, q) => p.cost - q.cost);
  fitted = withKin(bench, fitted, some);
  onStep('Measuring the noise', 0.35);
  const refined: Bench = { ...bench, frame: { ...bench.frame, noise: refineNoise(bench, fitted[0], all) } };
  const set = pick(all, finalPixels, 0.93, worthOf(refined, fitted[0], all), random);
  const finalists: Trial[] = [];
  const short = fitted.slice(0, 5);
  const blurred = wantsBlur(refined, short[0], set);
  short.forEach((t, i) => {
    onStep(`Measuring as ${t.family.label.toLowerCase()}`, 0.45 + (0.5 * i) / short.length);
    const polished = t.cost < outOfReach * short[0].cost + 0.5;
    finalists.push(polished ? lastFit(refined, t, set, blurred) : roughFit(refined, t, set));
  });
  return { ...order(refined, finalists, set, blurred), plainNoise: bench.frame.noise };
}

/** Every finalist's simpler and richer neighbours get a start from its solution, so that nested shapes lose only on merit. */
function withKin(bench: Bench, fitted: readonly Trial[], set: PixelSet): Trial[] {
  const leader = fitted[0];
  const best = new Map(fitted.map((t) => [keyOf(t), t]));
  for (const start of kinStarts(bench, leader, {
    x: leader.parameters[slot.x],
    y: leader.parameters[slot.y],
  })) {
    start.parameters[slot.amplitude] = leader.parameters[slot.amplitude];
    const options = { ...middle, free: freeOf(start, { slopes: true }) };
    const trial = canonical(fitTrial(bench, start, set, options).trial);
    const key = keyOf(trial);
    const other = best.get(key);
    if (!other || trial.cost < other.cost) best.set(key, trial);
  }
  return [...best.values()].sort((p, q) => p.cost - q.cost);
}

/** How much a bin can say: (radial + tangential change)² of the model over the variance, by differences to its neighbours. */
function worthOf(bench: Bench, trial: Trial, set: PixelSet): (k: number) => number {
  const fitter = fitterFor(bench, trial, set);
  const free = freeOf(trial).filter((which) => which !== slot.offset && which !== slot.amplitude);
  return fitter.information(trial.parameters, { ...last, free });
}

function refineNoise(bench: Bench, trial: Trial, all: PixelSet): NoiseLaw {
  const { frame } = bench;
  const thin = all.n > 60_000 ? Math.ceil(all.n / 60_000) : 1;
  const fitter = fitterFor(bench, trial, all);
  const { expected } = fitter.residualsAt(trial.parameters, { ...last, free: [] });
  const n = Math.floor(all.n / thin);
  const n2 = all.bin * all.bin;
  const signal = (i: number) => expected[i * thin] - fitter.pattern.background(trial.parameters, i * thin);
  const law = lawFromResiduals(
    n,
    signal,
    (i) => all.d[i * thin] - expected[i * thin],
    (1e-3 * frame.noise.a) / n2,
  );
  return { a: law.a * n2, b: law.b * n2, c: law.c * n2 };
}

/** Blur is fitted only when the picture asks for it: free it costs accuracy on sharp pictures. */
function wantsBlur(bench: Bench, trial: Trial, set: PixelSet): boolean {
  const sharp = { ...last, free: freeOf(trial, { slopes: true }) };
  const soft = { ...last, free: freeOf(trial, { slopes: true, blur: true }) };
  const a = fitTrial(bench, trial, set, sharp);
  const b = fitTrial(bench, a.trial, set, soft);
  return (a.fit.cost - b.fit.cost) * set.n > 12 * Math.max(1, b.fit.cost);
}

function lastFit(bench: Bench, trial: Trial, set: PixelSet, blur: boolean): Trial {
  const options: FitOptions = { ...last, free: freeOf(trial, { slopes: true, blur }) };
  let current = trial;
  for (let round = 0; round < 2; round++) current = fitTrial(bench, current, set, options).trial;
  return canonical(current);
}

/** Two steps on the final pixels: enough for a shape that the middle fit has ruled out. */
function roughFit(bench: Bench, trial: Trial, set: PixelSet): Trial {
  const options: FitOptions = { ...last, maxSteps: 2, free: freeOf(trial, { slopes: true }) };
  return canonical(fitTrial(bench, trial, set, options).trial);
}

/** Evidence on identical pixels with identical weights: those of the finalist that fits best. */
function order(
  bench: Bench,
  trials: readonly Trial[],
  set: PixelSet,
  blur: boolean,
): Omit<Ranking, 'plainNoise'> {
  const weights = weightsOf(bench.frame, trials[0], bench, set);
  const scored = trials.map((trial) => {
    const fitter = fitterFor(bench, trial, set);
    const { expected } = fitter.residualsAt(trial.parameters, { ...last, free: [] });
    let square = 0;
    let robust = 0;
    for (let k = 0; k < set.n; k++) {
      const r = (set.d[k] - expected[k]) * weights[k];
      const size = Math.abs(r);
      square += Math.min(r * r, 100);
      robust += size <= last.huber ? r * r : last.huber * (2 * size - last.huber);
    }
    return { trial, square, robust };
  });
  const least = Math.min(...scored.map((s) => s.robust));
  const dispersion = Math.max(1, least / set.n);
  const finalists = scored
    .map(({ trial, square, robust }): Finalist => {
      const free = freeOf(trial, { slopes: true, blur });
      return {
        ...trial,
        free,
        cost: robust / set.n,
        reducedChiSquare: square / Math.max(1, set.n - free.length),
        evidence: robust / dispersion + free.length * Math.log(set.n),
      };
    })
    .sort((p, q) => p.evidence - q.evidence);
  return { bench, finalists, set, options: { ...last, free: [] } };
}

function weightsOf(frame: Frame, trial: Trial, bench: Bench, set: PixelSet): Float64Array {
  const fitter = fitterFor(bench, trial, set);
  const { expected } = fitter.residualsAt(trial.parameters, { ...last, free: [] });
  const weights = new Float64Array(set.n);
  for (let k = 0; k < set.n; k++)
    weights[k] =
      set.bin /
      Math.sqrt(varianceAt(frame.noise, expected[k] - fitter.pattern.background(trial.parameters, k)));
  return weights;
}
