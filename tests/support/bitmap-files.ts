import { Jimp } from 'jimp';

/** Colours interleaved red, green, blue. */
export interface ColourPlane {
  readonly width: number;
  readonly height: number;
  readonly data: Uint8Array;
}

/** Three channels of one grey plane, or of three. */
export function interleaved(red: ArrayLike<number>, green = red, blue = red): Uint8Array {
  const out = new Uint8Array(3 * red.length);
  for (let i = 0; i < red.length; i++) out.set([red[i], green[i], blue[i]], 3 * i);
  return out;
}

export async function jpegFile({ width, height, data }: ColourPlane, quality = 92): Promise<Buffer> {
  const rgba = Buffer.alloc(width * height * 4, 255);
  for (let i = 0; i < width * height; i++) rgba.set(data.subarray(3 * i, 3 * i + 3), 4 * i);
  return new Jimp({ data: rgba, width, height }).getBuffer('image/jpeg', { quality });
}

/** The file with an Exif segment that names an orientation (Exif 2.3, tag 0x0112). */
export function withOrientation(jpeg: Buffer, orientation: number): Buffer {
  const tiff = Buffer.alloc(26);
  tiff.write('MM\0*', 0, 'latin1');
  tiff.writeUInt32BE(8, 4);
  tiff.writeUInt16BE(1, 8);
  tiff.writeUInt16BE(0x0112, 10);
  tiff.writeUInt16BE(3, 12);
  tiff.writeUInt32BE(1, 14);
  tiff.writeUInt16BE(orientation, 18);
  const content = Buffer.concat([Buffer.from('Exif\0\0', 'latin1'), tiff]);
  const segment = Buffer.alloc(4);
  segment.writeUInt16BE(0xffe1, 0);
  segment.writeUInt16BE(content.length + 2, 2);
  return Buffer.concat([jpeg.subarray(0, 2), segment, content, jpeg.subarray(2)]);
}

/** BMP of 24 bits, or of 8 with a palette of greys; rows from the bottom, or from the top. */
export function bmpFile({ width, height, data }: ColourPlane, bits: 8 | 24 = 24, topDown = false): Buffer {
  const rowBytes = Math.ceil((width * bits) / 32) * 4;
  const palette = bits === 8 ? 1024 : 0;
  const start = 54 + palette;
  const out = Buffer.alloc(start + rowBytes * height);
  out.write('BM', 0, 'latin1');
  out.writeUInt32LE(out.length, 2);
  out.writeUInt32LE(start, 10);
  out.writeUInt32LE(40, 14);
  out.writeInt32LE(width, 18);
  out.writeInt32LE(topDown ? -height : height, 22);
  out.writeUInt16LE(1, 26);
  out.writeUInt16LE(bits, 28);
  for (let i = 0; i < palette / 4; i++) out.set([i, i, i, 0], 54 + 4 * i);
  for (let y = 0; y < height; y++)
    for (let x = 0; x < width; x++) {
      const [red, green, blue] = data.subarray(3 * (y * width + x));
      const at = start + (topDown ? y : height - 1 - y) * rowBytes + (x * bits) / 8;
      out.set(bits === 8 ? [red] : [blue, green, red], at);
    }
  return out;
}
