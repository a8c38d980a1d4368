import { coordinate } from '#shared/physics/grid.ts';

/** A square grid: `n` × `n` samples of this spacing in metres, conventions of grid.ts. */
export interface Grid {
  readonly n: number;
  readonly spacing: number;
}

/**
 * Coverage (0 … 1) of each cell by an opening given as signed distance in metres, negative inside. Cells farther from the
 * edge than their half diagonal are decided by one sample, the others by the ramp of a straight edge averaged over
 * `oversampling`² points: the error of the covered area falls with the square of the finer spacing.
 */
export function coverage(
  distance: (x: number, y: number) => number,
  grid: Grid,
  oversampling = 4,
): Float64Array {
  const { n, spacing } = grid;
  const mask = new Float64Array(n * n);
  const fine = spacing / oversampling;
  for (let j = 0; j < n; j++) {
    const y = coordinate(j, n, spacing);
    for (let i = 0; i < n; i++) {
      const x = coordinate(i, n, spacing);
      const d = distance(x, y);
      if (Math.abs(d) > spacing) {
        mask[j * n + i] = d < 0 ? 1 : 0;
        continue;
      }
      let sum = 0;
      for (let q = 0; q < oversampling; q++)
        for (let p = 0; p < oversampling; p++) {
          const e = distance(x + (p + 0.5) * fine - spacing / 2, y + (q + 0.5) * fine - spacing / 2);
          sum += Math.min(1, Math.max(0, 0.5 - e / fine));
        }
      mask[j * n + i] = sum / (oversampling * oversampling);
    }
  }
  return mask;
}
