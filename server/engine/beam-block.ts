import { maskReason, planeAt, type Frame } from '#server/engine/frame.ts';

/** A centre darker than this share of the brightest ring is covered. */
const darkShare = 0.3;
/** A pixel darker than this share of its mirror image is covered. */
const coveredShare = 0.25;

/**
 * The frame with a beam block masked, or the frame itself. |F(0)|² is the greatest value of any opening's pattern (Goodman),
 * so a dark centre proves a block: everything out to the brightest ring goes, and its handle, which is where the picture
 * is much darker than its own mirror image through the centre.
 */
export function withoutBeamBlock(frame: Frame, center: { x: number; y: number }): Frame {
  const radius = blockRadius(frame, center);
  if (radius === 0) return frame;
  const { width, height, data } = frame;
  const mask = Uint8Array.from(frame.mask);
  const enough = 6 * Math.sqrt(frame.noise.a);
  for (let y = 0; y < height; y++) {
    const mirrorY = Math.round(2 * center.y - y);
    for (let x = 0; x < width; x++) {
      const k = y * width + x;
      if (Math.hypot(x - center.x, y - center.y) <= radius) {
        mask[k] = maskReason.block;
        continue;
      }
      const mirrorX = Math.round(2 * center.x - x);
      if (mirrorX < 0 || mirrorX >= width || mirrorY < 0 || mirrorY >= height) continue;
      const mirror = data[mirrorY * width + mirrorX] - planeAt(frame.background, mirrorX, mirrorY);
      const here = data[k] - planeAt(frame.background, x, y);
      if (mirror > enough && here < coveredShare * mirror) coverAround(mask, width, height, x, y);
    }
  }
  return { ...frame, mask };
}

function coverAround(mask: Uint8Array, width: number, height: number, x: number, y: number): void {
  for (let j = Math.max(0, y - 2); j <= Math.min(height - 1, y + 2); j++)
    for (let i = Math.max(0, x - 2); i <= Math.min(width - 1, x + 2); i++)
      if (mask[j * width + i] === 0) mask[j * width + i] = maskReason.block;
}

/** Radius of the brightest ring and a rim where the centre is dark, else 0; pixels. */
function blockRadius(frame: Frame, center: { x: number; y: number }): number {
  const { width, height, data, mask } = frame;
  const inside = center.x >= 0 && center.x < width && center.y >= 0 && center.y < height;
  if (!inside) return 0;
  const reach = Math.floor(0.25 * Math.min(width, height));
  const sum = new Float64Array(reach + 1);
  const count = new Float64Array(reach + 1);
  for (let y = Math.max(0, Math.ceil(center.y - reach)); y <= Math.min(height - 1, center.y + reach); y++)
    for (let x = Math.max(0, Math.ceil(center.x - reach)); x <= Math.min(width - 1, center.x + reach); x++) {
      const ring = Math.floor(Math.hypot(x - center.x, y - center.y));
      if (ring > reach || mask[y * width + x] === maskReason.hot) continue;
      sum[ring] += data[y * width + x] - planeAt(frame.background, x, y);
      count[ring] += 1;
    }
  let brightest = 0;
  for (let ring = 0; ring <= reach; ring++) {
    sum[ring] /= Math.max(count[ring], 1);
    if (sum[ring] > sum[brightest]) brightest = ring;
  }
  const core = (sum[0] + sum[1] + sum[2]) / 3;
  const sure = sum[brightest] > (6 * Math.sqrt(frame.noise.a)) / Math.sqrt(Math.max(count[brightest], 1));
  return brightest > 3 && sure && core < darkShare * sum[brightest] ? brightest + 3 : 0;
}
