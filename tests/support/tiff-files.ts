import { deflateSync } from 'node:zlib';

export interface TiffOptions {
  readonly width: number;
  readonly height: number;
  readonly data: Uint8Array | Uint16Array;
  readonly channels?: number;
  readonly bigEndian?: boolean;
  readonly packed?: boolean;
  readonly rowsPerStrip?: number;
  readonly pages?: number;
  /** Tags that replace or join the ordinary ones. */
  readonly tags?: Readonly<Record<number, number>>;
}

/** A baseline TIFF 6.0 in strips. */
export function tiffFile(options: TiffOptions): Buffer {
  const { width, height, data, channels = 1, bigEndian = false, pages = 1 } = options;
  const { rowsPerStrip = height } = options;
  const depth = data instanceof Uint16Array ? 16 : 8;
  const rowBytes = (width * channels * depth) / 8;
  const samples = bytesOf(data, bigEndian);
  const strips: Buffer[] = [];
  for (let row = 0; row < height; row += rowsPerStrip) {
    const strip = samples.subarray(row * rowBytes, Math.min(row + rowsPerStrip, height) * rowBytes);
    strips.push(options.packed ? deflateSync(strip) : strip);
  }
  const offsets = strips.map((_, i) => 8 + strips.slice(0, i).reduce((sum, s) => sum + s.length, 0));
  const sizes = strips.map((strip) => strip.length);
  const entries: Record<number, readonly number[]> = {
    256: [width],
    257: [height],
    258: Array.from({ length: channels }, () => depth),
    259: [options.packed ? 8 : 1],
    262: [channels === 1 ? 1 : 2],
    273: offsets,
    277: [channels],
    278: [rowsPerStrip],
    279: sizes,
    284: [1],
  };
  for (const [tag, value] of Object.entries(options.tags ?? {})) entries[Number(tag)] = [value];
  const body = Buffer.concat(strips);
  const start = 8 + body.length + (body.length % 2);
  const directories = Array.from({ length: pages }, () => directory(entries, bigEndian));
  const out = Buffer.alloc(start + directories.reduce((sum, d) => sum + d.length, 0));
  out.write(bigEndian ? 'MM' : 'II', 0, 'latin1');
  const write = writers(out, bigEndian);
  write.u16(2, 42);
  write.u32(4, start);
  body.copy(out, 8);
  let at = start;
  directories.forEach(({ place, length, next }, page) => {
    place(out, at);
    write.u32(at + next, page + 1 < pages ? at + length : 0);
    at += length;
  });
  return out;
}

function bytesOf(data: Uint8Array | Uint16Array, bigEndian: boolean): Buffer {
  const bytes = Buffer.from(Uint8Array.from(new Uint8Array(data.buffer, data.byteOffset, data.byteLength)));
  return data instanceof Uint16Array && bigEndian ? bytes.swap16() : bytes;
}

function writers(out: Buffer, bigEndian: boolean) {
  return {
    u16: (at: number, value: number) =>
      bigEndian ? out.writeUInt16BE(value, at) : out.writeUInt16LE(value, at),
    u32: (at: number, value: number) =>
      bigEndian ? out.writeUInt32BE(value, at) : out.writeUInt32LE(value, at),
  };
}

/** All values as LONG; lists of more than one stand behind the directory. */
function directory(entries: Record<number, readonly number[]>, bigEndian: boolean) {
  const tags = Object.keys(entries).map(Number);
  const next = 2 + 12 * tags.length;
  const outside = tags.filter((tag) => entries[tag].length > 1);
  const length = next + 4 + outside.reduce((sum, tag) => sum + 4 * entries[tag].length, 0);
  const place = (out: Buffer, start: number) => {
    const write = writers(out, bigEndian);
    write.u16(start, tags.length);
    let list = start + next + 4;
    tags.forEach((tag, i) => {
      const entry = start + 2 + 12 * i;
      const values = entries[tag];
      write.u16(entry, tag);
      write.u16(entry + 2, 4);
      write.u32(entry + 4, values.length);
      if (values.length === 1) write.u32(entry + 8, values[0]);
      else {
        write.u32(entry + 8, list);
        for (const value of values) {
          write.u32(list, value);
          list += 4;
        }
      }
    });
  };
  return { place, length, next };
}
