/** Why a pixel takes no part in the fit; 0 means that it does. */
export const maskReason = { used: 0, saturated: 1, rim: 2, hot: 3, block: 4 } as const;

/** Variance of a pixel in linear counts: a + b·I + c·I². */
export interface NoiseLaw {
  readonly a: number;
  readonly b: number;
  readonly c: number;
}

/** Offset at pixel (x0, y0) and slopes per pixel to the right and downwards, linear counts. */
export interface Plane {
  readonly x0: number;
  readonly y0: number;
  readonly offset: number;
  readonly slopeX: number;
  readonly slopeY: number;
}

/** A linearised picture with its mask, noise and background; rows from the top. */
export interface Frame {
  readonly width: number;
  readonly height: number;
  readonly data: Float32Array;
  readonly mask: Uint8Array;
  readonly noise: NoiseLaw;
  readonly background: Plane;
  readonly saturatedShare: number;
  /** True where the file format has altered the counts (JPEG). */
  readonly lossy: boolean;
}

export function planeAt(plane: Plane, x: number, y: number): number {
  return plane.offset + plane.slopeX * (x - plane.x0) + plane.slopeY * (y - plane.y0);
}

/** Variance at a mean intensity above the background, never below a quarter of the floor. */
export function varianceAt(noise: NoiseLaw, intensity: number): number {
  const above = Math.max(intensity, 0);
  return noise.a + noise.b * above + noise.c * above * above;
}
