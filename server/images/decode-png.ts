import { decode } from 'fast-png';
import { inflateWithin } from '#server/images/inflate-within.ts';
import { greyFromPalette, opaqueSamples, type Samples } from '#server/images/samples.ts';
import { checkSize, damaged, ofMany, truncated, unsupported } from '#server/images/sniff.ts';

/** Channels by colour type (PNG specification, table 11.1). */
const channelsOf: Record<number, number> = { 0: 1, 2: 3, 3: 1, 4: 2, 6: 4 };

/** What decoding needs; profiles and texts, which may be damaged or endless on their own, are left out. */
const kept = ['IHDR', 'PLTE', 'tRNS', 'IDAT', 'IEND'];

/** PNG of 8 or 16 bits, grey or colour, at its true depth. Nothing is unpacked before the header has been judged. */
export function decodePng(bytes: Buffer): Samples {
  if (bytes.length < 33) throw truncated();
  const header = {
    width: bytes.readUInt32BE(16),
    height: bytes.readUInt32BE(20),
    depth: bytes[24],
    channels: channelsOf[bytes[25]],
    interlaced: bytes[28] === 1,
  };
  checkSize(header.width, header.height);
  if (header.channels === undefined) throw damaged();
  if (header.depth < 8)
    throw unsupported(
      `The PNG has ${header.depth} bits a pixel, too few to measure brightness in.`,
      'Save it as grey PNG of 8 or 16 bits.',
    );
  const chunks = readChunks(bytes);
  const data = chunks.filter(({ type }) => type === 'IDAT').map(({ content }) => content);
  inflateWithin(Buffer.concat(data), unpackedLength(header));
  let png: ReturnType<typeof decode>;
  try {
    png = decode(Buffer.concat([bytes.subarray(0, 8), ...chunks.map(({ whole }) => whole)]), {
      checkCrc: true,
    });
  } catch {
    throw damaged();
  }
  const { width, height, channels, palette } = png;
  const depth = png.depth === 16 ? 16 : 8;
  const codes = png.data as Uint8Array | Uint16Array;
  const samples = palette
    ? { channels: 1 as const, data: greyFromPalette(codes, palette) }
    : opaqueSamples(codes, channels, depth);
  return { width, height, ...samples, depth, lossy: false };
}

function readChunks(bytes: Buffer) {
  const chunks: { type: string; content: Buffer; whole: Buffer }[] = [];
  for (let at = 8; ;) {
    if (at + 12 > bytes.length) throw truncated();
    const length = bytes.readUInt32BE(at);
    const type = bytes.toString('latin1', at + 4, at + 8);
    if (type === 'acTL') throw ofMany('an animated PNG');
    const end = at + 12 + length;
    if (end > bytes.length) throw truncated();
    if (kept.includes(type))
      chunks.push({ type, content: bytes.subarray(at + 8, end - 4), whole: bytes.subarray(at, end) });
    if (type === 'IEND') return chunks;
    at = end;
  }
}

interface Header {
  readonly width: number;
  readonly height: number;
  readonly depth: number;
  readonly channels: number;
  readonly interlaced: boolean;
}

/** Bytes of all rows with their filter bytes; of the seven passes of Adam7 where it is interlaced. */
function unpackedLength({ width, height, depth, channels, interlaced }: Header): number {
  const pixel = (channels * depth) / 8;
  const passes = interlaced
    ? [
        [0, 0, 8, 8],
        [4, 0, 8, 8],
        [0, 4, 4, 8],
        [2, 0, 4, 4],
        [0, 2, 2, 4],
        [1, 0, 2, 2],
        [0, 1, 1, 2],
      ]
    : [[0, 0, 1, 1]];
  return passes.reduce((sum, [left, top, stepX, stepY]) => {
    const columns = Math.ceil((width - left) / stepX);
    const rows = Math.ceil((height - top) / stepY);
    return columns > 0 && rows > 0 ? sum + rows * (1 + columns * pixel) : sum;
  }, 0);
}
