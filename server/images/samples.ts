import { unsupported } from '#server/images/sniff.ts';

/** Decoded samples, interleaved by channel (1 grey, 3 colour), before one plane is made of them. */
export interface Samples {
  readonly width: number;
  readonly height: number;
  readonly channels: 1 | 3;
  readonly data: Uint8Array | Uint16Array;
  /** Bits per sample of the file: 8 or 16. */
  readonly depth: 8 | 16;
  readonly lossy: boolean;
}

/** Keeps the first `keep` of `channels` interleaved samples. */
export function dropChannels<T extends Uint8Array | Uint16Array>(data: T, channels: number, keep: number): T {
  if (channels === keep) return data;
  const n = data.length / channels;
  const out = (data instanceof Uint16Array ? new Uint16Array(n * keep) : new Uint8Array(n * keep)) as T;
  for (let i = 0; i < n; i++) for (let c = 0; c < keep; c++) out[i * keep + c] = data[i * channels + c];
  return out;
}

/** Grey or colour without the alpha channel that may follow. Throws a Refusal where something is transparent. */
export function opaqueSamples<T extends Uint8Array | Uint16Array>(
  data: T,
  channels: number,
  depth: 8 | 16,
): { channels: 1 | 3; data: T } {
  const keep = channels >= 3 ? 3 : 1;
  if (channels > keep) {
    const full = 2 ** depth - 1;
    for (let i = keep; i < data.length; i += channels)
      if (data[i] !== full)
        throw unsupported(
          'Parts of the picture are transparent, so its brightness is not what was photographed.',
          'Send the file as the camera wrote it, or save it without transparency.',
        );
  }
  return { channels: keep, data: dropChannels(data, channels, keep) };
}

/** Grey codes of a palette picture. Throws a Refusal where the palette holds colours: they stand for no brightness. */
export function greyFromPalette(
  indices: Uint8Array | Uint16Array,
  palette: readonly (readonly number[])[],
): Uint8Array {
  if (palette.some(([red, green, blue]) => red !== green || red !== blue))
    throw unsupported(
      'The picture is painted with a palette of colours, so its brightness is not what was photographed.',
      'Send the file as the camera wrote it, as grey PNG or TIFF.',
    );
  return Uint8Array.from(indices, (index) => palette[index]?.[0] ?? 0);
}
