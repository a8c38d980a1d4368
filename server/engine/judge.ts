import type { Verdict } from '#server/engine/outcome.ts';
import { varianceAt } from '#server/engine/frame.ts';
import type { Finalist, Ranking } from '#server/engine/rank.ts';
import { fitterFor, sizesOf } from '#server/engine/trial.ts';

/** Misfit above which no shape of the catalogue is named. Found on the project's own simulations. */
const misfitLimit = 7;
/** Misfit above which an undamaged picture leaves room for a shape outside the catalogue: the first answer is not final. */
const doubtLimit = 4;
/** Evidence (−2 ln) that parts two shapes. */
const gapLimit = 12;

export interface Judgement {
  readonly verdict: Verdict;
  /** Finalists that stay, best first, with their share of probability. */
  readonly ranked: readonly { finalist: Finalist; probability: number }[];
  readonly misfit: number;
}

/** Drops degenerate members of richer families, weighs the rest and says what may be claimed. */
export function judge(ranking: Ranking): Judgement {
  const proper = ranking.finalists.filter((f) => isProper(f));
  const kept = preferSimple(proper.length > 0 ? proper : ranking.finalists);
  const best = kept[0];
  const misfit = absoluteMisfit(ranking, best);
  const known = 1 / (1 + (misfit / (0.85 * misfitLimit)) ** 4);
  const weights = kept.map((f) => Math.exp(-Math.min(700, (f.evidence - best.evidence) / 4)));
  const sum = weights.reduce((a, b) => a + b, 0);
  const ranked = kept.map((finalist, i) => ({ finalist, probability: (known * weights[i]) / sum }));
  const gap = kept.length > 1 ? kept[1].evidence - best.evidence : Number.POSITIVE_INFINITY;
  const doubtful = misfit > doubtLimit && !ranking.bench.frame.lossy;
  const verdict: Verdict =
    misfit > misfitLimit ? 'unidentified' : gap < gapLimit || doubtful ? 'ambiguous' : 'identified';
  return { verdict, ranked, misfit };
}

function isProper(finalist: Finalist): boolean {
  return finalist.family.proper(finalist.model.toFamily(sizesOf(finalist)));
}

/** One finalist per family, and of two that differ by less than the gap the simpler one first. */
function preferSimple(finalists: readonly Finalist[]): Finalist[] {
  const seen = new Set<string>();
  const kept = finalists.filter((f) => !seen.has(f.family.id) && seen.add(f.family.id));
  const best = kept[0];
  const simpler = kept.find(
    (f) =>
      f !== best &&
      f.family.complexity < best.family.complexity &&
      best.family.kin.some((kin) => kin.family === f.family.id) &&
      f.evidence - best.evidence < gapLimit / 2,
  );
  return simpler ? [simpler, ...kept.filter((f) => f !== simpler)] : kept;
}

/**
 * Mean of r²/(σ² + (5 % of the model)²) over bins brighter than 4σ, each capped at 25: whether the fringes stand where the
 * model says, whatever the number of photons.
 */
function absoluteMisfit(ranking: Ranking, finalist: Finalist): number {
  const { set, bench, plainNoise } = ranking;
  const fitter = fitterFor(bench, finalist, set);
  const { expected } = fitter.residualsAt(finalist.parameters, ranking.options);
  let sum = 0;
  let n = 0;
  for (let k = 0; k < set.n; k++) {
    const base = fitter.pattern.background(finalist.parameters, k);
    const m = Math.max(expected[k] - base, 0);
    const variance = varianceAt(plainNoise, m) / (set.bin * set.bin);
    if (set.d[k] - base < 4 * Math.sqrt(plainNoise.a / (set.bin * set.bin)) && m < 4 * Math.sqrt(variance))
      continue;
    const r = set.d[k] - expected[k];
    sum += Math.min(25, (r * r) / (variance + (0.05 * m) ** 2));
    n += 1;
  }
  return n === 0 ? 25 : sum / n;
}
