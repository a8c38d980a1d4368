import { decodeWithJimp } from '#server/images/decode-with-jimp.ts';
import type { Samples } from '#server/images/samples.ts';
import { checkSize, damaged, truncated, unsupported } from '#server/images/sniff.ts';

const mend = 'Save it as an ordinary JPEG, or better as PNG or TIFF from the camera.';

/** JPEG: judged by its frame header, whole to its end mark; turned upright by its orientation tag, as viewers show it. */
export async function decodeJpeg(bytes: Buffer): Promise<Samples> {
  const end = walkSegments(bytes);
  return { ...(await decodeWithJimp(bytes.subarray(0, end))), lossy: true };
}

/** From marker to marker (ITU-T T.81, annex B) to the end of the picture; what follows it is not part of it. */
function walkSegments(bytes: Buffer): number {
  let at = 2;
  let framed = false;
  for (;;) {
    if (at + 2 > bytes.length) throw truncated();
    if (bytes[at] !== 0xff) throw damaged();
    const marker = bytes[at + 1];
    if (marker === 0xff) at += 1;
    else if (marker === 0xd9) {
      if (!framed) throw damaged();
      return at + 2;
    } else {
      if (at + 4 > bytes.length) throw truncated();
      const next = at + 2 + bytes.readUInt16BE(at + 2);
      if (next > bytes.length) throw truncated();
      if (isFrame(marker)) {
        checkFrame(bytes, at, marker);
        framed = true;
      }
      at = marker === 0xda ? endOfScan(bytes, next) : next;
    }
  }
}

/** The next marker behind entropy-coded data: neither a stuffed zero nor a restart. */
function endOfScan(bytes: Buffer, from: number): number {
  for (
    let at = bytes.indexOf(0xff, from);
    at >= 0 && at + 1 < bytes.length;
    at = bytes.indexOf(0xff, at + 1)
  ) {
    const marker = bytes[at + 1];
    if (marker !== 0 && marker !== 0xff && (marker < 0xd0 || marker > 0xd7)) return at;
  }
  throw truncated();
}

function isFrame(marker: number): boolean {
  return marker >= 0xc0 && marker <= 0xcf && marker !== 0xc4 && marker !== 0xc8 && marker !== 0xcc;
}

function checkFrame(bytes: Buffer, at: number, marker: number): void {
  checkSize(bytes.readUInt16BE(at + 7), bytes.readUInt16BE(at + 5));
  if (marker > 0xc2 || bytes[at + 4] !== 8)
    throw unsupported(
      'The JPEG is of a rare kind (lossless, arithmetic or 12-bit) that cannot be read.',
      mend,
    );
  if (bytes[at + 9] === 4) throw unsupported('The JPEG is coded for print, with four inks.', mend);
}
