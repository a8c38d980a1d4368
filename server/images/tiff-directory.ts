import { ofMany, truncated } from '#server/images/sniff.ts';

/** Tags of TIFF 6.0 that decide whether and how a picture is read. */
export const tags = {
  width: 256,
  height: 257,
  bitsPerSample: 258,
  compression: 259,
  photometric: 262,
  stripOffsets: 273,
  orientation: 274,
  samplesPerPixel: 277,
  rowsPerStrip: 278,
  stripSizes: 279,
  planar: 284,
  tileWidth: 322,
  tileHeight: 323,
  tileOffsets: 324,
  tileSizes: 325,
  sampleFormat: 339,
} as const;

export interface TiffDirectory {
  /** All numbers of a tag; empty where it is not given. */
  numbers(tag: number): readonly number[];
  /** The first number of a tag, or what it is where it is not given. */
  number(tag: number, otherwise: number): number;
}

const bytesOfType: Record<number, number> = { 3: 2, 4: 4 };

/** The first directory (TIFF 6.0, section 2). Throws a Refusal when there is a second one or the file ends in it. */
export function readTiffDirectory(bytes: Buffer): TiffDirectory {
  const little = bytes[0] === 0x49;
  const u16 = (at: number) => (little ? bytes.readUInt16LE(at) : bytes.readUInt16BE(at));
  const u32 = (at: number) => (little ? bytes.readUInt32LE(at) : bytes.readUInt32BE(at));
  const wanted = new Set<number>(Object.values(tags));
  const entries = new Map<number, readonly number[]>();
  try {
    const start = u32(4);
    const count = u16(start);
    for (let i = 0; i < count; i++) {
      const entry = start + 2 + 12 * i;
      const tag = u16(entry);
      const size = bytesOfType[u16(entry + 2)];
      const n = u32(entry + 4);
      if (size === undefined || !wanted.has(tag)) continue;
      const at = n * size <= 4 ? entry + 8 : u32(entry + 8);
      if (at + n * size > bytes.length) throw truncated();
      entries.set(
        tag,
        Array.from({ length: n }, (_, k) => (size === 2 ? u16(at + 2 * k) : u32(at + 4 * k))),
      );
    }
    if (u32(start + 2 + 12 * count) !== 0) throw ofMany('a TIFF of several pages');
  } catch (error) {
    if (error instanceof RangeError) throw truncated();
    throw error;
  }
  return {
    numbers: (tag) => entries.get(tag) ?? [],
    number: (tag, otherwise) => entries.get(tag)?.[0] ?? otherwise,
  };
}
