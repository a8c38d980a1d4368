import { decodeWithJimp } from '#server/images/decode-with-jimp.ts';
import type { Samples } from '#server/images/samples.ts';
import { checkSize, damaged, truncated, unsupported } from '#server/images/sniff.ts';

const mend = 'Save it as grey BMP of 8 bits or colour of 24 bits without compression.';

/** BMP of 8 (palette), 24 or 32 bits a pixel without compression. */
export async function decodeBmp(bytes: Buffer): Promise<Samples> {
  if (bytes.length < 54) throw truncated();
  if (bytes.readUInt32LE(14) < 40) throw unsupported('The BMP has the header of an old kind.', mend);
  const width = Math.abs(bytes.readInt32LE(18));
  const height = Math.abs(bytes.readInt32LE(22));
  checkSize(width, height);
  const bits = bytes.readUInt16LE(28);
  if (![8, 24, 32].includes(bits))
    throw unsupported(`The BMP has ${bits} bits a pixel, too few to measure brightness in.`, mend);
  const compression = bytes.readUInt32LE(30);
  if (compression !== 0 && !(compression === 3 && bits === 32))
    throw unsupported('The BMP is packed in a way that cannot be read.', mend);
  const start = bytes.readUInt32LE(10);
  if (start < 54) throw damaged();
  if (start + Math.ceil((width * bits) / 32) * 4 * height > bytes.length) throw truncated();
  return decodeWithJimp(bytes);
}
