/**
 * From picture coordinates to spatial frequencies. Pictures have x to the right and y downwards from the centre of the
 * top-left pixel; optics has y upwards. This file is the only place where the sign of y changes.
 */

export interface Geometry {
  /** `lens`: focal plane, paraxial; the others: direction cosines over a flat sensor or screen. */
  readonly kind: 'sensor' | 'screen' | 'lens';
  /** metres */
  readonly wavelength: number;
  /** metres, distance or focal length */
  readonly distance: number;
  /** metres at the pattern */
  readonly pixelPitch: number;
}

/**
 * Spatial frequency (cycles per metre, y up) seen by a pixel `dx` to the right of and `dy` below the optical axis.
 * sin θ / λ with the exact direction cosine X/√(X²+Y²+L²); X/f for a lens. Goodman, Introduction to Fourier Optics, ch. 4.
 */
export function spatialFrequency(geometry: Geometry, dx: number, dy: number): { fx: number; fy: number } {
  const X = dx * geometry.pixelPitch;
  const Y = -dy * geometry.pixelPitch;
  const reach =
    geometry.kind === 'lens'
      ? geometry.distance
      : Math.sqrt(X * X + Y * Y + geometry.distance * geometry.distance);
  return { fx: X / (geometry.wavelength * reach), fy: Y / (geometry.wavelength * reach) };
}
