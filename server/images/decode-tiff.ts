import { decode } from 'tiff';
import { Refusal } from '#server/http/refusal.ts';
import { dropChannels, type Samples } from '#server/images/samples.ts';
import { checkSize, damaged, ofMany, truncated } from '#server/images/sniff.ts';

const tags = {
  width: 256,
  height: 257,
  stripOffsets: 273,
  stripSizes: 279,
  tileOffsets: 324,
  tileSizes: 325,
};

/** TIFF of 8 or 16 bits, grey or colour, one page. The directory is read before decoding. */
export function decodeTiff(bytes: Buffer): Samples {
  const directory = readDirectory(bytes);
  const width = directory.get(tags.width)?.[0] ?? 0;
  const height = directory.get(tags.height)?.[0] ?? 0;
  checkSize(width, height);
  const offsets = directory.get(tags.stripOffsets) ?? directory.get(tags.tileOffsets) ?? [];
  const sizes = directory.get(tags.stripSizes) ?? directory.get(tags.tileSizes) ?? [];
  offsets.forEach((offset, i) => {
    if (offset + (sizes[i] ?? 0) > bytes.length) throw truncated();
  });
  let page: ReturnType<typeof decode>[number];
  try {
    page = decode(bytes)[0];
  } catch {
    throw damaged();
  }
  const { data, samplesPerPixel, bitsPerSample, type } = page;
  if (
    !(data instanceof Uint8Array || data instanceof Uint16Array) ||
    (bitsPerSample !== 8 && bitsPerSample !== 16)
  )
    throw new Refusal(
      'picture-format-unsupported',
      `The TIFF has ${bitsPerSample} bits a sample in a form that cannot be measured. Save it as 8-bit or 16-bit unsigned grey.`,
    );
  if (type !== 0 && type !== 1 && type !== 2)
    throw new Refusal(
      'picture-format-unsupported',
      'The TIFF has a palette or another colour coding. Save it as 16-bit grey.',
    );
  const channels = samplesPerPixel >= 3 ? 3 : 1;
  const samples = dropChannels(data, samplesPerPixel, channels);
  // Photometric interpretation 0 counts from white (TIFF 6.0, section 3).
  if (type === 0)
    for (let i = 0; i < samples.length; i++) samples[i] = (bitsPerSample === 16 ? 65535 : 255) - samples[i];
  return {
    width: page.width,
    height: page.height,
    channels,
    data: samples,
    depth: bitsPerSample,
    lossy: false,
  };
}

/** Tag to numbers of the first directory (TIFF 6.0, section 2). Throws when there is a second one. */
function readDirectory(bytes: Buffer): Map<number, number[]> {
  const little = bytes[0] === 0x49;
  const u16 = (at: number) => (little ? bytes.readUInt16LE(at) : bytes.readUInt16BE(at));
  const u32 = (at: number) => (little ? bytes.readUInt32LE(at) : bytes.readUInt32BE(at));
  const directory = new Map<number, number[]>();
  try {
    const start = u32(4);
    const count = u16(start);
    for (let i = 0; i < count; i++) {
      const entry = start + 2 + 12 * i;
      const type = u16(entry + 2);
      const n = u32(entry + 4);
      const width = type === 3 ? 2 : type === 4 ? 4 : 0;
      if (width === 0 || n > 1e6) continue;
      const at = n * width <= 4 ? entry + 8 : u32(entry + 8);
      directory.set(
        u16(entry),
        Array.from({ length: n }, (_, k) => (width === 2 ? u16(at + 2 * k) : u32(at + 4 * k))),
      );
    }
    if (u32(start + 2 + 12 * count) !== 0) throw ofMany('a TIFF of several pages');
  } catch (error) {
    if (error instanceof RangeError) throw truncated();
    throw error;
  }
  return directory;
}
