import { findCenters, hasLight } from '#server/engine/center.ts';
import type { Frame } from '#server/engine/frame.ts';
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

/** Standard uncertainty of a centre found by symmetry alone, px: its usual error on the project's own simulations. */
const symmetryUncertainty = 0.5;

export function factsOf(
  frame: Frame,
  center: { x: number; y: number; u?: number } | undefined,
): PictureFacts {
  let masked = 0;
  for (const reason of frame.mask) if (reason !== 0) masked += 1;
  return {
    saturatedShare: frame.saturatedShare,
    maskedShare: masked / frame.mask.length,
    center: center ? { x: center.x, y: center.y, u: center.u ?? symmetryUncertainty } : null,
    noise: frame.noise,
  };
}

export function unusableReasons(frame: Frame, hasCenter: boolean): UnusableReason[] {
  if (frame.width * frame.height < 32 * 32) return ['too-few-pixels'];
  if (frame.saturatedShare > 0.98) return ['all-saturated'];
  if (frame.saturatedShare > 0.5) return ['mostly-saturated'];
  if (frame.saturatedShare < 1e-6 && !hasLight(frame)) {
    const top = frame.data.reduce((a, b) => Math.max(a, b), 0);
    return [top <= 4 * Math.sqrt(frame.noise.a) ? 'all-dark' : 'no-contrast'];
  }
  return hasCenter ? [] : ['no-center'];
}
