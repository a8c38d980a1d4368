import { familyOf } from '#shared/apertures/registry.ts';
import type { ApertureValues } from '#shared/apertures/family.ts';

interface ApertureSketchProps {
  family: string;
  /** Metres; null where not resolved. */
  values: ApertureValues;
  /** Radians counter-clockwise. */
  orientation?: number | null;
  /** Side in CSS pixels. */
  size?: number;
  /** Metres across the drawing: give the same to several sketches to draw them at a common scale. */
  span?: number;
}

/** "Slot, long axis 27°" */
export function sketchText(family: string, orientation?: number | null): string {
  const { label, axis } = familyOf(family);
  if (!axis || orientation === null || orientation === undefined) return label;
  return `${label}, ${axis} ${Math.round((orientation * 180) / Math.PI)}°`;
}

/** The opening from its family's outline: light is open, dark is opaque, turned as displayed. */
export function ApertureSketch({ family, values, orientation, size = 34, span }: ApertureSketchProps) {
  const shape = familyOf(family);
  const across = span ?? 1.45 * shape.extent(values);
  const d = shape
    .outline(values, 3 * across)
    .map(
      (ring) =>
        'M' +
        ring
          .map(([x, y]) => `${((100 * x) / across).toFixed(2)} ${((-100 * y) / across).toFixed(2)}`)
          .join('L') +
        'Z',
    )
    .join('');
  const turn = orientation === null || orientation === undefined ? 0 : (-orientation * 180) / Math.PI;
  return (
    <svg
      role="img"
      aria-label={sketchText(family, orientation)}
      viewBox="-50 -50 100 100"
      width={size}
      height={size}
      className="shrink-0"
    >
      <rect
        x="-50"
        y="-50"
        width="100"
        height="100"
        fill="var(--plate)"
        stroke="var(--edge)"
        strokeWidth="2"
      />
      <path d={d} transform={`rotate(${turn.toFixed(2)})`} fill="var(--open)" fillRule="evenodd" />
    </svg>
  );
}
