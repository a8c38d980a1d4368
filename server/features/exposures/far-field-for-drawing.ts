import { familyOf } from '#shared/apertures/registry.ts';
import type { BenchValues } from '#shared/contracts/benches.ts';
import type { Drawing } from '#shared/contracts/cases.ts';
import type { ExposureWarning } from '#shared/contracts/exposures.ts';
import type { FarFieldFinding, PictureFacts } from '#shared/contracts/identifications.ts';
import {
  farFieldDistance,
  fresnelLimit,
  fresnelNumber,
  pixelsPerFringe,
  pixelsPerFringeLimit,
} from '#shared/physics/sampling.ts';

/** Whether the drawing's opening would be in its far field on this bench; null when the case names no size. */
export function farFieldForDrawing(bench: BenchValues, drawing: Drawing | null): FarFieldFinding | null {
  if (!drawing) return null;
  if (bench.geometry === 'lens') return { holds: true, fresnelNumber: 0, distanceNeeded: null };
  const extent = familyOf(drawing.aperture.family).extent(drawing.aperture.values);
  const n = fresnelNumber(extent, bench.wavelength.value, bench.distance.value);
  return {
    holds: n <= fresnelLimit,
    fresnelNumber: n,
    distanceNeeded: farFieldDistance(extent, bench.wavelength.value),
  };
}

/** What stands out about an exposure before anything is identified. */
export function warningsOf(
  picture: { width: number; height: number; bitDepth: number; lossy: boolean },
  facts: PictureFacts,
  bench: BenchValues,
  drawing: Drawing | null,
): ExposureWarning[] {
  const warnings: ExposureWarning[] = [];
  if (facts.saturatedShare > 1e-4) warnings.push('saturated-core');
  if (picture.lossy) warnings.push('lossy-file');
  if (picture.bitDepth <= 8) warnings.push('eight-bit');
  if (bench.darkLevel === null) warnings.push('unknown-dark-level');
  if (picture.bitDepth < bench.bitDepth) warnings.push('depth-below-bench');
  const { center } = facts;
  if (center) {
    const margin = Math.min(center.x, center.y, picture.width - center.x, picture.height - center.y);
    if (margin < 0.15 * Math.min(picture.width, picture.height)) warnings.push('center-near-edge');
  }
  if (drawing) {
    if (farFieldForDrawing(bench, drawing)?.holds === false) warnings.push('near-field-for-drawing');
    const extent = familyOf(drawing.aperture.family).extent(drawing.aperture.values);
    const period = pixelsPerFringe(
      extent,
      bench.wavelength.value,
      bench.distance.value,
      bench.pixelPitch.value,
    );
    if (period < pixelsPerFringeLimit) warnings.push('drawing-undersampled');
  }
  return warnings;
}
