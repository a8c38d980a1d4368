import type { Outcome, PictureFacts, UnusableReason } from '#server/engine/outcome.ts';
import type { BenchValues } from '#shared/contracts/benches.ts';
import type { Channel, PictureFormat } from '#shared/contracts/exposures.ts';

/** What decoding found out about a picture file. */
export interface DecodedFacts {
  readonly format: PictureFormat;
  readonly width: number;
  readonly height: number;
  readonly bitDepth: number;
  readonly fullScale: number;
  readonly codeStep: number;
  readonly lossy: boolean;
  readonly channel: Channel;
}

export interface Inspection {
  readonly decoded: DecodedFacts;
  readonly facts: PictureFacts;
  /** Reasons why nothing could be identified in it; empty when it can be tried. */
  readonly unusable: readonly UnusableReason[];
}

/** Numeric work, always off the request thread. A picture that cannot be decoded rejects with a Refusal. */
export interface EnginePool {
  inspect(bytes: Uint8Array, fileName: string, bench: BenchValues): Promise<Inspection>;
  /** 192 × 192 grey PNG about the centre. */
  thumbnail(bytes: Uint8Array, center: PictureFacts['center']): Promise<Uint8Array>;
  /** The measured plane as unsigned 16-bit codes, little endian. */
  pixels(bytes: Uint8Array): Promise<Uint8Array>;
  /** Rejects with an AbortError once `signal` is pulled, with a Refusal when it takes too long. */
  identify(
    bytes: Uint8Array,
    bench: BenchValues,
    onProgress: (step: string, share: number) => void,
    signal: AbortSignal,
  ): Promise<Outcome>;
  close(): Promise<void>;
}
