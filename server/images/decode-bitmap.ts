import { Jimp } from 'jimp';
import { Refusal } from '#server/http/refusal.ts';
import { dropChannels, type Samples } from '#server/images/samples.ts';
import { checkSize, damaged, truncated } from '#server/images/sniff.ts';

/** JPEG: size from the frame header, end mark present; turned upright by its orientation tag, as viewers show it. */
export async function decodeJpeg(bytes: Buffer): Promise<Samples> {
  const { width, height, components } = frameHeader(bytes);
  checkSize(width, height);
  if (components === 4)
    throw new Refusal(
      'picture-format-unsupported',
      'The JPEG is coded for print (four inks). Save it as grey or RGB.',
    );
  if (bytes.lastIndexOf(Buffer.from([0xff, 0xd9])) < bytes.length - 64) throw truncated();
  return { ...(await withJimp(bytes)), lossy: true };
}

/** BMP of 8 bits and more a channel. */
export async function decodeBmp(bytes: Buffer): Promise<Samples> {
  if (bytes.length < 54) throw truncated();
  checkSize(Math.abs(bytes.readInt32LE(18)), Math.abs(bytes.readInt32LE(22)));
  if (bytes.readUInt32LE(2) > bytes.length) throw truncated();
  return withJimp(bytes);
}

async function withJimp(bytes: Buffer): Promise<Samples> {
  try {
    const { bitmap } = await Jimp.read(bytes);
    const data = dropChannels(new Uint8Array(bitmap.data), 4, 3);
    return { width: bitmap.width, height: bitmap.height, channels: 3, data, depth: 8, lossy: false };
  } catch {
    throw damaged();
  }
}

/** Walks the markers to the start of frame (ITU-T T.81, B.2.2). */
function frameHeader(bytes: Buffer): { width: number; height: number; components: number } {
  let at = 2;
  while (at + 9 < bytes.length) {
    if (bytes[at] !== 0xff) throw damaged();
    const marker = bytes[at + 1];
    if (marker === 0xff) {
      at += 1;
      continue;
    }
    const isFrame = marker >= 0xc0 && marker <= 0xcf && marker !== 0xc4 && marker !== 0xc8 && marker !== 0xcc;
    if (isFrame)
      return {
        height: bytes.readUInt16BE(at + 5),
        width: bytes.readUInt16BE(at + 7),
        components: bytes[at + 9],
      };
    at += 2 + bytes.readUInt16BE(at + 2);
  }
  throw truncated();
}
