import { backgroundPlane } from '#server/engine/background.ts';
import { maskReason, type Frame } from '#server/engine/frame.ts';
import { quantileInPlace } from '#server/engine/median.ts';
import { estimateNoise } from '#server/engine/noise.ts';
import type { Picture, Setup } from '#server/engine/outcome.ts';
import { linearTable } from '#shared/physics/response.ts';

/**
 * From raw codes to linear counts with a mask, a background plane and a noise law. Saturated pixels are masked with a rim
 * (blooming, interpolated neighbours), isolated hot pixels too. Throws nothing.
 */
export function prepare(picture: Picture, setup: Setup): Frame {
  const { width, height, codes, fullScale } = picture;
  const table = linearTable(setup.encoding, 65535 < fullScale ? 65535 : fullScale, setup.darkLevel ?? 0);
  const data = new Float32Array(width * height);
  const mask = new Uint8Array(width * height);
  const limit = saturationLimit(picture);
  let saturated = 0;
  for (let i = 0; i < data.length; i++) {
    const code = codes[i] > fullScale ? fullScale : codes[i];
    data[i] = table[code];
    if (code >= limit) {
      mask[i] = maskReason.saturated;
      saturated += 1;
    }
  }
  growRim(mask, width, height, picture.lossy ? 3 : 1);
  const rough = quantileInPlace(sampleOf(data, 4000), 0.2);
  const floor = quantisation(picture, setup);
  const first = estimateNoise(data, mask, width, height, rough, floor);
  maskHotPixels(data, mask, width, height, first.a, first.b, rough);
  const background = backgroundPlane(data, mask, width, height);
  const noise = estimateNoise(data, mask, width, height, background.offset, floor);
  return {
    width,
    height,
    data,
    mask,
    noise,
    background,
    saturatedShare: saturated / data.length,
    lossy: picture.lossy,
  };
}

/** The lowest code that counts as saturated: full scale, or a little less where the file is lossy. */
function saturationLimit(picture: Picture): number {
  return picture.lossy
    ? Math.round(picture.fullScale * 0.985)
    : picture.fullScale - picture.codeStep + 1 - (picture.fullScale > 255 ? picture.codeStep : 0);
}

/** Variance of rounding to codes, 1/12 step² (EMVA 1288); an sRGB code near black is a thirteenth of a linear one. */
function quantisation(picture: Picture, setup: Setup): number {
  const step = setup.encoding === 'srgb' ? picture.codeStep / 12.92 : picture.codeStep;
  return (step * step) / 12;
}

function sampleOf(data: Float32Array, n: number): Float32Array {
  const stride = Math.max(1, Math.floor(data.length / n));
  const sample = new Float32Array(Math.ceil(data.length / stride));
  for (let i = 0; i < sample.length; i++) sample[i] = data[i * stride];
  return sample;
}

function growRim(mask: Uint8Array, width: number, height: number, radius: number): void {
  for (let step = 0; step < radius; step++) {
    const before = Uint8Array.from(mask);
    for (let y = 0; y < height; y++)
      for (let x = 0; x < width; x++) {
        const k = y * width + x;
        if (before[k] !== 0) continue;
        if (
          (x > 0 && before[k - 1] !== 0) ||
          (x + 1 < width && before[k + 1] !== 0) ||
          (y > 0 && before[k - width] !== 0) ||
          (y + 1 < height && before[k + width] !== 0)
        )
          mask[k] = maskReason.rim;
      }
  }
}

/** A pixel far above all its eight neighbours is the sensor's, not the pattern's. */
function maskHotPixels(
  data: Float32Array,
  mask: Uint8Array,
  width: number,
  height: number,
  a: number,
  b: number,
  background: number,
): void {
  for (let y = 1; y + 1 < height; y++)
    for (let x = 1; x + 1 < width; x++) {
      const k = y * width + x;
      const here = data[k];
      if (here <= data[k - 1] || here <= data[k + 1] || here <= data[k - width] || here <= data[k + width])
        continue;
      const above = Math.max(
        data[k - width - 1],
        data[k - width],
        data[k - width + 1],
        data[k - 1],
        data[k + 1],
        data[k + width - 1],
        data[k + width],
        data[k + width + 1],
      );
      if (here <= above) continue;
      const sigma = Math.sqrt(a + b * Math.max(above - background, 0));
      if (here - above > 6 * sigma + 0.3 * Math.max(above - background, 0)) mask[k] = maskReason.hot;
    }
}
