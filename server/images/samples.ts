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
