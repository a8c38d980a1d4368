import { Jimp } from 'jimp';
import { dropChannels, type Samples } from '#server/images/samples.ts';
import { damaged } from '#server/images/sniff.ts';

/** Enough for a picture of the largest size that is taken; the decoder's own bound is made for browsers. */
const jpeg = { maxMemoryUsageInMB: 4096, tolerantDecoding: false };

/** Colour of 8 bits from a file whose header has been judged already. */
export async function decodeWithJimp(bytes: Buffer): Promise<Samples> {
  try {
    const { bitmap } = await Jimp.fromBuffer(bytes, { 'image/jpeg': jpeg });
    const data = dropChannels(new Uint8Array(bitmap.data), 4, 3);
    return { width: bitmap.width, height: bitmap.height, channels: 3, data, depth: 8, lossy: false };
  } catch {
    throw damaged();
  }
}
