import { useMemo } from 'react';
import { printQuantity } from '#shared/quantities.ts';
import { profileAlong } from '#src/features/identifications/profile.ts';
import type { Plane } from '#src/ui/pattern/counts.ts';

interface ProfilePlotProps {
  title: string;
  measured: Plane;
  model: Plane | null;
  center: { x: number; y: number };
  /** Radians counter-clockwise as displayed. */
  angle: number;
  /** Counts of the background, and of the noise where the logarithm ends. */
  black: number;
  noise: number;
  /** Metres at the pattern per pixel. */
  pixelPitch: number;
}

const width = 560;
const height = 150;
const left = 34;
const bottom = 18;

/** Measured dots and the model's line through the centre, on a logarithmic scale. */
export function ProfilePlot(props: ProfilePlotProps) {
  const { title, measured, model, center, angle, black, noise, pixelPitch } = props;
  const drawn = useMemo(() => {
    const reach = Math.max(
      ...[0, measured.width].map((x) => Math.abs(x - center.x)),
      ...[0, measured.height].map((y) => Math.abs(y - center.y)),
    );
    const data = profileAlong(measured, center, angle, reach);
    const line = model ? profileAlong(model, center, angle, reach) : null;
    const inside = [...data.counts].map((c, i) => (Number.isNaN(c) ? -1 : i)).filter((i) => i >= 0);
    const from = data.at[inside[0] ?? 0];
    const to = data.at[inside[inside.length - 1] ?? 0];
    const top = Math.max(1, ...inside.map((i) => data.counts[i] - black));
    const low = Math.max(noise / 3, top * 1e-5);
    const x = (s: number) => left + ((s - from) / Math.max(to - from, 1)) * (width - left - 4);
    const y = (counts: number) => {
      const share = Math.log(Math.max(counts - black, low) / low) / Math.log(top / low);
      return 6 + (1 - share) * (height - bottom - 8);
    };
    const dots = inside
      .filter((_, k) => k % Math.max(1, Math.floor(inside.length / 420)) === 0)
      .map((i) => `M${x(data.at[i]).toFixed(1)} ${y(data.counts[i]).toFixed(1)}h0`)
      .join('');
    const path = line
      ? inside
          .map((i, k) => `${k === 0 ? 'M' : 'L'}${x(line.at[i]).toFixed(1)} ${y(line.counts[i]).toFixed(1)}`)
          .join('')
      : '';
    const decades = Array.from({ length: 12 }, (_, k) => 10 ** (k - 2)).filter((d) => d >= low && d <= top);
    return { dots, path, decades, y: (d: number) => y(d + black), x, from, to };
  }, [measured, model, center, angle, black, noise]);
  const millimetres = ticks(drawn.from * pixelPitch, drawn.to * pixelPitch);
  return (
    <figure className="min-w-0">
      <figcaption className="flex items-baseline justify-between gap-3">
        <span className="font-[750]">{title}</span>
        <span className="label text-ink3">dots measured, line model</span>
      </figcaption>
      <svg
        viewBox={`0 0 ${width} ${height}`}
        role="img"
        aria-label={`${title}: measured and model counts, logarithmic`}
        className="w-full"
      >
        {drawn.decades.map((d) => (
          <g key={d}>
            <path d={`M${left} ${drawn.y(d)}H${width - 4}`} stroke="var(--rule)" />
            <text x={left - 5} y={drawn.y(d) + 4} textAnchor="end" className="axis" fill="var(--ink3)">
              {d >= 1000 ? `10${superscript(Math.round(Math.log10(d)))}` : d}
            </text>
          </g>
        ))}
        {millimetres.map((m) => (
          <text
            key={m}
            x={drawn.x(m / pixelPitch)}
            y={height - 4}
            textAnchor="middle"
            className="axis"
            fill="var(--ink3)"
          >
            {printQuantity(m, 'mm', 3)
              .replace('mm', m === millimetres[millimetres.length - 1] ? 'mm' : '')
              .trim()}
          </text>
        ))}
        <path d={drawn.dots} stroke="var(--ink)" strokeWidth="2.2" strokeLinecap="round" />
        <path d={drawn.path} fill="none" stroke="var(--model)" strokeWidth="1.5" />
      </svg>
    </figure>
  );
}

const superscripts = '\u2070\u00b9\u00b2\u00b3\u2074\u2075\u2076\u2077\u2078\u2079';
function superscript(n: number): string {
  return [...String(n)].map((digit) => superscripts[Number(digit)]).join('');
}

/** Round metres inside a range, about seven of them. */
function ticks(from: number, to: number): number[] {
  const raw = (to - from) / 7;
  const decade = 10 ** Math.floor(Math.log10(raw));
  const step = [1, 2, 5, 10].map((s) => s * decade).find((s) => s >= raw) ?? raw;
  const out: number[] = [];
  for (let k = Math.ceil(from / step); k * step <= to; k++) out.push(Number((k * step).toPrecision(12)));
  return out;
}
