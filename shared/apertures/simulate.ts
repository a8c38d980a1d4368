import type { FarFieldModel } from '#shared/apertures/family.ts';
import { spatialFrequency, type Geometry } from '#shared/physics/geometry.ts';

/** A pattern to be drawn on a picture's own pixels; SI, picture coordinates in pixels. */
export interface SimulatedPattern {
  readonly model: FarFieldModel;
  /** Fitted values of the model, metres. */
  readonly values: ArrayLike<number>;
  /** Direction of the aperture's own u axis, radians counter-clockwise as displayed. */
  readonly orientation: number;
  readonly geometry: Geometry;
  readonly center: { readonly x: number; readonly y: number };
  /** Linear counts. */
  readonly amplitude: number;
  /** Offset at the centre and slopes per pixel to the right and downwards, linear counts. */
  readonly background: { readonly offset: number; readonly slopeX: number; readonly slopeY: number };
  /** px² beyond the pixel's own box. */
  readonly blurVariance: number;
}

/** Part of a picture: whole pixels, every `step`-th of them. */
export interface Window {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
  readonly step: number;
}

/**
 * Expected linear counts of a window of a picture, row by row from the top: closed form at four nodes per pixel, which
 * carry the variance of the pixel's box and of the blur. Allocates the answer and one row of scratch.
 */
export function simulatePattern(pattern: SimulatedPattern, window: Window): Float32Array {
  const { model, values, geometry, center, background } = pattern;
  const columns = Math.ceil(window.width / window.step);
  const rows = Math.ceil(window.height / window.step);
  const delta = Math.sqrt(Math.max((window.step * window.step) / 12 + pattern.blurVariance, 1e-3));
  const c = Math.cos(pattern.orientation);
  const s = Math.sin(pattern.orientation);
  const u = new Float64Array(4 * columns);
  const v = new Float64Array(4 * columns);
  const nodes = new Float64Array(4 * columns);
  const out = new Float32Array(columns * rows);
  for (let j = 0; j < rows; j++) {
    const dy = window.top + j * window.step + (window.step - 1) / 2 - center.y;
    for (let i = 0; i < columns; i++) {
      const dx = window.left + i * window.step + (window.step - 1) / 2 - center.x;
      for (let q = 0; q < 4; q++) {
        const { fx, fy } = spatialFrequency(
          geometry,
          dx + (q & 1 ? delta : -delta),
          dy + (q & 2 ? delta : -delta),
        );
        u[4 * i + q] = c * fx + s * fy;
        v[4 * i + q] = c * fy - s * fx;
      }
    }
    model.intensity(values, u, v, nodes, 4 * columns);
    for (let i = 0; i < columns; i++) {
      const dx = window.left + i * window.step + (window.step - 1) / 2 - center.x;
      const mean = (nodes[4 * i] + nodes[4 * i + 1] + nodes[4 * i + 2] + nodes[4 * i + 3]) / 4;
      out[j * columns + i] =
        pattern.amplitude * mean + background.offset + background.slopeX * dx + background.slopeY * dy;
    }
  }
  return out;
}
