import { useMemo } from 'react';
import { useTheme } from '#src/lib/theme.ts';
import { colourMap, colourMapOf } from '#src/ui/colour-maps.ts';
import type { Plane } from '#src/ui/pattern/counts.ts';
import { paintPlane, type Tone } from '#src/ui/pattern/tone.ts';

export type Colours = 'theme' | 'grey';

/** The flat colour of saturated pixels, read from the theme. */
function saturationColour(): [number, number, number] {
  const text = getComputedStyle(document.documentElement).getPropertyValue('--sat').trim();
  const n = Number.parseInt(text.replace('#', ''), 16);
  return Number.isNaN(n) ? [0, 255, 0] : [n >> 16, (n >> 8) & 255, n & 255];
}

/** A plane painted once at its own pixels; panning and zooming only copy it. */
export function usePainted(
  plane: Plane | null,
  tone: Tone | null,
  colours: Colours,
  isFlat?: (i: number) => boolean,
): HTMLCanvasElement | null {
  const theme = useTheme();
  return useMemo(() => {
    if (!plane || !tone) return null;
    const canvas = document.createElement('canvas');
    canvas.width = plane.width;
    canvas.height = plane.height;
    const context = canvas.getContext('2d');
    if (!context) return null;
    const image = context.createImageData(plane.width, plane.height);
    const map = colours === 'grey' ? colourMap('grey') : colourMapOf(theme);
    paintPlane(
      plane.counts,
      tone,
      map,
      image.data,
      isFlat ? { at: isFlat, colour: saturationColour() } : undefined,
    );
    context.putImageData(image, 0, 0);
    return canvas;
  }, [plane, tone, colours, theme, isFlat]);
}
