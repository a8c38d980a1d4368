/** Above this Fresnel number the far field is not taken for granted (common practice, no source). */
export const fresnelLimit = 0.1;

/** Fewer pixels per fringe than this and the contrast of the fringes is mostly lost (pixel integration, sinc). */
export const pixelsPerFringeLimit = 3.5;

/** N = a²/(λL) with a half of the opening's extent; metres. Goodman, Introduction to Fourier Optics, 4.3. */
export function fresnelNumber(extent: number, wavelength: number, distance: number): number {
  return (extent / 2) ** 2 / (wavelength * distance);
}

/** Distance in metres at which an opening of this extent has the limiting Fresnel number. */
export function farFieldDistance(extent: number, wavelength: number): number {
  return (extent / 2) ** 2 / (wavelength * fresnelLimit);
}

/** Period in pixels of the finest fringes of an opening of this extent: λL/(extent·pitch). */
export function pixelsPerFringe(
  extent: number,
  wavelength: number,
  distance: number,
  pixelPitch: number,
): number {
  return (wavelength * distance) / (extent * pixelPitch);
}
