import ndarray from 'ndarray';
import fft from 'ndarray-fft';

/**
 * Two-dimensional discrete Fourier transform in place, rows × columns, row-major, over ndarray-fft. Forward: minus sign in
 * the exponent, no factor; inverse: plus sign, divided by the number of samples. Any size; powers of two are fast.
 */
export function fft2InPlace(
  real: Float64Array,
  imaginary: Float64Array,
  rows: number,
  columns: number,
  direction: 'forward' | 'inverse',
): void {
  if (real.length !== rows * columns || imaginary.length !== rows * columns)
    throw new RangeError(`expected ${rows} × ${columns} samples`);
  // ndarray-fft has the plus sign in its direction 1; with real and imaginary part swapped it has the minus sign.
  fft(direction === 'forward' ? 1 : -1, ndarray(imaginary, [rows, columns]), ndarray(real, [rows, columns]));
}

/** Smallest power of two that is at least `n`. */
export function powerOfTwo(n: number): number {
  return 2 ** Math.ceil(Math.log2(Math.max(1, n)));
}
