import { familyOf } from '#shared/apertures/registry.ts';
import { simulatePattern } from '#shared/apertures/simulate.ts';
import { detect } from '#shared/physics/detector.ts';
import { seededRandom } from '#shared/physics/random.ts';
import { interleaved } from '#tests/support/bitmap-files.ts';
import { pngFile } from '#tests/support/png-files.ts';

export const laserPicture = { width: 320, height: 240 };
const { width, height } = laserPicture;

/** Expected brightness behind a pinhole of 300 µm, 1 at full scale. */
function pattern(wavelength: number, peak: number): Float32Array {
  const [model] = familyOf('pinhole').models;
  return simulatePattern(
    {
      model,
      values: [300e-6],
      orientation: 0,
      geometry: { kind: 'screen', wavelength, distance: 2, pixelPitch: 2e-4 },
      center: { x: width / 2 + 2.2, y: height / 2 - 1.6 },
      amplitude: peak,
      background: { offset: 0.002, slopeX: 0, slopeY: 0 },
      blurVariance: 0,
    },
    { left: 0, top: 0, width, height, step: 1 },
  );
}

function photographed(expected: Float32Array, seed: number): Uint8Array {
  const camera = { fullWell: 8000, readNoise: 6, bitDepth: 8, darkLevel: 0, encoding: 'srgb' } as const;
  return Uint8Array.from(detect(expected, camera, seededRandom(seed)));
}

/** Red, green and blue as a camera gives them: `green` beside the share of the red light that its filters let through. */
export function colours(peak: number, crosstalk: number, green: number): Uint8Array {
  const red = pattern(632.8e-9, peak);
  const other = pattern(532e-9, green);
  return interleaved(
    photographed(red, 1),
    photographed(
      red.map((light, i) => crosstalk * light + (green > 0 ? other[i] : 0)),
      2,
    ),
    photographed(
      red.map((light) => 0.02 * light),
      3,
    ),
  );
}

/** One opening, lit by a red and a green laser at once. */
export function twoLasers(): Buffer {
  return pngFile({ ...laserPicture, data: colours(3, 0.08, 3), channels: 3 });
}
