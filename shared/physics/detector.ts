import { normalFrom, poissonFrom } from '#shared/physics/random.ts';
import { srgbEncode } from '#shared/physics/response.ts';

/** A camera in the manner of EMVA 1288 (linear model): photo-electrons, read noise, gain, clipping, rounding. */
export interface Detector {
  /** Electrons of a pixel at full scale. */
  readonly fullWell: number;
  /** Electrons, standard deviation. */
  readonly readNoise: number;
  readonly bitDepth: 8 | 10 | 12 | 14 | 16;
  /** In codes. */
  readonly darkLevel: number;
  readonly encoding: 'linear' | 'srgb';
}

/** Codes of a picture from expected intensities, where 1 fills the well. */
export function detect(expected: ArrayLike<number>, detector: Detector, random: () => number): Uint16Array {
  const top = 2 ** detector.bitDepth - 1;
  const codes = new Uint16Array(expected.length);
  for (let k = 0; k < codes.length; k++) {
    const electrons =
      poissonFrom(random, expected[k] * detector.fullWell) + detector.readNoise * normalFrom(random);
    const share = electrons / detector.fullWell;
    const linear = detector.darkLevel + share * (top - detector.darkLevel);
    const code =
      detector.encoding === 'srgb' ? srgbEncode(Math.min(1, Math.max(0, linear / top))) * top : linear;
    codes[k] = Math.min(top, Math.max(0, Math.round(code)));
  }
  return codes;
}
