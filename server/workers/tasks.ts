import type { MessagePort } from 'node:worker_threads';
import { identify } from '#server/engine/identify.ts';
import { inspectPicture } from '#server/engine/inspect.ts';
import type { Outcome } from '#server/engine/outcome.ts';
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
  | { readonly kind: 'pixels'; readonly bytes: Uint8Array }
  | {
      readonly kind: 'identify';
      readonly bytes: Uint8Array;
      readonly bench: BenchValues;
      readonly progress?: MessagePort;
      readonly stop?: Int32Array;
    };

/** Decodes, takes the facts and makes the small picture. Throws a Refusal for a file that cannot be decoded. */
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
    thumbnail: thumbnail(picture, facts.center),
  };
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
  shouldStop: () => boolean,
): Promise<Outcome> {
  const picture = await decodePicture(bytes, '', bench.bitDepth);
  return identify(picture, setupOf(bench, picture), { onProgress, shouldStop });
}
