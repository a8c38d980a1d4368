import { useMemo } from 'react';
import { useTheme } from '#src/lib/theme.ts';
import { grouped } from '#shared/quantities.ts';
import { colourMap, colourMapOf } from '#src/ui/colour-maps.ts';
import type { Scale } from '#src/ui/pattern/tone.ts';
import type { Colours } from '#src/ui/pattern/use-painted.ts';

interface ColourBarProps {
  colours: Colours;
  /** Counts above background at both ends. */
  from: number;
  to: number;
  scale: Scale;
}

const scaleWords: Record<Scale, string> = { log: 'log', root: 'square root', linear: 'linear' };

/** The colours with the counts of their ends. */
export function ColourBar({ colours, from, to, scale }: ColourBarProps) {
  const theme = useTheme();
  const stops = useMemo(() => {
    const map = colours === 'grey' ? colourMap('grey') : colourMapOf(theme);
    return Array.from({ length: 33 }, (_, i) => {
      const k = 3 * Math.min(255, 8 * i);
      return `rgb(${map[k]} ${map[k + 1]} ${map[k + 2]})`;
    });
  }, [colours, theme]);
  const print = (counts: number) => grouped(counts < 10 ? counts.toPrecision(2) : counts.toFixed(0));
  return (
    <span className="label ml-auto text-ink2">
      <svg
        viewBox="0 0 33 3"
        preserveAspectRatio="none"
        width="132"
        height="10"
        aria-hidden="true"
        className="block"
      >
        {stops.map((colour, i) => (
          <rect key={i} x={i} width="1.05" height="3" fill={colour} />
        ))}
      </svg>
      {print(from)} counts, {scaleWords[scale]}, {print(to)}
    </span>
  );
}
