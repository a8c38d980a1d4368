import { withoutBeamBlock } from '#server/engine/beam-block.ts';
import { findCenters, otherCenters } from '#server/engine/center.ts';
import { finestFringes } from '#server/engine/finest-fringes.ts';
import { judge, type Judgement } from '#server/engine/judge.ts';
import type {
  Candidate,
  FarFieldFinding,
  Outcome,
  Picture,
  Progress,
  Setup,
  Untold,
  UnusableReason,
} from '#server/engine/outcome.ts';
import { slot } from '#server/engine/pattern.ts';
import { prepare } from '#server/engine/prepare.ts';
import { rankTrials, type Ranking } from '#server/engine/rank.ts';
import { coarseScoreAbout, searchAbout } from '#server/engine/search.ts';
import { sizesOf, type Bench } from '#server/engine/trial.ts';
import { candidateOf, centerUncertainty, smallestMeasurable } from '#server/engine/uncertainty.ts';
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
  if (!best || best.judgement.verdict === 'unidentified') {
    tell('Trying other centres', 0.72);
    const rivals = promisingCenters(bench, [...centers.slice(1), ...otherCenters(frame)], best);
    rivals.forEach((center, i) => {
      const share = (s: number) => 0.76 + (0.2 * (i + s)) / rivals.length;
      const rival = examine(bench, center, (step, s) => tell(`${step}, another centre`, share(s)));
      if (rival && (!best || rival.judgement.misfit < best.judgement.misfit)) best = rival;
    });
  }
  if (!best) return { kind: 'unusable', reasons: ['no-center'], picture: facts };
  const unresolved = unresolvedReason(bench, best);
  if (unresolved) return { kind: 'unusable', reasons: [unresolved], picture: facts };
  tell('Working out the uncertainties', 0.97);
  const outcome = answer(best, setup);
  tell('Done', 1);
  return outcome;
}

interface Examined {
  readonly ranking: Ranking;
  readonly judgement: Judgement;
  readonly center: { readonly x: number; readonly y: number };
  readonly coarseScore: number;
}

function examine(
  open: Bench,
  center: { x: number; y: number },
  onStep: (step: string, share: number) => void,
): Examined | null {
  const bench = { ...open, frame: withoutBeamBlock(open.frame, center) };
  const random = seededRandom(20_240_607);
  const found = searchAbout(bench, center, random, (step, share) => onStep(step, 0.6 * share));
  if (!found || found.trials.length === 0) return null;
  const ranking = rankTrials(bench, found.trials, random, (step, share) => onStep(step, 0.6 + 0.4 * share));
  return { ranking, judgement: judge(ranking), center, coarseScore: found.coarseScore };
}

/**
 * Fringes too fine for the pixels, or too coarse for the frame, whichever shape they belong to. Fine ones need two
 * witnesses, the fitted size and the picture's own finest structure: a wrong shape may come out far too large.
 */
function unresolvedReason(
  { frame, geometry }: Bench,
  { ranking, judgement }: Examined,
): UnusableReason | null {
  const best = judgement.ranked[0].finalist;
  const extent = best.family.extent(best.model.toFamily(sizesOf(best)));
  const period = pixelsPerFringe(extent, geometry.wavelength, geometry.distance, geometry.pixelPitch);
  if (period < pixelsPerFringeLimit) {
    const center = { x: best.parameters[slot.x], y: best.parameters[slot.y] };
    return finestFringes(frame, center) < pixelsPerFringeLimit ? 'fringes-undersampled' : null;
  }
  const named = judgement.verdict !== 'unidentified';
  return named && extent < smallestMeasurable(ranking, best) ? 'no-minimum-in-frame' : null;
}

/** At most two other centres that the atlas likes about as much as the one already tried. */
function promisingCenters(
  bench: Bench,
  proposals: readonly { x: number; y: number }[],
  tried: Examined | null,
): { x: number; y: number }[] {
  const least = tried ? tried.coarseScore - 0.04 : -1;
  const known = tried ? [tried.center] : [];
  return proposals
    .map((center) => ({ center, score: coarseScoreAbout(bench, center) }))
    .filter(({ score }) => score > least)
    .sort((p, q) => q.score - p.score)
    .map(({ center }) => center)
    .filter((center) => {
      if (known.some((k) => Math.hypot(k.x - center.x, k.y - center.y) < 4)) return false;
      known.push(center);
      return true;
    })
    .slice(0, 2);
}

function answer({ ranking, judgement }: Examined, setup: Setup): Outcome {
  const { frame } = ranking.bench;
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
      ...factsOf(frame, {
        ...best.fit.center,
        u: centerUncertainty(ranking, judgement.ranked[0].finalist),
      }),
      // The refined law rests on a fit; without a shape that fits only the plain one means anything.
      noise: judgement.verdict === 'unidentified' ? ranking.plainNoise : frame.noise,
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
  if (setup.encoding === 'srgb') untold.push('unknown-response');
  return untold;
}
