import { findCenters } from '#server/engine/center.ts';
import type { Frame } from '#server/engine/frame.ts';
import { judge, type Judgement } from '#server/engine/judge.ts';
import type {
  Candidate,
  FarFieldFinding,
  Outcome,
  Picture,
  Progress,
  Setup,
  Untold,
} from '#server/engine/outcome.ts';
import { prepare } from '#server/engine/prepare.ts';
import { rankTrials, type Ranking } from '#server/engine/rank.ts';
import { searchAbout } from '#server/engine/search.ts';
import type { Bench } from '#server/engine/trial.ts';
import { candidateOf } from '#server/engine/uncertainty.ts';
import { factsOf, unusableReasons } from '#server/engine/inspect.ts';
import { familyOf } from '#shared/apertures/registry.ts';
import { seededRandom } from '#shared/physics/random.ts';
import {
  farFieldDistance,
  fresnelLimit,
  fresnelNumber,
  pixelsPerFringe,
  pixelsPerFringeLimit,
} from '#shared/physics/sampling.ts';

export interface IdentifyOptions {
  readonly onProgress?: Progress;
  /** Asked between steps; when it answers true the run ends with `Stopped`. */
  readonly shouldStop?: () => boolean;
}

/** Thrown by `identify` when it was asked to stop. */
export class Stopped extends Error {}

const maxCandidates = 5;

/**
 * Names the opening behind a picture: prepares it, finds its centre, compares it with every family over all sizes and
 * directions, fits the best, ranks them by evidence and says what may be claimed. Deterministic: the same picture and
 * set-up give the same outcome.
 */
export function identify(picture: Picture, setup: Setup, options: IdentifyOptions = {}): Outcome {
  let reached = 0;
  const tell = (step: string, share: number) => {
    if (options.shouldStop?.()) throw new Stopped('stopped on request');
    reached = Math.max(reached, share);
    options.onProgress?.(step, reached);
  };
  tell('Reading the picture', 0);
  const frame = prepare(picture, setup);
  tell('Finding the centre', 0.08);
  const centers = findCenters(frame, 4);
  const facts = factsOf(frame, centers[0]);
  const reasons = unusableReasons(frame, centers.length > 0);
  if (reasons.length > 0) return { kind: 'unusable', reasons, picture: facts };

  const bench: Bench = {
    frame,
    geometry: {
      kind: setup.geometry,
      wavelength: setup.wavelength.value,
      distance: setup.distance.value,
      pixelPitch: setup.pixelPitch.value,
    },
  };
  let best = examine(bench, centers[0], (step, share) => tell(step, 0.12 + 0.6 * share));
  // A misfit may be a wrong centre: the other hypotheses get their chance before anything is called unknown.
  const others =
    best && best.judgement.verdict !== 'unidentified' ? [] : [...centers.slice(1), ...brightCenters(frame)];
  others.forEach((center, i) => {
    const share = (s: number) => 0.72 + (0.24 * (i + s)) / others.length;
    const rival = examine(bench, center, (step, s) => tell(`${step}, centre tried anew`, share(s)));
    if (rival && (!best || rival.judgement.misfit < best.judgement.misfit)) best = rival;
  });
  if (!best) return { kind: 'unusable', reasons: ['no-center'], picture: facts };
  tell('Working out the uncertainties', 0.97);
  const outcome = answer(best, setup, frame);
  tell('Done', 1);
  return outcome;
}

interface Examined {
  readonly ranking: Ranking;
  readonly judgement: Judgement;
}

function examine(
  bench: Bench,
  center: { x: number; y: number },
  onStep: (step: string, share: number) => void,
): Examined | null {
  const random = seededRandom(20_240_607);
  const found = searchAbout(bench, center, random, (step, share) => onStep(step, 0.6 * share));
  if (!found || found.trials.length === 0) return null;
  const ranking = rankTrials(bench, found.trials, random, (step, share) => onStep(step, 0.6 + 0.4 * share));
  return { ranking, judgement: judge(ranking) };
}

/** Middle of the brightest pixels, saturated ones included: where a symmetry search was led astray by a crop. */
function brightCenters(frame: Frame): { x: number; y: number }[] {
  const { data, width, mask } = frame;
  let top = 0;
  for (let k = 0; k < data.length; k++) if (mask[k] <= 2 && data[k] > top) top = data[k];
  let x = 0;
  let y = 0;
  let n = 0;
  for (let k = 0; k < data.length; k++)
    if (mask[k] <= 2 && data[k] > 0.7 * top) {
      x += k % width;
      y += Math.floor(k / width);
      n += 1;
    }
  return n > 0 ? [{ x: x / n, y: y / n }] : [];
}

function answer({ ranking, judgement }: Examined, setup: Setup, frame: Frame): Outcome {
  const candidates = judgement.ranked
    .slice(0, maxCandidates)
    .map(({ finalist, probability }) => candidateOf(ranking, finalist, probability, setup));
  const best = candidates[0];
  const farField = farFieldOf(best, setup);
  return {
    kind: 'answer',
    verdict: judgement.verdict,
    candidates,
    untold: untoldBy(candidates, farField, setup),
    farField,
    picture: {
      ...factsOf(frame, { ...best.fit.center, score: 1 }),
      noise: ranking.bench.frame.noise,
    },
  };
}

function farFieldOf(best: Candidate, setup: Setup): FarFieldFinding {
  if (setup.geometry === 'lens') return { holds: true, fresnelNumber: 0, distanceNeeded: null };
  const extent = familyOf(best.family).extent(best.values);
  const n = fresnelNumber(extent, setup.wavelength.value, setup.distance.value);
  return {
    holds: n <= fresnelLimit,
    fresnelNumber: n,
    distanceNeeded: farFieldDistance(extent, setup.wavelength.value),
  };
}

function untoldBy(candidates: readonly Candidate[], farField: FarFieldFinding, setup: Setup): Untold[] {
  const best = candidates[0];
  const family = familyOf(best.family);
  const untold: Untold[] = ['half-turn-twin', 'complement', 'scale', 'place'];
  if (
    family.parameters.some((p) => p.nullable)
      ? Object.values(best.values).includes(null)
      : family.area(best.values) === null
  )
    untold.push('unresolved-length');
  if (Object.values(best.dimensions).some((d) => d.bound !== null)) untold.push('bounded-dimension');
  if (!farField.holds) untold.push('near-field');
  const period = pixelsPerFringe(
    family.extent(best.values),
    setup.wavelength.value,
    setup.distance.value,
    setup.pixelPitch.value,
  );
  if (period < pixelsPerFringeLimit) untold.push('undersampled');
  if (setup.encoding === 'srgb') untold.push('unknown-response');
  return untold;
}
