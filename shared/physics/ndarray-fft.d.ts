declare module 'ndarray-fft' {
  import type { NdArray } from 'ndarray';
  /** In place; direction 1 has exp(+2πi…), −1 has exp(−2πi…) and divides by the number of samples. */
  export default function fft(direction: 1 | -1, real: NdArray, imaginary: NdArray): void;
}
