import { useEffect, useId, useRef } from 'react';
import { familyOf } from '#shared/apertures/registry.ts';
import type { Reference } from '#shared/contracts/references.ts';
import { useTheme, type Theme } from '#src/lib/theme.ts';
import { sketchText } from '#src/ui/aperture-sketch.tsx';
import { colourMapOf } from '#src/ui/colour-maps.ts';

interface ReferenceDiscProps {
  reference: Reference;
  /** Metres across the opening half; the same for all of a family. */
  span: number;
  size?: number;
}

const side = 168;
/** The seam's direction: 62° from the right, as drawn. */
const seam = 62;
/** Fringes reach to this many spacings of λ/extent. */
const spacings = 4.5;

/** An opening on one side of the seam, its computed far field on the other. */
export function ReferenceDisc({ reference, span, size = 84 }: ReferenceDiscProps) {
  const canvas = useRef<HTMLCanvasElement>(null);
  const clip = useId();
  const theme = useTheme();
  const { family: id, values } = reference.aperture;
  const family = familyOf(id);
  useEffect(() => {
    const context = canvas.current?.getContext('2d');
    if (context) paint(context, { family: id, values }, theme);
  }, [id, values, theme]);
  const d = family
    .outline(values, 4 * span)
    .map((ring) => 'M' + ring.map(([x, y]) => `${(100 * x) / span} ${(-100 * y) / span}`).join('L') + 'Z')
    .join('');
  return (
    <span
      role="img"
      aria-label={`${sketchText(id)}: opening and fringes`}
      className="relative block shrink-0"
      style={{ width: size, height: size }}
    >
      <canvas ref={canvas} width={side} height={side} className="absolute inset-0 size-full" />
      <svg viewBox="-50 -50 100 100" className="absolute inset-0 size-full" aria-hidden="true">
        <clipPath id={clip}>
          <path d="M-49 0A49 49 0 0 1 49 0z" transform={`rotate(${-seam})`} />
        </clipPath>
        <g clipPath={`url(#${clip})`}>
          <circle r="49" fill="var(--plate)" />
          <path d={d} fill="var(--open)" fillRule="evenodd" />
        </g>
        <circle
          r="49"
          fill="none"
          stroke="var(--edge)"
          strokeDasharray={reference.state === 'draft' ? '3 4' : undefined}
        />
        <path d="M-49 0H49" transform={`rotate(${-seam})`} stroke="var(--over)" strokeWidth="1.4" />
        {reference.state === 'retired' ? (
          <path d="M-48-48 48 48" stroke="var(--bad)" strokeWidth="3" />
        ) : null}
      </svg>
    </span>
  );
}

function paint(context: CanvasRenderingContext2D, aperture: Reference['aperture'], theme: Theme): void {
  const family = familyOf(aperture.family);
  const open = family.parameters.some(
    (p) => aperture.values[p.key] === null || aperture.values[p.key] === undefined,
  );
  const model = (open ? family.models.at(-1) : undefined) ?? family.models[0];
  const sizes = new Set(family.parameters.map((p) => p.key));
  // What is no size of the opening is the beam on it: drawn a few openings wide, so that the fringes have a height.
  const fitted = model
    .fromFamily(aperture.values)
    .map((value, i) => (sizes.has(model.keys[i]) ? value : 3 * family.extent(aperture.values)));
  const step = (2 * spacings) / family.extent(aperture.values) / side;
  const [u, v, row] = [new Float64Array(side), new Float64Array(side), new Float64Array(side)];
  const map = colourMapOf(theme);
  const image = context.createImageData(side, side);
  const c = (side - 1) / 2;
  const [nx, ny] = [Math.sin((seam * Math.PI) / 180), Math.cos((seam * Math.PI) / 180)];
  for (let y = 0; y < side; y++) {
    for (let x = 0; x < side; x++) {
      u[x] = (x - c) * step;
      v[x] = (c - y) * step;
    }
    model.intensity(fitted, u, v, row, side);
    for (let x = 0; x < side; x++) {
      const right = (x - c) * nx + (y - c) * ny > 0;
      if (!right || Math.hypot(x - c, y - c) > c) continue;
      const code = 3 * Math.round(255 * Math.min(1, Math.max(0, 1 + Math.log10(row[x] + 1e-9) / 3.6)));
      image.data.set([map[code], map[code + 1], map[code + 2], 255], 4 * (y * side + x));
    }
  }
  context.putImageData(image, 0, 0);
}
