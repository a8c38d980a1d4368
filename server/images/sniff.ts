import { Refusal } from '#server/http/refusal.ts';
import { pictureLimits, type PictureFormat } from '#shared/contracts/exposures.ts';

/** What a file's first bytes say it is, measured formats apart. */
const foreign: readonly (readonly [string, (b: Buffer) => boolean])[] = [
  ['a GIF picture', (b) => ascii(b, 0, 4) === 'GIF8'],
  ['a WebP picture', (b) => ascii(b, 0, 4) === 'RIFF' && ascii(b, 8, 12) === 'WEBP'],
  ['a HEIC or AVIF picture', (b) => ascii(b, 4, 8) === 'ftyp'],
  ['a PDF document', (b) => ascii(b, 0, 4) === '%PDF'],
  ['a BigTIFF', (b) => ascii(b, 0, 4) === 'II+\0' || ascii(b, 0, 4) === 'MM\0+'],
  ['a JPEG XL picture', (b) => ascii(b, 0, 2) === '\xff\x0a' || ascii(b, 4, 8) === 'JXL '],
  ['a JPEG 2000 picture', (b) => ascii(b, 4, 8) === 'jP  '],
  ['a zip archive', (b) => ascii(b, 0, 2) === 'PK'],
  ['an SVG drawing', (b) => /^\s*(<\?xml[^>]*>\s*)?<svg/i.test(b.subarray(0, 400).toString('utf8'))],
  ['a text file', (b) => /^[\t\r\n\x20-\x7e]+$/.test(ascii(b, 0, 400))],
];

const extensions: Record<PictureFormat, readonly string[]> = {
  png: ['png'],
  jpeg: ['jpg', 'jpeg', 'jpe'],
  tiff: ['tif', 'tiff'],
  bmp: ['bmp', 'dib'],
};

const words: Record<PictureFormat, string> = { png: 'a PNG', jpeg: 'a JPEG', tiff: 'a TIFF', bmp: 'a BMP' };

function ascii(b: Buffer, from: number, to: number): string {
  return b.subarray(from, to).toString('latin1');
}

/** The format by content, agreeing with the name's ending. Throws a Refusal with the mend. */
export function sniffFormat(bytes: Buffer, fileName: string): PictureFormat {
  if (bytes.length === 0)
    throw new Refusal('file-empty', 'The file has no content. Save the picture again and send it anew.');
  const format = formatOf(bytes);
  if (!format) {
    const other = foreign.find(([, is]) => is(bytes));
    throw new Refusal(
      'not-a-picture',
      other
        ? `The file is ${other[0]}, which cannot be measured. Save the exposure as PNG or TIFF from the camera and send that.`
        : 'The file is not a PNG, TIFF, JPEG or BMP picture. Save the exposure as PNG or TIFF from the camera and send that.',
    );
  }
  // A name such as "L=0.85" has no ending; one that begins with a letter claims a type.
  const ending = /\.([a-z][a-z0-9]{0,4})$/i.exec(fileName)?.[1]?.toLowerCase();
  const named = (Object.keys(extensions) as PictureFormat[]).find(
    (f) => ending && extensions[f].includes(ending),
  );
  if (ending !== undefined && named !== format)
    throw new Refusal(
      'picture-type-differs',
      `The name ends in .${ending}, but the content is ${words[format]} picture. Rename the file or save it again, so that nobody takes it for another.`,
    );
  return format;
}

function formatOf(b: Buffer): PictureFormat | undefined {
  if (ascii(b, 0, 8) === '\x89PNG\r\n\x1a\n') return 'png';
  if (b[0] === 0xff && b[1] === 0xd8 && b[2] === 0xff) return 'jpeg';
  if (ascii(b, 0, 4) === 'II*\0' || ascii(b, 0, 4) === 'MM\0*') return 'tiff';
  if (ascii(b, 0, 2) === 'BM' && b.length > 30) return 'bmp';
  return undefined;
}

/** Holds the limits before a single pixel is decoded. */
export function checkSize(width: number, height: number): void {
  const { pixels, side, smallestSide } = pictureLimits;
  if (width > side || height > side || width * height > pixels)
    throw new Refusal(
      'picture-too-large',
      `The picture has ${width} × ${height} pixels; at most ${side} a side and ${pixels / 1e6} million in all can be measured. Crop it about the pattern or bin its pixels.`,
    );
  if (width < smallestSide || height < smallestSide)
    throw new Refusal(
      'picture-too-small',
      `The picture has ${width} × ${height} pixels; at least ${smallestSide} a side are needed.`,
    );
}

export function truncated(): Refusal {
  return new Refusal(
    'picture-truncated',
    'The file ends before the picture does. Copy it again from the camera and send it anew.',
  );
}

export function damaged(): Refusal {
  return new Refusal(
    'picture-damaged',
    'The picture file is damaged and cannot be decoded. Copy it again from the camera and send it anew.',
  );
}

/** A kind of file that would lose or hide what is measured. */
export function unsupported(why: string, mend: string): Refusal {
  return new Refusal('picture-format-unsupported', `${why} ${mend}`);
}

export function ofMany(what: string): Refusal {
  return new Refusal(
    'picture-of-many',
    `The file is ${what}. Save the one exposure to be measured as a file of its own.`,
  );
}
