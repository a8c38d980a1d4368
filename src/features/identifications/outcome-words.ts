import { familyOf } from '#shared/apertures/registry.ts';
import type { BenchValues } from '#shared/contracts/benches.ts';
import type { Candidate, FarFieldFinding, Outcome, Untold } from '#shared/contracts/identifications.ts';
import { printQuantity } from '#shared/quantities.ts';

type Answer = Extract<Outcome, { kind: 'answer' }>;

const lower = (family: string) => familyOf(family).label.toLowerCase();

/** Candidates that stay in play beside the best one: a twentieth of its probability or more. */
export function inPlay(answer: Answer): Candidate[] {
  const [best] = answer.candidates;
  if (!best) return [];
  return answer.candidates.filter((c) => c === best || c.probability > 0.05 * best.probability);
}

/** What the identification as a whole may claim, in words. */
export function verdictSentence(answer: Answer): string {
  const [best, second] = answer.candidates;
  switch (answer.verdict) {
    case 'identified':
      return `One shape of the catalogue fits: ${lower(best.family)}.`;
    case 'ambiguous': {
      const names = inPlay(answer).map((c) => lower(c.family));
      return names.length > 1
        ? `This picture does not tell ${listed(names, 'from')}.`
        : `${familyOf(best.family).label} fits best, but not well enough to be named alone.`;
    }
    case 'unidentified':
      return second
        ? `No shape of the catalogue fits. Nearest are ${lower(best.family)} and ${lower(second.family)}, and neither is claimed.`
        : `No shape of the catalogue fits.${best ? ` Nearest is a ${lower(best.family)}, which is not claimed.` : ''}`;
  }
}

/** "a, b and c", or with another last joint. */
export function listed(names: readonly string[], joint = 'and'): string {
  return names.length < 2
    ? (names[0] ?? '')
    : `${names.slice(0, -1).join(', ')} ${joint} ${names[names.length - 1]}`;
}

/** One clause for everything that the picture cannot tell. */
export function untoldClause(untold: Untold, best: Candidate | undefined): string {
  switch (untold) {
    case 'half-turn-twin':
      return 'which way round the part lies (a half turn gives the same pattern)';
    case 'complement':
      return 'opening or obstacle (a bar for a slit, a disc for a pinhole: they differ only in the zero order)';
    case 'scale':
      return 'the scale by itself (an error of wavelength, distance or pixel pitch moves all sizes alike; U holds it)';
    case 'place':
      return 'where in its plane the opening lies';
    case 'unresolved-length':
      return 'the length (the light ends before the opening does)';
    case 'bounded-dimension': {
      const bounded = Object.entries(best?.dimensions ?? {}).find(([, d]) => d.bound !== null);
      const label =
        best &&
        familyOf(best.family)
          .parameters.find((p) => p.key === bounded?.[0])
          ?.label.toLowerCase();
      return `the ${label ?? 'size'} beyond a bound (its first dark fringe lies outside the frame)`;
    }
    case 'near-field':
      return 'sizes at full accuracy (the camera stood in the near field)';
    case 'undersampled':
      return 'fine fringes (they are narrower than 3.5 pixels)';
    case 'unknown-response':
      return 'how far the camera follows sRGB (heights of the fringes rest on it, their places do not)';
  }
}

/** Fresnel number against its limit, and the mend. */
export function farFieldSentence(found: FarFieldFinding, bench: Pick<BenchValues, 'geometry'>): string {
  if (bench.geometry === 'lens') return 'Far field: the sensor stands in the focal plane of a lens.';
  if (found.fresnelNumber === null) return 'Far field: not known, since no size is.';
  const n = found.fresnelNumber.toPrecision(2);
  if (found.holds) return `Far field holds: Fresnel number ${n}, limit 0.1.`;
  const needed =
    found.distanceNeeded === null
      ? ''
      : ` Move the camera to at least ${printQuantity(found.distanceNeeded, 'mm', 3)}.`;
  return `Near field: Fresnel number ${n}, limit 0.1. Sizes can't be trusted to their U.${needed}`;
}

/** The specimen's own orientation where the camera sees the pattern reversed; null otherwise. */
export function specimenOrientation(candidate: Candidate, mirrored: boolean): number | null {
  if (!mirrored || !candidate.orientation || candidate.orientationPeriod === null) return null;
  const period = candidate.orientationPeriod;
  return (((Math.PI - candidate.orientation.value) % period) + period) % period;
}
