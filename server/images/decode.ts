import type { Picture } from '#server/engine/outcome.ts';
import { codeScale } from '#server/images/depth.ts';
import { decodeBmp } from '#server/images/decode-bmp.ts';
import { decodeJpeg } from '#server/images/decode-jpeg.ts';
import { decodePng } from '#server/images/decode-png.ts';
import { decodeTiff } from '#server/images/decode-tiff.ts';
import { onePlane } from '#server/images/plane.ts';
import type { Samples } from '#server/images/samples.ts';
import { sniffFormat } from '#server/images/sniff.ts';
import type { Channel, PictureFormat } from '#shared/contracts/exposures.ts';

/** A picture file as one plane of codes at its true depth, rows from the top. */
export interface DecodedPicture extends Picture {
  readonly format: PictureFormat;
  readonly channel: Channel;
  /** Bits that carry information. */
  readonly bitDepth: number;
}

const decoders: Record<PictureFormat, (bytes: Buffer) => Samples | Promise<Samples>> = {
  png: decodePng,
  tiff: decodeTiff,
  jpeg: decodeJpeg,
  bmp: decodeBmp,
};

/**
 * Decodes PNG and TIFF of 8 or 16 bits, JPEG and BMP. The type is decided by content; limits hold before decoding; of a
 * colour picture of one laser the channel that carries it is taken. `benchDepth` is the camera's bit depth, which says what
 * right-aligned 16-bit data mean. Throws a Refusal that names the fault and the mend.
 */
export async function decodePicture(
  bytes: Uint8Array,
  fileName: string,
  benchDepth: number,
): Promise<DecodedPicture> {
  const buffer = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const format = sniffFormat(buffer, fileName);
  const samples = await decoders[format](buffer);
  const { codes, channel } = onePlane(samples);
  return {
    format,
    channel,
    width: samples.width,
    height: samples.height,
    codes,
    lossy: samples.lossy,
    ...codeScale(codes, samples.depth, benchDepth),
  };
}
