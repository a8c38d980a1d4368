/** How the codes of a 16-bit file carry fewer bits. */
export interface CodeScale {
  /** Bits that carry information. */
  readonly bitDepth: number;
  readonly fullScale: number;
  readonly codeStep: number;
}

const cameraDepths = [8, 10, 12, 14] as const;

/** Fewer different codes than this say nothing about how they were made. */
const leastCodes = 4;

/**
 * The true scale of a plane's codes. Left-aligned data (every code a multiple of 4, 16, 64 or 256) and data stretched to 16
 * bits (low bits repeat the high ones, as when 255 becomes 65535) are found from the data; of right-aligned ones nothing in
 * the file tells, so the bench's bit depth decides as long as no code exceeds it.
 */
export function codeScale(codes: Uint16Array, fileDepth: 8 | 16, benchDepth: number): CodeScale {
  if (fileDepth === 8) return { bitDepth: 8, fullScale: 255, codeStep: 1 };
  const distinct = distinctCodes(codes);
  // A few codes fall into any pattern by chance: then only the bench's own depth is looked for.
  const depths = distinct.length >= leastCodes ? cameraDepths : cameraDepths.filter((n) => n === benchDepth);
  const top = distinct.at(-1) ?? 0;
  const byBench = distinct.length < leastCodes && top < 2 ** benchDepth;
  const left = depths.find((n) => distinct.every((code) => code % 2 ** (16 - n) === 0));
  if (left && !byBench)
    return { bitDepth: left, fullScale: 65536 - 2 ** (16 - left), codeStep: 2 ** (16 - left) };
  const stretched = depths.find((n) => distinct.every((code) => repeatsItsHighBits(code, n)));
  if (stretched && !byBench)
    return { bitDepth: stretched, fullScale: 65535, codeStep: Math.round(65535 / (2 ** stretched - 1)) };
  if (benchDepth < 16 && top < 2 ** benchDepth)
    return { bitDepth: benchDepth, fullScale: 2 ** benchDepth - 1, codeStep: 1 };
  return { bitDepth: 16, fullScale: 65535, codeStep: 1 };
}

function distinctCodes(codes: Uint16Array): number[] {
  const seen = new Uint8Array(65536);
  for (const code of codes) seen[code] = 1;
  const distinct: number[] = [];
  for (let code = 0; code < seen.length; code++) if (seen[code] === 1) distinct.push(code);
  return distinct;
}

/** A code of `depth` bits widened to 16 by repeating its high bits below. */
function repeatsItsHighBits(code: number, depth: number): boolean {
  const value = code >> (16 - depth);
  return code === (((value << (16 - depth)) | (value >> (2 * depth - 16))) & 0xffff);
}
