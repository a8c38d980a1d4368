import { crc32 } from 'node:zlib';
import { encode } from 'fast-png';

export interface Plane {
  readonly width: number;
  readonly height: number;
  readonly data: Uint8Array | Uint16Array;
  /** Interleaved: grey, grey and alpha, colour, colour and alpha. */
  readonly channels?: 1 | 2 | 3 | 4;
}

export function pngFile({ width, height, data, channels = 1 }: Plane): Buffer {
  const depth = data instanceof Uint16Array ? 16 : 8;
  return Buffer.from(encode({ width, height, data, channels, depth }));
}

export function pngChunk(type: string, content: Uint8Array): Buffer {
  const named = Buffer.concat([Buffer.from(type, 'latin1'), content]);
  const out = Buffer.alloc(8 + content.length + 4);
  out.writeUInt32BE(content.length, 0);
  named.copy(out, 4);
  out.writeUInt32BE(crc32(named), 8 + content.length);
  return out;
}

/** The file with a chunk put in behind its header. */
export function withPngChunk(file: Buffer, type: string, content: Uint8Array): Buffer {
  return Buffer.concat([file.subarray(0, 33), pngChunk(type, content), file.subarray(33)]);
}

/** The file with another header: bytes 0 … 12 of IHDR are changed and its check sum is right again. */
export function withPngHeader(file: Buffer, change: (header: Buffer) => void): Buffer {
  const header = Buffer.from(file.subarray(16, 29));
  change(header);
  return Buffer.concat([file.subarray(0, 8), pngChunk('IHDR', header), file.subarray(33)]);
}

/** Where the content of the first chunk of this type begins. */
export function findPngChunk(file: Buffer, type: string): { start: number; length: number } {
  for (let at = 8; at < file.length; at += 12 + file.readUInt32BE(at))
    if (file.toString('latin1', at + 4, at + 8) === type)
      return { start: at + 8, length: file.readUInt32BE(at) };
  throw new Error(`no chunk ${type}`);
}
