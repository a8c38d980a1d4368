import { encode } from 'fast-png';
import type { Picture } from '#server/engine/outcome.ts';

const side = 192;

/**
 * A grey PNG of 192 × 192 about the centre: logarithm of the mean code of each cell, from the picture's 20 % level to its
 * peak. For lists; nothing is measured in it.
 */
export function thumbnail(picture: Picture, center: { x: number; y: number } | null): Uint8Array {
  const { width, height } = picture;
  const span = Math.min(width, height);
  const left = clamp((center?.x ?? width / 2) - span / 2, 0, width - span);
  const top = clamp((center?.y ?? height / 2) - span / 2, 0, height - span);
  const cells = new Float64Array(side * side);
  for (let j = 0; j < side; j++)
    for (let i = 0; i < side; i++) cells[j * side + i] = cellMean(picture, left, top, span / side, i, j);
  const sorted = Float64Array.from(cells).sort();
  const floor = sorted[Math.floor(0.2 * sorted.length)];
  const peak = Math.max(sorted[sorted.length - 1] - floor, 1);
  const low = Math.max(peak * 2e-4, picture.codeStep * 0.7);
  const range = Math.log(1 + peak / low);
  const data = new Uint8Array(side * side);
  for (let k = 0; k < data.length; k++)
    data[k] = Math.round((255 * Math.log(1 + Math.max(cells[k] - floor, 0) / low)) / range);
  return encode({ width: side, height: side, data, channels: 1, depth: 8 });
}

function cellMean(picture: Picture, left: number, top: number, step: number, i: number, j: number): number {
  const { width, height, codes } = picture;
  const x0 = Math.floor(left + i * step);
  const y0 = Math.floor(top + j * step);
  const x1 = Math.max(x0 + 1, Math.min(width, Math.floor(left + (i + 1) * step)));
  const y1 = Math.max(y0 + 1, Math.min(height, Math.floor(top + (j + 1) * step)));
  let sum = 0;
  for (let y = y0; y < y1; y++)
    for (let x = x0; x < x1; x++) sum += codes[Math.min(y, height - 1) * width + Math.min(x, width - 1)];
  return sum / ((y1 - y0) * (x1 - x0));
}

function clamp(value: number, low: number, high: number): number {
  return Math.max(low, Math.min(high, value));
}
