import { Refusal } from '#server/http/refusal.ts';
import type { Samples } from '#server/images/samples.ts';
import type { Channel } from '#shared/contracts/exposures.ts';

const names: readonly Channel[] = ['red', 'green', 'blue'];

/** One plane of codes: grey as it is, or of a colour picture of one laser the channel that carries its light. */
export function onePlane(samples: Samples): { codes: Uint16Array; channel: Channel } {
  const { width, height, channels, data } = samples;
  const n = width * height;
  if (channels === 1) return { codes: Uint16Array.from(data), channel: 'grey' };
  const sums = [0, 0, 0];
  const stride = Math.max(1, Math.floor(n / 200_000));
  let count = 0;
  for (let i = 0; i < n; i += stride, count++) for (let c = 0; c < 3; c++) sums[c] += data[3 * i + c];
  const means = sums.map((s) => s / count);
  const moments = channelMoments(data, n, stride, means);
  const spread = [moments[0][0], moments[1][1], moments[2][2]];
  const order = [0, 1, 2].sort((a, b) => spread[b] - spread[a]);
  const [first, second] = order;
  if (spread[first] <= 0) return { codes: planeOf(data, n, 0), channel: 'grey' };
  // Light of a second laser: a second channel of comparable contrast whose pattern is not a scaled copy of the first's.
  const correlation = moments[first][second] / Math.sqrt(spread[first] * Math.max(spread[second], 1e-12));
  if (spread[second] > 0.04 * spread[first] && correlation < 0.7)
    throw new Refusal(
      'picture-of-two-lasers',
      `The ${names[first]} and the ${names[second]} channel show different patterns, so the picture holds light of two lasers. Photograph one laser at a time.`,
    );
  const grey = Math.min(...spread) > 0.9 * Math.max(...spread) && correlation > 0.999;
  return { codes: planeOf(data, n, first), channel: grey ? 'grey' : names[first] };
}

function planeOf(data: Uint8Array | Uint16Array, n: number, channel: number): Uint16Array {
  const codes = new Uint16Array(n);
  for (let i = 0; i < n; i++) codes[i] = data[3 * i + channel];
  return codes;
}

function channelMoments(
  data: Uint8Array | Uint16Array,
  n: number,
  stride: number,
  means: number[],
): number[][] {
  const m = [
    [0, 0, 0],
    [0, 0, 0],
    [0, 0, 0],
  ];
  for (let i = 0; i < n; i += stride)
    for (let a = 0; a < 3; a++)
      for (let b = 0; b <= a; b++) m[a][b] += (data[3 * i + a] - means[a]) * (data[3 * i + b] - means[b]);
  for (let a = 0; a < 3; a++) for (let b = a + 1; b < 3; b++) m[a][b] = m[b][a];
  return m;
}
