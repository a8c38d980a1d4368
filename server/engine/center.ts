import { binFrame, type Binned } from '#server/engine/binned.ts';
import type { Frame } from '#server/engine/frame.ts';
import { fft2InPlace, powerOfTwo } from '#shared/physics/fft.ts';

export interface CenterHypothesis {
  /** Pixels of the frame. */
  readonly x: number;
  readonly y: number;
  /** Masked normalised correlation of the picture with itself turned by 180°, weighted; at most about 1. */
  readonly score: number;
}

/**
 * Where the picture is its own mirror image through a point: |F|² of a real opening is point-symmetric (Goodman), so the
 * masked normalised self-convolution (Padfield, IEEE Trans. Image Process. 21 (2012) 2706, from memory) peaks at twice the
 * centre. Best first, in pixels of the frame; empty when nothing correlates.
 */
export function findCenters(frame: Frame, count: number): CenterHypothesis[] {
  const bin = Math.max(1, Math.ceil(Math.max(frame.width, frame.height) / 128));
  const binned = binFrame(frame, bin, undefined, true);
  const values = compress(binned, frame.noise.a, frame.noise.b);
  const peaks = symmetryPeaks(binned, values, count);
  if (peaks.length > 0) return peaks.map((p) => refine(frame, p, bin));
  const spot = brightSpot(binned, frame.noise.a);
  return spot ? [spot] : [];
}

/**
 * Where else the centre may be when the best symmetry was a side lobe or a crop: the middle of the brightest light, and
 * places just outside the borders that the light is nearest to.
 */
export function otherCenters(frame: Frame): { x: number; y: number }[] {
  const bin = Math.max(1, Math.ceil(Math.max(frame.width, frame.height) / 128));
  const spot = brightSpot(binFrame(frame, bin, undefined, true), frame.noise.a);
  if (!spot) return [];
  const { width, height } = frame;
  const borders = [
    { depth: spot.x / width, at: (d: number) => ({ x: -d * width, y: spot.y }) },
    { depth: 1 - spot.x / width, at: (d: number) => ({ x: (1 + d) * width, y: spot.y }) },
    { depth: spot.y / height, at: (d: number) => ({ x: spot.x, y: -d * height }) },
    { depth: 1 - spot.y / height, at: (d: number) => ({ x: spot.x, y: (1 + d) * height }) },
  ];
  const near = borders.filter((b) => b.depth < 0.12);
  return [spot, ...near.flatMap((b) => [0.02, 0.05, 0.09].map(b.at))];
}

/** Whether anything in the picture stands out of its noise. */
export function hasLight(frame: Frame): boolean {
  const bin = Math.max(1, Math.ceil(Math.max(frame.width, frame.height) / 128));
  return brightSpot(binFrame(frame, bin, undefined, true), frame.noise.a) !== null;
}

/** Middle of the brightest bins, saturated ones included; null where nothing stands out of the noise. */
function brightSpot(binned: Binned, floor: number): CenterHypothesis | null {
  const { width, data, weight, bin } = binned;
  let top = 0;
  for (let k = 0; k < data.length; k++) if (weight[k] > 0.3 && data[k] > top) top = data[k];
  if (top < (6 * Math.sqrt(floor)) / bin) return null;
  let x = 0;
  let y = 0;
  let n = 0;
  for (let k = 0; k < data.length; k++)
    if (weight[k] > 0.3 && data[k] > 0.7 * top) {
      x += k % width;
      y += Math.floor(k / width);
      n += 1;
    }
  return { x: (x / n + 0.5) * bin - 0.5, y: (y / n + 0.5) * bin - 0.5, score: 0.05 };
}

/** log(1 + z/3) of the variance-stabilised intensity z. */
function compress(binned: Binned, a: number, b: number): Float64Array {
  const n = binned.bin * binned.bin;
  const out = new Float64Array(binned.data.length);
  for (let i = 0; i < out.length; i++) {
    const m = Math.max(binned.data[i], 0);
    out[i] = Math.log1p(m / Math.sqrt((a + b * m) / n + 1e-12) / 3);
  }
  return out;
}

function symmetryPeaks(binned: Binned, values: Float64Array, count: number): CenterHypothesis[] {
  const { width, height, weight, bin } = binned;
  const columns = powerOfTwo(2 * width);
  const rows = powerOfTwo(2 * height);
  const size = rows * columns;
  const fRe = new Float64Array(size);
  const fIm = new Float64Array(size);
  const mRe = new Float64Array(size);
  const mIm = new Float64Array(size);
  for (let j = 0; j < height; j++)
    for (let i = 0; i < width; i++) {
      const k = j * columns + i;
      const inside = weight[j * width + i] > 0.3 ? 1 : 0;
      const v = inside * values[j * width + i];
      fRe[k] = v;
      fIm[k] = v * v;
      mRe[k] = inside;
    }
  // One transform carries f and f² (f² in the imaginary part), another the mask.
  fft2InPlace(fRe, fIm, rows, columns, 'forward');
  fft2InPlace(mRe, mIm, rows, columns, 'forward');
  const products = selfConvolutions(fRe, fIm, mRe, mIm, rows, columns);
  const { ff, fm, f2m, mm } = products;
  const score = new Float64Array(size);
  const minimumOverlap = 0.06 * width * height;
  let brightest = 0;
  for (let k = 0; k < values.length; k++) brightest = Math.max(brightest, values[k]);
  for (let j = 0; j < 2 * height - 1; j++)
    for (let i = 0; i < 2 * width - 1; i++) {
      const k = j * columns + i;
      const n = mm[k];
      if (n < minimumOverlap) continue;
      const mean = fm[k] / n;
      const variance = f2m[k] - n * mean * mean;
      if (variance <= 1e-9) continue;
      const ncc = (ff[k] - n * mean * mean) / variance;
      const cj = Math.min(height - 1, j >> 1);
      const ci = Math.min(width - 1, i >> 1);
      const bright = values[cj * width + ci] / (brightest + 1e-12);
      score[k] = ncc * Math.min(1, n / (0.3 * width * height)) ** 0.5 * (0.35 + 0.65 * bright);
    }
  return localPeaks(score, columns, 2 * width - 1, 2 * height - 1, count).map(({ i, j, value }) => ({
    x: (i / 2 + 0.5) * bin - 0.5,
    y: (j / 2 + 0.5) * bin - 0.5,
    score: value,
  }));
}

/** f∗f, f∗m, f²∗m and m∗m (convolutions) from the transforms of f + i f² and m. */
function selfConvolutions(
  gRe: Float64Array,
  gIm: Float64Array,
  mRe: Float64Array,
  mIm: Float64Array,
  rows: number,
  columns: number,
) {
  const size = rows * columns;
  const aRe = new Float64Array(size);
  const aIm = new Float64Array(size);
  const bRe = new Float64Array(size);
  const bIm = new Float64Array(size);
  for (let j = 0; j < rows; j++)
    for (let i = 0; i < columns; i++) {
      const k = j * columns + i;
      const opposite = ((rows - j) % rows) * columns + ((columns - i) % columns);
      // F and F2 separated by Hermitian symmetry.
      const fr = (gRe[k] + gRe[opposite]) / 2;
      const fi = (gIm[k] - gIm[opposite]) / 2;
      const sr = (gIm[k] + gIm[opposite]) / 2;
      const si = (gRe[opposite] - gRe[k]) / 2;
      const mr = mRe[k];
      const mi = mIm[k];
      const ffr = fr * fr - fi * fi;
      const ffi = 2 * fr * fi;
      const mmr = mr * mr - mi * mi;
      const mmi = 2 * mr * mi;
      const fmr = fr * mr - fi * mi;
      const fmi = fr * mi + fi * mr;
      const smr = sr * mr - si * mi;
      const smi = sr * mi + si * mr;
      // Two real results per inverse transform: ff + i·mm and fm + i·f2m.
      aRe[k] = ffr - mmi;
      aIm[k] = ffi + mmr;
      bRe[k] = fmr - smi;
      bIm[k] = fmi + smr;
    }
  fft2InPlace(aRe, aIm, rows, columns, 'inverse');
  fft2InPlace(bRe, bIm, rows, columns, 'inverse');
  return { ff: aRe, mm: aIm, fm: bRe, f2m: bIm };
}

function localPeaks(score: Float64Array, columns: number, width: number, height: number, count: number) {
  const peaks: { i: number; j: number; value: number }[] = [];
  for (let j = 1; j + 1 < height; j++)
    for (let i = 1; i + 1 < width; i++) {
      const k = j * columns + i;
      const s = score[k];
      if (s <= 0.05) continue;
      if (
        s < score[k - 1] ||
        s < score[k + 1] ||
        s < score[k - columns] ||
        s < score[k + columns] ||
        s < score[k - columns - 1] ||
        s < score[k - columns + 1] ||
        s < score[k + columns - 1] ||
        s < score[k + columns + 1]
      )
        continue;
      peaks.push({
        i: i + parabola(score[k - 1], s, score[k + 1]),
        j: j + parabola(score[k - columns], s, score[k + columns]),
        value: s,
      });
    }
  return peaks.sort((p, q) => q.value - p.value).slice(0, count);
}

/** Offset of the vertex of a parabola through three neighbours, within half a step. */
function parabola(before: number, here: number, after: number): number {
  const bend = before - 2 * here + after;
  return bend < 0 ? Math.max(-0.5, Math.min(0.5, (before - after) / (2 * bend))) : 0;
}

/** Goes down to single pixels in windows of 128 bins; a step is taken only when it stays near. */
function refine(frame: Frame, start: CenterHypothesis, bin: number): CenterHypothesis {
  let { x, y } = start;
  for (let b = bin >> 1; b >= 1; b >>= 1) {
    const half = 64 * b;
    const left = Math.max(0, Math.round(x) - half);
    const top = Math.max(0, Math.round(y) - half);
    const window = {
      left,
      top,
      width: Math.min(frame.width, Math.round(x) + half) - left,
      height: Math.min(frame.height, Math.round(y) + half) - top,
    };
    if (window.width < 24 * b || window.height < 24 * b) break;
    const binned = binFrame(frame, b, window, true);
    const best = symmetryPeaks(binned, compress(binned, frame.noise.a, frame.noise.b), 6)
      .map((p) => ({ x: p.x + left, y: p.y + top }))
      .sort((p, q) => Math.hypot(p.x - x, p.y - y) - Math.hypot(q.x - x, q.y - y))[0];
    if (!best || Math.hypot(best.x - x, best.y - y) > 2.4 * b) break;
    x = best.x;
    y = best.y;
  }
  return { x, y, score: start.score };
}
