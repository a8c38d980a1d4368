import { Refusal } from '#server/http/refusal.ts';
import { followsAnother } from '#server/images/second-light.ts';
import type { Samples } from '#server/images/samples.ts';
import type { Channel } from '#shared/contracts/exposures.ts';

const names = ['red', 'green', 'blue'] as const;

/**
 * One plane of codes: grey as it is, or of a colour picture of one laser the channel that carries its light, also where that
 * channel is clipped (its saturated pixels are masked later; a weaker channel would show another response). Throws a Refusal
 * for the light of two lasers.
 */
export function onePlane(samples: Samples): { codes: Uint16Array; channel: Channel } {
  const { width, height, channels, data, depth, lossy } = samples;
  if (channels === 1) return { codes: Uint16Array.from(data), channel: 'grey' };
  const planes = [0, 1, 2].map((c) => {
    const codes = new Uint16Array(width * height);
    for (let i = 0; i < codes.length; i++) codes[i] = data[3 * i + c];
    return codes;
  });
  if (isGrey(planes)) return { codes: planes[0], channel: 'grey' };
  const [first, second] = [0, 1, 2].sort((a, b) => spreadOf(planes[b]) - spreadOf(planes[a]));
  const raster = { width, height, lossy, fullScale: 2 ** depth - 1 };
  if (!followsAnother(planes[second], planes[first], raster))
    throw new Refusal(
      'picture-of-two-lasers',
      `The ${names[first]} and the ${names[second]} channel show different patterns, so the picture holds light of two lasers. Photograph one laser at a time.`,
    );
  return { codes: planes[first], channel: names[first] };
}

function isGrey([red, green, blue]: readonly Uint16Array[]): boolean {
  return red.every((code, i) => code === green[i] && code === blue[i]);
}

/** Variance of a channel: how much of a pattern it carries. */
function spreadOf(plane: Uint16Array): number {
  let sum = 0;
  let squares = 0;
  for (const code of plane) {
    sum += code;
    squares += code * code;
  }
  return squares / plane.length - (sum / plane.length) ** 2;
}
