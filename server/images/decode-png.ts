import { decode } from 'fast-png';
import { Refusal } from '#server/http/refusal.ts';
import { dropChannels, type Samples } from '#server/images/samples.ts';
import { checkSize, damaged, ofMany, truncated } from '#server/images/sniff.ts';

/** PNG of 8 or 16 bits, grey or colour, at its true depth. Chunks are walked first: ends early, animated, too large. */
export function decodePng(bytes: Buffer): Samples {
  if (bytes.length < 33) throw truncated();
  checkSize(bytes.readUInt32BE(16), bytes.readUInt32BE(20));
  walkChunks(bytes);
  let png: ReturnType<typeof decode>;
  try {
    png = decode(bytes, { checkCrc: true });
  } catch {
    throw damaged();
  }
  if (png.palette || png.depth < 8)
    throw new Refusal(
      'picture-format-unsupported',
      'The PNG has a palette or fewer than 8 bits, so intensities are lost. Save it as grey PNG of 8 or 16 bits.',
    );
  const data = png.data as Uint8Array | Uint16Array;
  const channels = png.channels >= 3 ? 3 : 1;
  return {
    width: png.width,
    height: png.height,
    channels,
    data: dropChannels(data, png.channels, channels),
    depth: png.depth === 16 ? 16 : 8,
    lossy: false,
  };
}

function walkChunks(bytes: Buffer): void {
  let at = 8;
  for (;;) {
    if (at + 12 > bytes.length) throw truncated();
    const length = bytes.readUInt32BE(at);
    const type = bytes.subarray(at + 4, at + 8).toString('latin1');
    if (type === 'acTL') throw ofMany('an animated PNG');
    if (at + 12 + length > bytes.length) throw truncated();
    if (type === 'IEND') return;
    at += 12 + length;
  }
}
