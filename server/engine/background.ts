import type { Plane } from '#server/engine/frame.ts';
import { quantileInPlace } from '#server/engine/median.ts';
import { solveSymmetric } from '#shared/physics/linear-algebra.ts';

const cells = 14;

/**
 * A robust plane under the pattern: the 20 % quantile of each of 14 × 14 cells, fitted with weights that fall for cells
 * above the plane. Linear counts.
 */
export function backgroundPlane(data: Float32Array, mask: Uint8Array, width: number, height: number): Plane {
  const x0 = (width - 1) / 2;
  const y0 = (height - 1) / 2;
  const points: { x: number; y: number; z: number }[] = [];
  for (let j = 0; j < cells; j++)
    for (let i = 0; i < cells; i++) {
      const left = Math.floor((i * width) / cells);
      const right = Math.floor(((i + 1) * width) / cells);
      const top = Math.floor((j * height) / cells);
      const bottom = Math.floor(((j + 1) * height) / cells);
      const stride = Math.max(1, Math.floor(Math.sqrt(((right - left) * (bottom - top)) / 900)));
      const values: number[] = [];
      for (let y = top; y < bottom; y += stride)
        for (let x = left; x < right; x += stride)
          if (mask[y * width + x] === 0) values.push(data[y * width + x]);
      if (values.length > 8)
        points.push({
          x: (left + right - 1) / 2 - x0,
          y: (top + bottom - 1) / 2 - y0,
          z: quantileInPlace(Float64Array.from(values), 0.2),
        });
    }
  if (points.length < 6) return { x0, y0, offset: 0, slopeX: 0, slopeY: 0 };
  let plane = [
    quantileInPlace(
      Float64Array.from(points, (p) => p.z),
      0.25,
    ),
    0,
    0,
  ];
  for (let round = 0; round < 12; round++) {
    const residuals = points.map((p) => p.z - plane[0] - plane[1] * p.x - plane[2] * p.y);
    const scale = Math.max(1e-9, 1.4826 * quantileInPlace(Float64Array.from(residuals, Math.abs), 0.4));
    const normal = new Float64Array(9);
    const right = new Float64Array(3);
    points.forEach((p, k) => {
      const r = residuals[k] / scale;
      const w = r > 0 ? 1 / (1 + r * r) : 1;
      const row = [1, p.x / width, p.y / height];
      for (let a = 0; a < 3; a++) {
        right[a] += w * row[a] * p.z;
        for (let b = 0; b < 3; b++) normal[3 * a + b] += w * row[a] * row[b];
      }
    });
    const solved = solveSymmetric(normal, right, 3);
    if (!solved) break;
    plane = [solved[0], solved[1] / width, solved[2] / height];
  }
  return { x0, y0, offset: plane[0], slopeX: plane[1], slopeY: plane[2] };
}
