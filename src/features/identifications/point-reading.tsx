import { spatialFrequency } from '#shared/physics/geometry.ts';
import type { Exposure } from '#shared/contracts/exposures.ts';
import { grouped } from '#shared/quantities.ts';
import type { Plane } from '#src/ui/pattern/counts.ts';

interface PointReadingProps {
  exposure: Exposure;
  measured: Plane;
  model: Plane | null;
  center: { x: number; y: number } | null;
  point: { x: number; y: number } | null;
}

/** What stands under the pointer: place, counts, angle and spatial frequency. */
export function PointReading({ exposure, measured, model, center, point }: PointReadingProps) {
  const inside =
    point &&
    point.x > -0.5 &&
    point.y > -0.5 &&
    point.x < measured.width - 0.5 &&
    point.y < measured.height - 0.5;
  if (!point || !inside)
    return (
      <p className="label min-h-8 text-ink3">
        Point at the pattern to read place, counts, angle and spatial frequency.
      </p>
    );
  const k = Math.round(point.y) * measured.width + Math.round(point.x);
  const { bench } = exposure;
  const f = center
    ? spatialFrequency(
        {
          kind: bench.geometry,
          wavelength: bench.wavelength.value,
          distance: bench.distance.value,
          pixelPitch: bench.pixelPitch.value,
        },
        point.x - center.x,
        point.y - center.y,
      )
    : null;
  const q = f ? Math.hypot(f.fx, f.fy) : null;
  const angle = q === null ? null : Math.asin(Math.min(1, q * bench.wavelength.value));
  return (
    <p className="label min-h-8 text-ink2">
      {point.x.toFixed(1)}, {point.y.toFixed(1)} px; measured {grouped(measured.counts[k].toFixed(0))}
      {model ? `, model ${grouped(model.counts[k].toFixed(0))}` : ''} counts
      {angle !== null && q !== null
        ? `; ${(angle * 1e3).toPrecision(4)} mrad from the axis, ${(q * 1e-6).toPrecision(3)} per µm`
        : ''}
    </p>
  );
}
