import type { Plane } from '#src/ui/pattern/counts.ts';

/** Mean counts along a line through a centre, one value a pixel; NaN outside the picture. */
export interface Profile {
  /** Pixels from the centre, negative before it. */
  readonly at: Float64Array;
  readonly counts: Float64Array;
}

/** Half-width in pixels over which the profile is averaged across the line. */
const across = 2;

/**
 * Counts along the direction `angle` (radians counter-clockwise as displayed; y of pictures runs down), averaged over five
 * parallel lines, bilinear between pixels.
 */
export function profileAlong(
  plane: Plane,
  center: { x: number; y: number },
  angle: number,
  reach: number,
): Profile {
  const n = 2 * Math.floor(reach) + 1;
  const at = new Float64Array(n);
  const counts = new Float64Array(n);
  const dx = Math.cos(angle);
  const dy = -Math.sin(angle);
  for (let i = 0; i < n; i++) {
    const s = i - Math.floor(reach);
    at[i] = s;
    let sum = 0;
    let hits = 0;
    for (let k = -across; k <= across; k++) {
      const value = bilinear(plane, center.x + s * dx - k * dy, center.y + s * dy + k * dx);
      if (Number.isNaN(value)) continue;
      sum += value;
      hits += 1;
    }
    counts[i] = hits > 0 ? sum / hits : Number.NaN;
  }
  return { at, counts };
}

function bilinear(plane: Plane, x: number, y: number): number {
  const i = Math.floor(x);
  const j = Math.floor(y);
  if (i < 0 || j < 0 || i + 1 >= plane.width || j + 1 >= plane.height) return Number.NaN;
  const a = x - i;
  const b = y - j;
  const k = j * plane.width + i;
  const { counts } = plane;
  return (
    (1 - b) * ((1 - a) * counts[k] + a * counts[k + 1]) +
    b * ((1 - a) * counts[k + plane.width] + a * counts[k + plane.width + 1])
  );
}
