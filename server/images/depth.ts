/** How the codes of a 16-bit file carry fewer bits. */
export interface CodeScale {
  readonly bitDepth: number;
  readonly fullScale: number;
  readonly codeStep: number;
}

/**
 * The true scale of a plane's codes. Left-aligned data (every code a multiple of 16 or 4 or 64) are found from the data; of
 * right-aligned ones nothing in the file tells, so the bench's bit depth decides as long as no code exceeds it.
 */
export function codeScale(codes: Uint16Array, fileDepth: 8 | 16, benchDepth: number): CodeScale {
  if (fileDepth === 8) return { bitDepth: 8, fullScale: 255, codeStep: 1 };
  let bits = 0;
  let top = 0;
  for (const code of codes) {
    bits |= code;
    if (code > top) top = code;
  }
  let shift = 0;
  while (shift < 8 && bits !== 0 && ((bits >> shift) & 1) === 0) shift += 1;
  // A shift that the camera could not have made (a coincidence in a nearly empty picture) is taken back to the bench's.
  const expected = 16 - benchDepth;
  if (expected > 0 && shift >= expected && top >= 2 ** benchDepth) shift = expected;
  else if (shift > 0 && top < 2 ** benchDepth) shift = 0;
  else shift = [0, 0, 2, 2, 4, 4, 6, 6, 8][shift];
  if (shift > 0) return { bitDepth: 16 - shift, fullScale: 65536 - 2 ** shift, codeStep: 2 ** shift };
  if (benchDepth < 16 && top < 2 ** benchDepth)
    return { bitDepth: benchDepth, fullScale: 2 ** benchDepth - 1, codeStep: 1 };
  return { bitDepth: 16, fullScale: 65535, codeStep: 1 };
}
