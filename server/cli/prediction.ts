import type { Candidate, Outcome } from '#server/engine/outcome.ts';
import { familyOf } from '#shared/apertures/registry.ts';
import { fromSi } from '#shared/quantities.ts';

/** An answer as a line of a predictions file: lengths in µm, angles in degrees, centre in pixels from the top left. */
export interface Prediction {
  readonly id: string;
  readonly verdict: 'identified' | 'ambiguous' | 'unidentified';
  readonly ranked: readonly RankedFamily[];
  readonly centerPx: readonly [number, number] | null;
  readonly farField: boolean;
  readonly elapsedMs: number;
  /** Why nothing could be identified in the picture. */
  readonly unusable?: readonly string[];
  /** Why the case could not be run at all. */
  readonly error?: string;
}

interface RankedFamily {
  readonly family: string;
  readonly params: Record<string, number | null>;
  readonly orientationDeg: number | null;
  readonly standardUncertainty: Record<string, number | null>;
  readonly setupUncertainty: Record<string, number | null>;
  readonly bounds: Record<string, string>;
  readonly score: number;
  readonly reducedChiSquare: number;
}

export function predictionOf(id: string, outcome: Outcome, elapsedMs: number): Prediction {
  const { center } = outcome.picture;
  const centerPx = center ? ([center.x, center.y] as const) : null;
  if (outcome.kind === 'unusable')
    return {
      id,
      verdict: 'unidentified',
      ranked: [],
      centerPx,
      farField: true,
      elapsedMs,
      unusable: outcome.reasons,
    };
  return {
    id,
    verdict: outcome.verdict,
    ranked: outcome.candidates.map(rankedFamily),
    centerPx,
    farField: outcome.farField.holds,
    elapsedMs,
  };
}

/** The line of a case that could not be run: an answer that names nothing. */
export function failedPrediction(id: string, error: string, elapsedMs: number): Prediction {
  return { id, verdict: 'unidentified', ranked: [], centerPx: null, farField: true, elapsedMs, error };
}

function rankedFamily(candidate: Candidate): RankedFamily {
  const params: Record<string, number | null> = {};
  const whole: Record<string, number | null> = {};
  const setup: Record<string, number | null> = {};
  const bounds: Record<string, string> = {};
  for (const { key, kind } of familyOf(candidate.family).parameters) {
    const dimension = candidate.dimensions[key];
    const name = kind === 'length' ? `${key}Um` : key;
    const write = (value: number) => (kind === 'length' ? fromSi(value, 'um') : value);
    params[name] = dimension.value === null ? null : write(dimension.value);
    whole[name] = dimension.value === null ? null : write(dimension.u);
    setup[name] = dimension.value === null ? null : write(dimension.uSetup);
    if (dimension.bound) bounds[name] = dimension.bound;
  }
  const { orientation } = candidate;
  whole['orientationDeg'] = orientation && fromSi(orientation.u, 'deg');
  return {
    family: candidate.family,
    params,
    orientationDeg: orientation && fromSi(orientation.value, 'deg'),
    standardUncertainty: whole,
    setupUncertainty: setup,
    bounds,
    score: Math.min(1, Math.max(0, candidate.probability)),
    reducedChiSquare: candidate.reducedChiSquare,
  };
}
