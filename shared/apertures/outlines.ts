import type { Ring } from '#shared/apertures/family.ts';

/** Signed distance (metres, negative inside) of a box of the given whole width and height about the origin. */
export function boxDistance(x: number, y: number, width: number, height: number): number {
  const dx = Math.abs(x) - width / 2;
  const dy = Math.abs(y) - height / 2;
  const outside = Math.hypot(Math.max(dx, 0), Math.max(dy, 0));
  return outside + Math.min(Math.max(dx, dy), 0);
}

/** A box as a ring, counter-clockwise, centred at (cx, cy). */
export function boxRing(width: number, height: number, cx = 0, cy = 0): Ring {
  const a = width / 2;
  const b = height / 2;
  return [
    [cx - a, cy - b],
    [cx + a, cy - b],
    [cx + a, cy + b],
    [cx - a, cy + b],
  ];
}

/** An ellipse of the given whole extents as a ring of `n` points, counter-clockwise. */
export function ellipseRing(width: number, height: number, n = 96): Ring {
  return Array.from({ length: n }, (_, i) => {
    const t = (2 * Math.PI * i) / n;
    return [(width / 2) * Math.cos(t), (height / 2) * Math.sin(t)] as const;
  });
}

/** An obround (semicircular ends on the x axis) of overall length and width, counter-clockwise. */
export function obroundRing(length: number, width: number, n = 32): Ring {
  const r = width / 2;
  const c = (length - width) / 2;
  const cap = (cx: number, from: number) =>
    Array.from({ length: n + 1 }, (_, i) => {
      const t = from + (Math.PI * i) / n;
      return [cx + r * Math.cos(t), r * Math.sin(t)] as const;
    });
  return [...cap(c, -Math.PI / 2), ...cap(-c, Math.PI / 2)];
}
