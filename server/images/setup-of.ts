import type { Setup } from '#server/engine/outcome.ts';
import type { DecodedPicture } from '#server/images/decode.ts';
import type { BenchValues } from '#shared/contracts/benches.ts';

/** The engine's set-up for a picture taken on a bench: the dark level in codes of the file. */
export function setupOf(bench: BenchValues, picture: DecodedPicture): Setup {
  const toFile = picture.fullScale / (2 ** bench.bitDepth - 1);
  return {
    geometry: bench.geometry,
    wavelength: bench.wavelength,
    distance: bench.distance,
    pixelPitch: bench.pixelPitch,
    encoding: bench.encoding,
    darkLevel: bench.darkLevel === null ? null : bench.darkLevel * toFile,
    mirrored: bench.mirrored,
  };
}
