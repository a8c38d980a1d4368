import { varianceAt, planeAt, type Frame } from '#server/engine/frame.ts';

/** Chosen bins of the picture: places in pixels, means in linear counts (background not taken off). */
export interface PixelSet {
  readonly n: number;
  /** Pixels per bin side. */
  readonly bin: number;
  readonly x: Float64Array;
  readonly y: Float64Array;
  readonly d: Float64Array;
}

/** Every bin all of whose pixels are used, within a radius of a centre. */
export function allBins(
  frame: Frame,
  bin: number,
  center: { x: number; y: number },
  maxRadius: number,
): PixelSet {
  const columns = Math.floor(frame.width / bin);
  const rows = Math.floor(frame.height / bin);
  const x = new Float64Array(columns * rows);
  const y = new Float64Array(columns * rows);
  const d = new Float64Array(columns * rows);
  const limit = maxRadius * maxRadius;
  let n = 0;
  for (let j = 0; j < rows; j++) {
    const cy = (j + 0.5) * bin - 0.5;
    for (let i = 0; i < columns; i++) {
      const cx = (i + 0.5) * bin - 0.5;
      if ((cx - center.x) ** 2 + (cy - center.y) ** 2 > limit) continue;
      const mean = binMean(frame, bin, i, j);
      if (Number.isNaN(mean)) continue;
      x[n] = cx;
      y[n] = cy;
      d[n] = mean;
      n += 1;
    }
  }
  return { n, bin, x: x.subarray(0, n), y: y.subarray(0, n), d: d.subarray(0, n) };
}

function binMean(frame: Frame, bin: number, i: number, j: number): number {
  let sum = 0;
  for (let b = 0; b < bin; b++) {
    const row = (j * bin + b) * frame.width + i * bin;
    for (let a = 0; a < bin; a++) {
      if (frame.mask[row + a] !== 0) return Number.NaN;
      sum += frame.data[row + a];
    }
  }
  return sum / (bin * bin);
}

/**
 * At most `count` bins: `share` of them by falling `worth` (evenly over equals by chance), the others evenly over the
 * picture, so that the background stays known.
 */
export function pick(
  set: PixelSet,
  count: number,
  share: number,
  worth: (k: number) => number,
  random: () => number,
): PixelSet {
  if (set.n <= count) return set;
  const order = new Float64Array(set.n);
  for (let k = 0; k < set.n; k++) order[k] = worth(k);
  const wanted = Math.floor(count * share);
  const sorted = Float64Array.from(order).sort();
  const limit = sorted[set.n - wanted];
  const rest = (count - wanted) / (set.n - wanted);
  const keep: number[] = [];
  for (let k = 0; k < set.n; k++) if (order[k] > limit || random() < rest) keep.push(k);
  return subset(set, keep);
}

/** A set of the given members. */
export function subset(set: PixelSet, members: readonly number[]): PixelSet {
  return {
    n: members.length,
    bin: set.bin,
    x: Float64Array.from(members, (k) => set.x[k]),
    y: Float64Array.from(members, (k) => set.y[k]),
    d: Float64Array.from(members, (k) => set.d[k]),
  };
}

/** Signal above the background in units of the bin's own noise. */
export function signalToNoise(frame: Frame, set: PixelSet, k: number): number {
  const signal = set.d[k] - planeAt(frame.background, set.x[k], set.y[k]);
  return (signal * set.bin) / Math.sqrt(varianceAt(frame.noise, signal));
}
