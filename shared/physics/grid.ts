/**
 * Conventions of every sampled plane here: row-major, x along columns to the right, y along rows *upwards* (row 0 is the
 * lowest), n samples of spacing δ with sample n/2 (even n) or (n − 1)/2 (odd n) at the origin. Angles are
 * counter-clockwise from +x. The forward transform has the minus sign; its spacing is 1/(nδ). Pictures run downwards:
 * geometry.ts alone turns them.
 */

/** Index of the sample at the origin. */
export function originIndex(n: number): number {
  return n >> 1;
}

/** Coordinate of sample `i` of `n` with this spacing, in the unit of the spacing. */
export function coordinate(i: number, n: number, spacing: number): number {
  return (i - originIndex(n)) * spacing;
}

/** Spacing of the transform of n samples of this spacing: 1/(nδ). */
export function transformSpacing(n: number, spacing: number): number {
  return 1 / (n * spacing);
}
