import { coarseSearch, type CoarseCandidate } from '#server/engine/coarse.ts';
import { finestFringes } from '#server/engine/finest-fringes.ts';
import { logPolarMap } from '#server/engine/log-polar.ts';
import { slot } from '#server/engine/pattern.ts';
import { allBins, pick, signalToNoise, type PixelSet } from '#server/engine/pixel-set.ts';
import {
  fitTrial,
  freeOf,
  sizesOf,
  startTrial,
  withAmplitude,
  type Bench,
  type Trial,
} from '#server/engine/trial.ts';
import { familyOf } from '#shared/apertures/registry.ts';
import { pixelsPerFringe } from '#shared/physics/sampling.ts';

const perFamily = 3;
const seedCount = 16;
const samplesPerFringe = 8;
/** A start whose near fit costs more than this many times the best one's is given up. */
const hopelessRatio = 5;

/** Screening tolerates 8 % of what the model leaves out and gives up early. */
const screening = { residuals: 'stabilised', maxSteps: 14, huber: 4, texture: 0.0064 } as const;

/** The best trial of each model about one centre, by cost on one set of pixels; best first. */
export function searchAbout(
  bench: Bench,
  center: { x: number; y: number },
  random: () => number,
  onStep: (step: string, share: number) => void,
): { trials: Trial[]; set: PixelSet; coarseScore: number } | null {
  const { geometry, frame } = bench;
  onStep('Comparing with the atlas', 0);
  const coarse = coarseSearch(logPolarMap(frame, center), frequencyPerPixel(bench));
  if (coarse.length === 0) return null;
  const seeds = chooseSeeds(coarse);
  const extent = Math.min(...seeds.slice(0, 4).map(extentOf));
  const period = pixelsPerFringe(extent, geometry.wavelength, geometry.distance, geometry.pixelPitch);
  const bin = screeningBin(bench, extent * 1.3, center);
  const all = screeningSet(bench, bin, center, Number.POSITIVE_INFINITY, random);
  const near = screeningSet(bench, bin, center, 8 * period, random);
  const run = new Screening(bench, near, all);
  seeds.forEach((seed, i) => {
    const family = familyOf(seed.family);
    onStep(`Comparing with ${family.label.toLowerCase()}`, 0.15 + (0.55 * i) / seeds.length);
    run.try(startTrial(bench, family, seed.model, seed.values, seed.orientation, center));
  });
  onStep('Comparing with neighbouring shapes', 0.7);
  const expanded = new Set<Trial>();
  for (let round = 0; round < 2; round++) expandKin(run, center, expanded);
  return { trials: run.ranked(), set: all, coarseScore: coarse[0].score };
}

/** How well the atlas likes a centre: the best correlation of any unit pattern. */
export function coarseScoreAbout(bench: Bench, center: { x: number; y: number }): number {
  return coarseSearch(logPolarMap(bench.frame, center), frequencyPerPixel(bench))[0]?.score ?? -1;
}

function frequencyPerPixel({ geometry }: Bench): number {
  return geometry.pixelPitch / (geometry.wavelength * geometry.distance);
}

function chooseSeeds(coarse: readonly CoarseCandidate[]): CoarseCandidate[] {
  const counts = new Map<string, number>();
  const seeds: CoarseCandidate[] = [];
  for (const candidate of coarse) {
    const n = counts.get(candidate.family) ?? 0;
    if (n >= perFamily || (seeds.length >= seedCount && n > 0)) continue;
    counts.set(candidate.family, n + 1);
    seeds.push(candidate);
  }
  return seeds;
}

function extentOf(seed: CoarseCandidate): number {
  return familyOf(seed.family).extent(seed.model.toFamily(seed.values));
}

/** Bin side that leaves enough samples on the finest fringe of an opening of this extent. */
export function binFor(bench: Bench, extent: number, samples = samplesPerFringe): number {
  const { geometry } = bench;
  const period = pixelsPerFringe(extent, geometry.wavelength, geometry.distance, geometry.pixelPitch);
  return Math.max(1, Math.min(24, Math.floor(period / samples)));
}

/** The atlas cannot see fringes finer than its cells: bins follow the finest structure of the picture, within a quarter. */
function screeningBin(bench: Bench, extent: number, center: { x: number; y: number }): number {
  const expected = binFor(bench, extent);
  if (expected < 2) return expected;
  const finest = Math.floor(finestFringes(bench.frame, center) / 6);
  return Math.max(1, Math.ceil(expected / 4), Math.min(expected, finest));
}

/** Some 2 000 bins: mostly where there is signal, evenly by chance, some for the background. */
function screeningSet(
  bench: Bench,
  bin: number,
  center: { x: number; y: number },
  radius: number,
  random: () => number,
): PixelSet {
  const all = allBins(bench.frame, bin, center, radius);
  return pick(
    all,
    2000,
    0.75,
    (k) => Math.min(signalToNoise(bench.frame, all, k), 4) + 0.5 * random(),
    random,
  );
}

/** Near fringes first, then all of them; a start that is hopeless near the centre is not carried on. */
class Screening {
  #least = Number.POSITIVE_INFINITY;
  readonly best = new Map<string, Trial>();

  constructor(
    readonly bench: Bench,
    readonly near: PixelSet,
    readonly all: PixelSet,
  ) {}

  try(start: Trial): void {
    const lit = withAmplitude(this.bench, start, this.near);
    const free = freeOf(lit);
    const first = fitTrial(this.bench, lit, this.near, { ...screening, free, maxSteps: 8 }).trial;
    if (first.cost > hopelessRatio * this.#least + 1) return;
    this.#least = Math.min(this.#least, first.cost);
    const trial = canonical(fitTrial(this.bench, first, this.all, { ...screening, free }).trial);
    if (!isNearFrame(this.bench, trial)) return;
    const key = keyOf(trial);
    const other = this.best.get(key);
    if (!other || trial.cost < other.cost) this.best.set(key, trial);
  }

  ranked(): Trial[] {
    return [...this.best.values()].sort((p, q) => p.cost - q.cost);
  }
}

/** A centre far outside the picture is a flight of the fit, not a finding. */
function isNearFrame({ frame: { width, height } }: Bench, { parameters }: Trial): boolean {
  const margin = 0.3 * Math.max(width, height);
  const [x, y] = [parameters[slot.x], parameters[slot.y]];
  return x > -margin && y > -margin && x < width + margin && y < height + margin;
}

/** Names a family's model: one trial of each is kept. */
export function keyOf({ family, model }: Pick<Trial, 'family' | 'model'>): string {
  return `${family.id} ${model.id}`;
}

/** Neighbours of the leading trials, started from the leaders' own solutions; each solution is expanded once. */
function expandKin(run: Screening, center: { x: number; y: number }, expanded: Set<Trial>): void {
  for (const leader of run.ranked().slice(0, 3)) {
    if (expanded.has(leader)) continue;
    expanded.add(leader);
    for (const start of kinStarts(run.bench, leader, center)) {
      const rival = run.best.get(keyOf(start));
      if (rival && rival.cost < leader.cost * 1.02) continue;
      run.try(start);
    }
  }
}

/** A trial for each kin of a solution, at the kin's start values. */
export function kinStarts(bench: Bench, trial: Trial, center: { x: number; y: number }): Trial[] {
  return trial.family.kin.flatMap((kin) => {
    const family = familyOf(kin.family);
    const model = family.models.find((m) => m.id === kin.model);
    const start = kin.start(trial.model.toFamily(sizesOf(trial)));
    if (!model || !start) return [];
    const turn = trial.parameters[slot.turn] + start.turn;
    const begun = startTrial(bench, family, model, start.values, turn, {
      x: trial.parameters[slot.x] || center.x,
      y: trial.parameters[slot.y] || center.y,
    });
    for (const which of [slot.offset, slot.slopeX, slot.slopeY, slot.blur])
      begun.parameters[which] = trial.parameters[which];
    return [begun];
  });
}

/** Long axis first: where the sizes came out the other way round, they change places and the axis turns by 90°. */
export function canonical(trial: Trial): Trial {
  const [first, second] = [trial.parameters[slot.sizes], trial.parameters[slot.sizes + 1]];
  const swaps = trial.family.longAxisFirst === true && second > first;
  if (!swaps) return trial;
  const parameters = Float64Array.from(trial.parameters);
  parameters[slot.sizes] = second;
  parameters[slot.sizes + 1] = first;
  parameters[slot.turn] += Math.PI / 2;
  return { ...trial, parameters };
}
