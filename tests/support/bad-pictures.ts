import { deflateSync } from 'node:zlib';
import { encode } from 'fast-png';
import type { ProblemCode } from '#shared/problems.ts';
import { bmpFile, interleaved, jpegFile } from '#tests/support/bitmap-files.ts';
import { findPngChunk, pngChunk, pngFile, withPngChunk, withPngHeader } from '#tests/support/png-files.ts';
import { tiffFile } from '#tests/support/tiff-files.ts';
import { twoLasers } from '#tests/support/two-lasers.ts';

/** A file that nobody can measure: what is answered and what the sentence says. */
export interface BadPicture {
  readonly what: string;
  readonly name: string;
  readonly file: () => Buffer | Promise<Buffer>;
  readonly code: ProblemCode;
  readonly says: RegExp;
}

const width = 64;
const height = 48;
const grey = Uint8Array.from({ length: width * height }, (_, i) => (i * 167 + 31) % 256);
const png = () => pngFile({ width, height, data: grey });
const tiff = (tags: Record<number, number> = {}) => tiffFile({ width, height, data: grey, tags });
const jpeg = () => jpegFile({ width, height, data: interleaved(grey) });
const bmp = () => bmpFile({ width, height, data: interleaved(grey) });
const half = (file: Buffer) => file.subarray(0, Math.floor(file.length / 2));
const text = (content: string) => Buffer.from(content, 'latin1');

/** A PNG whose pixels unpack to something else than its header says. */
function pngUnpackingTo(bytes: Uint8Array): Buffer {
  const file = png();
  const { start, length } = findPngChunk(file, 'IDAT');
  return Buffer.concat([
    file.subarray(0, start - 8),
    pngChunk('IDAT', deflateSync(bytes)),
    file.subarray(start + length + 4),
  ]);
}

function palettePng(): Buffer {
  const palette: [number, number, number][] = Array.from({ length: 256 }, (_, i) => [i, 0, 255 - i]);
  return Buffer.from(encode({ width, height, data: grey, channels: 1, depth: 8, palette }));
}

function damagedPng(): Buffer {
  const file = png();
  const { start, length } = findPngChunk(file, 'IDAT');
  file[start + length - 2] ^= 0x55;
  return file;
}

async function jpegWithoutRestOfScan(): Promise<Buffer> {
  const file = await jpeg();
  return Buffer.concat([half(file), Buffer.from([0xff, 0xd9])]);
}

function hugeJpeg(file: Buffer): Buffer {
  const frame = file.indexOf(Buffer.from([0xff, 0xc0]));
  file.writeUInt16BE(60_000, frame + 5);
  file.writeUInt16BE(60_000, frame + 7);
  return file;
}

function hugeBmp(): Buffer {
  const file = bmp();
  file.writeInt32LE(60_000, 18);
  file.writeInt32LE(60_000, 22);
  return file;
}

const hugePng = () =>
  withPngHeader(png(), (header) => {
    header.writeUInt32BE(60_000, 0);
    header.writeUInt32BE(60_000, 4);
  });

const tooLarge = { code: 'picture-too-large', says: /60000 × 60000 pixels.*Crop it/ } as const;
const truncated = { code: 'picture-truncated', says: /ends before the picture does.*Copy it again/ } as const;
const damaged = { code: 'picture-damaged', says: /damaged.*Copy it again/ } as const;
const notAPicture = (is: string) =>
  ({ code: 'not-a-picture', says: new RegExp(`is ${is}.*Save the exposure as PNG or TIFF`) }) as const;
const unsupported = (why: RegExp) =>
  ({
    code: 'picture-format-unsupported',
    says: new RegExp(`${why.source}.*(Save it|Send the file)`),
  }) as const;

export const badPictures: readonly BadPicture[] = [
  {
    what: 'an empty file',
    name: 'a.png',
    file: () => Buffer.alloc(0),
    code: 'file-empty',
    says: /no content.*again/,
  },
  { what: 'a text', name: 'a.png', file: () => text('time,volts\n0,1\n'), ...notAPicture('a text file') },
  { what: 'a GIF', name: 'a.gif', file: () => text('GIF89a\x01\x00'), ...notAPicture('a GIF picture') },
  { what: 'a PDF', name: 'a.pdf', file: () => text('%PDF-1.7\n\xe2\xe3'), ...notAPicture('a PDF document') },
  {
    what: 'a WebP',
    name: 'a.webp',
    file: () => text('RIFF\x10\0\0\0WEBPVP8 '),
    ...notAPicture('a WebP picture'),
  },
  {
    what: 'a HEIC',
    name: 'a.heic',
    file: () => text('\0\0\0\x18ftypheic\0\0'),
    ...notAPicture('a HEIC or AVIF picture'),
  },
  { what: 'random bytes', name: 'a.png', file: () => Buffer.from(grey), ...notAPicture('not a PNG') },

  { what: 'a PNG cut in half', name: 'a.png', file: () => half(png()), ...truncated },
  { what: 'a PNG without its end', name: 'a.png', file: () => png().subarray(0, -12), ...truncated },
  {
    what: 'a PNG whose pixels end early',
    name: 'a.png',
    file: () => pngUnpackingTo(new Uint8Array((width + 1) * (height - 5))),
    ...truncated,
  },
  { what: 'a TIFF cut in half', name: 'a.tif', file: () => half(tiff()), ...truncated },
  {
    what: 'a TIFF whose strips lie beyond its end',
    name: 'a.tif',
    file: () => tiff({ 273: 100_000 }),
    ...truncated,
  },
  { what: 'a JPEG cut in half', name: 'a.jpg', file: async () => half(await jpeg()), ...truncated },
  {
    what: 'a JPEG without its end mark',
    name: 'a.jpg',
    file: async () => (await jpeg()).subarray(0, -2),
    ...truncated,
  },
  { what: 'a BMP cut in half', name: 'a.bmp', file: () => half(bmp()), ...truncated },

  { what: 'a PNG with a flipped bit', name: 'a.png', file: damagedPng, ...damaged },
  {
    what: 'a PNG that unpacks to far more than it has pixels',
    name: 'a.png',
    file: () => pngUnpackingTo(new Uint8Array(50_000_000)),
    ...damaged,
  },
  {
    what: 'a packed TIFF that unpacks to far more than it has pixels',
    name: 'a.tif',
    file: () =>
      tiffFile({
        width,
        height: 4000,
        data: new Uint8Array(width * 4000),
        packed: true,
        tags: { 257: height, 278: height },
      }),
    ...damaged,
  },
  {
    what: 'a JPEG whose scan breaks off before its end mark',
    name: 'a.jpg',
    file: jpegWithoutRestOfScan,
    ...damaged,
  },

  { what: 'a PNG of 60 000 × 60 000', name: 'a.png', file: hugePng, ...tooLarge },
  {
    what: 'a TIFF of 60 000 × 60 000',
    name: 'a.tif',
    file: () => tiff({ 256: 60_000, 257: 60_000 }),
    ...tooLarge,
  },
  {
    what: 'a JPEG of 60 000 × 60 000',
    name: 'a.jpg',
    file: async () => hugeJpeg(await jpeg()),
    ...tooLarge,
  },
  { what: 'a BMP of 60 000 × 60 000', name: 'a.bmp', file: hugeBmp, ...tooLarge },
  {
    what: 'a picture of 20 × 20',
    name: 'a.png',
    file: () => pngFile({ width: 20, height: 20, data: grey.subarray(0, 400) }),
    code: 'picture-too-small',
    says: /20 × 20 pixels; at least 32/,
  },

  {
    what: 'a PNG named as a JPEG',
    name: 'pattern.jpg',
    file: png,
    code: 'picture-type-differs',
    says: /ends in \.jpg, but the content is a PNG.*Rename/,
  },
  {
    what: 'a JPEG named as a TIFF',
    name: 'pattern.tif',
    file: jpeg,
    code: 'picture-type-differs',
    says: /ends in \.tif, but the content is a JPEG.*Rename/,
  },
  {
    what: 'an animated PNG',
    name: 'a.png',
    file: () => withPngChunk(png(), 'acTL', Buffer.from([0, 0, 0, 2, 0, 0, 0, 0])),
    code: 'picture-of-many',
    says: /animated PNG.*Save the one exposure/,
  },
  {
    what: 'a TIFF of two pages',
    name: 'a.tif',
    file: () => tiffFile({ width, height, data: grey, pages: 2 }),
    code: 'picture-of-many',
    says: /several pages.*Save the one exposure/,
  },

  { what: 'a PNG painted with a palette', name: 'a.png', file: palettePng, ...unsupported(/palette/) },
  {
    what: 'a PNG of one bit',
    name: 'a.png',
    file: () => withPngHeader(png(), (header) => header.writeUInt8(1, 8)),
    ...unsupported(/1 bits a pixel/),
  },
  {
    what: 'a PNG that is partly transparent',
    name: 'a.png',
    file: () => pngFile({ width, height, data: interleaved(grey).subarray(0, 2 * grey.length), channels: 2 }),
    ...unsupported(/transparent/),
  },
  {
    what: 'a TIFF of floating-point numbers',
    name: 'a.tif',
    file: () => tiff({ 258: 32, 339: 3 }),
    ...unsupported(/32 bits a sample/),
  },
  {
    what: 'a TIFF of signed numbers',
    name: 'a.tif',
    file: () => tiff({ 339: 2 }),
    ...unsupported(/signed/),
  },
  { what: 'a TIFF with a palette', name: 'a.tif', file: () => tiff({ 262: 3 }), ...unsupported(/palette/) },
  {
    what: 'a TIFF marked to be turned',
    name: 'a.tif',
    file: () => tiff({ 274: 6 }),
    ...unsupported(/turned/),
  },
  {
    what: 'a TIFF packed with PackBits',
    name: 'a.tif',
    file: () => tiff({ 259: 32773 }),
    ...unsupported(/packed/),
  },
  {
    what: 'a BMP of 16 bits',
    name: 'a.bmp',
    file: () => {
      const file = bmp();
      file.writeUInt16LE(16, 28);
      return file;
    },
    ...unsupported(/16 bits a pixel/),
  },
  {
    what: 'a colour picture of two lasers',
    name: 'a.png',
    file: twoLasers,
    code: 'picture-of-two-lasers',
    says: /red and the green channel show different patterns.*one laser at a time/,
  },
];
