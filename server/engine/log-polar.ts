import { planeAt, varianceAt, type Frame } from '#server/engine/frame.ts';

/**
 * Log-polar maps: row k holds ln ρ, column j the direction over half a turn (the pattern is point-symmetric), both with the
 * same step, so that size and orientation become shifts (Reddy & Chatterji, IEEE Trans. Image Process. 5 (1996) 1266, from
 * memory).
 */
export const logPolar = { angles: 32, rows: 128, step: Math.PI / 32 } as const;

export interface LogPolarMap {
  /** Compressed intensity and weight, rows × angles. */
  readonly values: Float64Array;
  readonly weights: Float64Array;
  /** Radius in pixels of row 0. */
  readonly firstRadius: number;
  /** Distance in pixels from the centre to the farthest corner of the picture. */
  readonly reach: number;
  /** Number of rows that hold picture. */
  readonly used: number;
}

/** Averages the frame around a centre over log-polar cells; opposite cells are averaged together. */
export function logPolarMap(frame: Frame, center: { x: number; y: number }): LogPolarMap {
  const { angles, rows, step } = logPolar;
  const firstRadius = 1.5;
  const sum = new Float64Array(rows * angles);
  const count = new Float64Array(rows * angles);
  const all = new Float64Array(rows * angles);
  const { width, height, data, mask, background } = frame;
  const far = Math.hypot(Math.max(center.x, width - center.x), Math.max(center.y, height - center.y));
  const used = Math.min(rows / 2 + 16, Math.floor(Math.log(far / firstRadius) / step));
  const stride = Math.max(1, Math.floor(Math.sqrt((width * height) / 1_500_000)));
  for (let y = 0; y < height; y += stride)
    for (let x = 0; x < width; x += stride) {
      const dx = x - center.x;
      const dy = center.y - y;
      const r2 = dx * dx + dy * dy;
      if (r2 < firstRadius * firstRadius) continue;
      const row = Math.floor((0.5 * Math.log(r2 / (firstRadius * firstRadius))) / step);
      if (row >= used) continue;
      let angle = Math.atan2(dy, dx);
      if (angle < 0) angle += Math.PI;
      const k = row * angles + (Math.floor((angle / Math.PI) * angles) % angles);
      all[k] += 1;
      const p = y * width + x;
      if (mask[p] !== 0) continue;
      sum[k] += data[p] - planeAt(background, x, y);
      count[k] += 1;
    }
  return { ...compressMap(frame, { sum, count, all }, used), firstRadius, reach: far };
}

/** Signed square root over a small offset; weight grows with the radius and falls with the share of masked pixels. */
function compressMap(
  frame: Frame,
  cells: { sum: Float64Array; count: Float64Array; all: Float64Array },
  used: number,
): Pick<LogPolarMap, 'values' | 'weights' | 'used'> {
  const { angles, rows, step } = logPolar;
  const values = new Float64Array(rows * angles);
  const weights = new Float64Array(rows * angles);
  let lastSignificant = 0;
  for (let k = 0; k < used * angles; k++) {
    if (cells.count[k] < 1 || cells.count[k] < 0.5 * cells.all[k]) continue;
    const mean = cells.sum[k] / cells.count[k];
    const sigma = Math.sqrt(
      varianceAt(frame.noise, mean) / cells.count[k] + (0.25 * 0.25 * frame.noise.a) / 4,
    );
    const c = 2 * sigma;
    values[k] = mean >= 0 ? Math.sqrt(mean + c) - Math.sqrt(c) : Math.sqrt(c) - Math.sqrt(c - mean);
    weights[k] = Math.exp(step * Math.floor(k / angles)) * (cells.count[k] / cells.all[k]);
    if (mean > 6 * sigma) lastSignificant = Math.floor(k / angles);
  }
  const cut = Math.min(used, lastSignificant + Math.ceil(Math.log(1.65) / step));
  for (let k = cut * angles; k < rows * angles; k++) weights[k] = 0;
  return { values, weights, used: cut };
}
