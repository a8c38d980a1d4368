import { linearTable } from '#shared/physics/response.ts';
import type { Exposure } from '#shared/contracts/exposures.ts';

/** A plane of linear counts over a picture's own pixels, rows from the top. */
export interface Plane {
  readonly width: number;
  readonly height: number;
  readonly counts: Float32Array;
}

type CodedPicture = Pick<Exposure, 'width' | 'height' | 'fullScale' | 'codeStep' | 'lossy' | 'bench'>;

/** Linear counts of an exposure, its dark level taken off: the same values that the engine fits. */
export function linearCounts(picture: CodedPicture, codes: Uint16Array): Plane {
  const { bench, fullScale } = picture;
  const dark = bench.darkLevel === null ? 0 : (bench.darkLevel * fullScale) / (2 ** bench.bitDepth - 1);
  const table = linearTable(bench.encoding, fullScale, dark);
  const counts = new Float32Array(codes.length);
  for (let i = 0; i < codes.length; i++) counts[i] = table[Math.min(codes[i], fullScale)];
  return { width: picture.width, height: picture.height, counts };
}

/** True for pixels that hold no more than "at least this much". */
export function isSaturated(picture: CodedPicture, code: number): boolean {
  return (
    code >= (picture.lossy ? Math.round(picture.fullScale * 0.985) : picture.fullScale - picture.codeStep + 1)
  );
}
