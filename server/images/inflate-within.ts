import { inflateSync } from 'node:zlib';
import { damaged, truncated } from '#server/images/sniff.ts';

/**
 * Makes sure that packed pixels unpack to `least` bytes and at most `most`, before a decoder unpacks whatever is there: a
 * small file may hold gigabytes. Throws a Refusal where they end early, are damaged or are more than the picture has.
 */
export function inflateWithin(packed: Uint8Array, least: number, most = least): void {
  let unpacked: number;
  try {
    unpacked = inflateSync(packed, { maxOutputLength: most }).length;
  } catch (error) {
    throw (error as NodeJS.ErrnoException).code === 'Z_BUF_ERROR' ? truncated() : damaged();
  }
  if (unpacked < least) throw truncated();
}
