import { decode } from 'tiff';
import { inflateWithin } from '#server/images/inflate-within.ts';
import { opaqueSamples, type Samples } from '#server/images/samples.ts';
import { checkSize, damaged, truncated, unsupported } from '#server/images/sniff.ts';
import { readTiffDirectory, tags, type TiffDirectory } from '#server/images/tiff-directory.ts';

const mend = 'Save it as 8-bit or 16-bit unsigned grey TIFF without compression.';

/** TIFF of 8 or 16 bits, grey or colour, one page. The directory is judged before anything is unpacked. */
export function decodeTiff(bytes: Buffer): Samples {
  const directory = readTiffDirectory(bytes);
  const width = directory.number(tags.width, 0);
  const height = directory.number(tags.height, 0);
  checkSize(width, height);
  const depth = directory.number(tags.bitsPerSample, 1);
  const channels = directory.number(tags.samplesPerPixel, 1);
  requireMeasurable(directory, depth, channels);
  checkBlocks(bytes, directory, (channels * depth) / 8);
  let data: unknown;
  try {
    data = decode(bytes)[0].data;
  } catch (error) {
    if (/unsupported/i.test((error as Error).message))
      throw unsupported('The TIFF is packed in a way that cannot be read.', mend);
    throw damaged();
  }
  if (!(data instanceof Uint8Array || data instanceof Uint16Array)) throw damaged();
  const fileDepth = depth === 16 ? 16 : 8;
  return { width, height, ...opaqueSamples(data, channels, fileDepth), depth: fileDepth, lossy: false };
}

/** Kinds that hold no plain brightness, or that the decoder would read wrongly (TIFF 6.0). */
function requireMeasurable(directory: TiffDirectory, depth: number, channels: number): void {
  if (depth !== 8 && depth !== 16)
    throw unsupported(`The TIFF has ${depth} bits a sample, which cannot be measured.`, mend);
  if (directory.number(tags.sampleFormat, 1) !== 1)
    throw unsupported('The samples of the TIFF are signed or floating-point numbers.', mend);
  if (directory.number(tags.photometric, 1) > 2)
    throw unsupported('The TIFF has a palette or another colour coding.', mend);
  const tiled = directory.numbers(tags.tileOffsets).length > 0;
  if (channels > 1 && (tiled || directory.number(tags.planar, 1) !== 1))
    throw unsupported('The colours of the TIFF are stored in tiles or planes of their own.', mend);
  if (directory.number(tags.orientation, 1) !== 1)
    throw unsupported('The TIFF is marked to be turned or mirrored before it is looked at.', mend);
}

/** Every strip or tile lies inside the file and unpacks to what its rows need. */
function checkBlocks(bytes: Buffer, directory: TiffDirectory, pixel: number): void {
  const tiled = directory.numbers(tags.tileOffsets).length > 0;
  const offsets = directory.numbers(tiled ? tags.tileOffsets : tags.stripOffsets);
  const sizes = directory.numbers(tiled ? tags.tileSizes : tags.stripSizes);
  if (offsets.length === 0) throw damaged();
  const width = directory.number(tags.width, 0);
  const height = directory.number(tags.height, 0);
  const rows = Math.min(directory.number(tags.rowsPerStrip, height), height);
  const block = tiled
    ? directory.number(tags.tileWidth, 0) * directory.number(tags.tileHeight, 0) * pixel
    : rows * width * pixel;
  if (!tiled && offsets.length * rows < height) throw damaged();
  const compression = directory.number(tags.compression, 1);
  offsets.forEach((offset, i) => {
    const needed = tiled ? block : Math.min(rows, height - i * rows) * width * pixel;
    const size = sizes[i] ?? (compression === 1 ? needed : 0);
    if (offset + size > bytes.length) throw truncated();
    if (compression === 1 && size < needed) throw truncated();
    if (compression === 8 || compression === 32946)
      inflateWithin(bytes.subarray(offset, offset + size), needed, block);
  });
}
