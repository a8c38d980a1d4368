import { farFieldDistance } from '#shared/physics/sampling.ts';
import { printQuantity } from '#shared/quantities.ts';

interface FarFieldLineProps {
  wavelength: number | null;
  distance: number | null;
  expected: number | null;
}

/** A log axis of distance with the near and far field of the expected opening, and the distance that was typed. */
export function FarFieldLine({ wavelength, distance, expected }: FarFieldLineProps) {
  if (!wavelength || !expected || !(wavelength > 0) || !(expected > 0)) return null;
  const needed = farFieldDistance(expected, wavelength);
  const from = Math.floor(Math.log10(needed) - 1.2);
  const to = from + 3;
  const x = (metres: number) => 400 * Math.min(1, Math.max(0, (Math.log10(metres) - from) / (to - from)));
  const limit = x(needed);
  const placed = distance && distance > 0 ? x(distance) : null;
  return (
    <figure className="mt-2">
      <svg viewBox="0 0 400 34" className="block w-full" aria-hidden="true">
        <rect x="0" y="6" width={limit} height="10" fill="var(--bad-wash)" />
        <rect x={limit} y="6" width={400 - limit} height="10" fill="var(--ok-wash)" />
        <path d="M0 16h400" stroke="var(--edge)" />
        {Array.from({ length: to - from + 1 }, (_, i) => {
          const at = (400 * i) / (to - from);
          return (
            <g key={i}>
              <path d={`M${at} 12v8`} stroke="var(--edge)" />
              <text
                x={at}
                y="31"
                fontSize="11"
                fill="var(--ink3)"
                textAnchor={i === 0 ? 'start' : i === to - from ? 'end' : 'middle'}
              >
                {printQuantity(10 ** (from + i), 'mm')}
              </text>
            </g>
          );
        })}
        {placed === null ? null : <path d={`M${placed} 1v20`} stroke="var(--seam)" strokeWidth="3" />}
      </svg>
      <figcaption className="label text-ink3">
        Far field for openings up to {printQuantity(expected, 'um')}: from {printQuantity(needed, 'mm', 3)} on
        (Fresnel number below 0.1).
      </figcaption>
    </figure>
  );
}
