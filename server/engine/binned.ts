import type { Frame } from '#server/engine/frame.ts';
import { planeAt } from '#server/engine/frame.ts';

/** A picture averaged over square bins, background taken off; `weight` is the share of used pixels of each bin. */
export interface Binned {
  readonly width: number;
  readonly height: number;
  /** Pixels per bin side. */
  readonly bin: number;
  readonly data: Float32Array;
  readonly weight: Float32Array;
}

/** Bins the part of the frame that fills whole bins; the window is in pixels of the frame. */
export function binFrame(
  frame: Frame,
  bin: number,
  window = { left: 0, top: 0, width: frame.width, height: frame.height },
  keepSaturated = false,
): Binned {
  const width = Math.max(1, Math.floor(window.width / bin));
  const height = Math.max(1, Math.floor(window.height / bin));
  const data = new Float32Array(width * height);
  const weight = new Float32Array(width * height);
  for (let j = 0; j < height; j++)
    for (let i = 0; i < width; i++) {
      let sum = 0;
      let n = 0;
      for (let y = 0; y < bin; y++) {
        const row = (window.top + j * bin + y) * frame.width + window.left + i * bin;
        for (let x = 0; x < bin; x++) {
          const reason = frame.mask[row + x];
          if (reason !== 0 && !(keepSaturated && reason <= 2)) continue;
          sum += frame.data[row + x];
          n += 1;
        }
      }
      const cx = window.left + (i + 0.5) * bin - 0.5;
      const cy = window.top + (j + 0.5) * bin - 0.5;
      data[j * width + i] = n > 0 ? sum / n - planeAt(frame.background, cx, cy) : 0;
      weight[j * width + i] = n / (bin * bin);
    }
  return { width, height, bin, data, weight };
}
