import { fft2InPlace } from '#shared/physics/fft.ts';
import { originIndex, transformSpacing } from '#shared/physics/grid.ts';
import type { Grid } from '#shared/physics/raster.ts';

/**
 * Far field of a real mask (n × n, row-major, origin at n/2): |Σ m exp(−2πi(f·r))|² over the square of the sum, so that
 * the axis is 1; the origin of frequencies at n/2 too, spacing 1/(nδ) in cycles per metre. n must be even; throws
 * RangeError otherwise or when the mask is empty. Goodman, Introduction to Fourier Optics, 4.3.
 */
export function farField(mask: Float64Array, grid: Grid): { intensity: Float64Array; spacing: number } {
  const { n } = grid;
  if (n % 2 !== 0) throw new RangeError(`the grid needs an even number of samples, not ${n}`);
  const real = Float64Array.from(mask);
  const imaginary = new Float64Array(n * n);
  fft2InPlace(real, imaginary, n, n, 'forward');
  const axis = real[0] * real[0];
  if (axis === 0) throw new RangeError('the mask lets no light through');
  const intensity = new Float64Array(n * n);
  const half = originIndex(n);
  for (let j = 0; j < n; j++)
    for (let i = 0; i < n; i++) {
      const k = ((j + half) % n) * n + ((i + half) % n);
      intensity[j * n + i] = (real[k] * real[k] + imaginary[k] * imaginary[k]) / axis;
    }
  return { intensity, spacing: transformSpacing(n, grid.spacing) };
}
