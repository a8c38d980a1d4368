import { findCenters } from '#server/engine/center.ts';
import { planeAt, type Frame } from '#server/engine/frame.ts';
import { quantileInPlace } from '#server/engine/median.ts';
import type { Picture, PictureFacts, Setup, UnusableReason } from '#server/engine/outcome.ts';
import { prepare } from '#server/engine/prepare.ts';

/** What a picture shows before anything is identified in it, and why it could not be (empty when it can be tried). */
export function inspectPicture(
  picture: Picture,
  setup: Setup,
): { facts: PictureFacts; unusable: readonly UnusableReason[] } {
  const frame = prepare(picture, setup);
  const centers = findCenters(frame, 1);
  return { facts: factsOf(frame, centers[0]), unusable: unusableReasons(frame, centers.length > 0) };
}

export function factsOf(
  frame: Frame,
  center: { x: number; y: number; score: number } | undefined,
): PictureFacts {
  let masked = 0;
  for (const reason of frame.mask) if (reason !== 0) masked += 1;
  return {
    saturatedShare: frame.saturatedShare,
    maskedShare: masked / frame.mask.length,
    center: center ? { x: center.x, y: center.y, u: 0.5 } : null,
    noise: frame.noise,
  };
}

export function unusableReasons(frame: Frame, hasCenter: boolean): UnusableReason[] {
  if (frame.saturatedShare > 0.98) return ['all-saturated'];
  if (frame.saturatedShare > 0.5) return ['mostly-saturated'];
  if (frame.width * frame.height < 32 * 32) return ['too-few-pixels'];
  const { data, mask, width, background } = frame;
  const stride = Math.max(1, Math.floor(data.length / 60_000));
  const signals: number[] = [];
  for (let k = 0; k < data.length; k += stride)
    if (mask[k] === 0) signals.push(data[k] - planeAt(background, k % width, Math.floor(k / width)));
  const sample = Float64Array.from(signals);
  const bright = quantileInPlace(sample, 0.995);
  const sigma = Math.sqrt(frame.noise.a);
  if (frame.saturatedShare < 1e-6 && bright < 5 * sigma) {
    const top = data.reduce((a, b) => Math.max(a, b), 0);
    return [top <= 4 * sigma || top === 0 ? 'all-dark' : 'no-contrast'];
  }
  return hasCenter ? [] : ['no-center'];
}
