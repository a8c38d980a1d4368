import { planeAt, type Frame } from '#server/engine/frame.ts';
import { quantileInPlace } from '#server/engine/median.ts';
import { fft2InPlace } from '#shared/physics/fft.ts';

/** Power this many times the noise's own is structure: the largest of 10⁵ noise samples is 12 times the mean. */
const significant = 40;

/**
 * Period in pixels of the finest structure that stands out of the noise, whatever the shape: the transform of a pattern
 * is the autocorrelation of its opening, whose support ends at the opening's extent (Wiener–Khinchin; Goodman). Taken from a
 * window of at most 512² pixels about the centre; never below 2.
 */
export function finestFringes(frame: Frame, center: { x: number; y: number }): number {
  const side = Math.min(512, 2 ** Math.floor(Math.log2(Math.min(frame.width, frame.height))));
  const left = placeOf(center.x, side, frame.width);
  const top = placeOf(center.y, side, frame.height);
  const re = new Float64Array(side * side);
  const im = new Float64Array(side * side);
  const taper = Float64Array.from({ length: side }, (_, i) => Math.sin((Math.PI * (i + 0.5)) / side) ** 2);
  const floor = 4 * Math.sqrt(frame.noise.a);
  for (let j = 0; j < side; j++)
    for (let i = 0; i < side; i++) {
      const k = (top + j) * frame.width + left + i;
      const signal = frame.data[k] - planeAt(frame.background, left + i, top + j);
      re[j * side + i] = taper[i] * taper[j] * Math.sqrt(Math.max(signal, 0) + floor);
    }
  fft2InPlace(re, im, side, side, 'forward');
  const corner: number[] = [];
  const half = side / 2;
  for (let j = half - (side >> 4); j < half; j++)
    for (let i = half - (side >> 4); i < half; i++)
      corner.push(re[j * side + i] ** 2 + im[j * side + i] ** 2);
  const limit = significant * quantileInPlace(Float64Array.from(corner), 0.5);
  let finest = 0;
  for (let j = 0; j < side; j++)
    for (let i = 0; i < side; i++) {
      const k = j * side + i;
      if (re[k] * re[k] + im[k] * im[k] < limit) continue;
      const fx = i < half ? i : side - i;
      const fy = j < half ? j : side - j;
      finest = Math.max(finest, fx * fx + fy * fy);
    }
  return Math.max(2, side / Math.sqrt(Math.max(finest, 1)));
}

function placeOf(center: number, side: number, size: number): number {
  return Math.max(0, Math.min(size - side, Math.round(center - side / 2)));
}
