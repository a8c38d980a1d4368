import type { MessagePort } from 'node:worker_threads';
import { identify } from '#server/engine/identify.ts';
import { inspectPicture } from '#server/engine/inspect.ts';
import type { Outcome, PictureFacts } from '#server/engine/outcome.ts';
import { decodePicture } from '#server/images/decode.ts';
import { setupOf } from '#server/images/setup-of.ts';
import { thumbnail } from '#server/images/thumbnail.ts';
import type { Inspection } from '#server/workers/engine-pool.ts';
import type { BenchValues } from '#shared/contracts/benches.ts';

/** Work that a worker thread takes; bytes are decoded there and nowhere else. */
export type Task =
  | {
      readonly kind: 'inspect';
      readonly bytes: Uint8Array;
      readonly fileName: string;
      readonly bench: BenchValues;
    }
  | { readonly kind: 'thumbnail'; readonly bytes: Uint8Array; readonly center: PictureFacts['center'] }
  | { readonly kind: 'pixels'; readonly bytes: Uint8Array }
  | {
      readonly kind: 'identify';
      readonly bytes: Uint8Array;
      readonly bench: BenchValues;
      readonly progress: MessagePort;
    };

/** Decodes and takes the facts. Throws a Refusal for a file that cannot be decoded. */
export async function inspectTask(
  bytes: Uint8Array,
  fileName: string,
  bench: BenchValues,
): Promise<Inspection> {
  const picture = await decodePicture(bytes, fileName, bench.bitDepth);
  const { facts, unusable } = inspectPicture(picture, setupOf(bench, picture));
  const { format, width, height, bitDepth, fullScale, codeStep, lossy, channel } = picture;
  return {
    decoded: { format, width, height, bitDepth, fullScale, codeStep, lossy, channel },
    facts,
    unusable,
  };
}

export async function thumbnailTask(bytes: Uint8Array, center: PictureFacts['center']): Promise<Uint8Array> {
  return thumbnail(await decodePicture(bytes, '', 16), center);
}

/** The measured plane, little endian. */
export async function pixelsTask(bytes: Uint8Array): Promise<Uint8Array> {
  const { codes } = await decodePicture(bytes, '', 16);
  const out = new Uint8Array(codes.length * 2);
  const view = new DataView(out.buffer);
  for (let i = 0; i < codes.length; i++) view.setUint16(2 * i, codes[i], true);
  return out;
}

export async function identifyTask(
  bytes: Uint8Array,
  bench: BenchValues,
  onProgress: (step: string, share: number) => void,
  shouldStop: () => boolean = () => false,
): Promise<Outcome> {
  const picture = await decodePicture(bytes, '', bench.bitDepth);
  return identify(picture, setupOf(bench, picture), { onProgress, shouldStop });
}
