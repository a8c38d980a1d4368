import { useEffect, useState } from 'react';
import { useTheme, type Theme } from '#src/lib/theme.ts';
import { colourMapOf } from '#src/ui/colour-maps.ts';

/** Gives a grey picture the colours of the theme. Null while it loads or when it cannot be read. */
export function useColouredPicture(url: string | null): HTMLCanvasElement | null {
  const theme = useTheme();
  const [picture, setPicture] = useState<{ url: string; theme: Theme; canvas: HTMLCanvasElement } | null>(
    null,
  );
  useEffect(() => {
    if (!url) return;
    let wanted = true;
    const image = new Image();
    image.onload = () => {
      const canvas = wanted ? colour(image, theme) : null;
      if (canvas) setPicture({ url, theme, canvas });
    };
    image.src = url;
    return () => {
      wanted = false;
    };
  }, [url, theme]);
  return picture && picture.url === url ? picture.canvas : null;
}

function colour(image: HTMLImageElement, theme: Theme): HTMLCanvasElement | null {
  const canvas = document.createElement('canvas');
  canvas.width = image.naturalWidth;
  canvas.height = image.naturalHeight;
  const context = canvas.getContext('2d', { willReadFrequently: true });
  if (!context) return null;
  context.drawImage(image, 0, 0);
  const pixels = context.getImageData(0, 0, canvas.width, canvas.height);
  const map = colourMapOf(theme);
  for (let i = 0; i < pixels.data.length; i += 4) {
    const code = 3 * pixels.data[i];
    pixels.data[i] = map[code]!;
    pixels.data[i + 1] = map[code + 1]!;
    pixels.data[i + 2] = map[code + 2]!;
  }
  context.putImageData(pixels, 0, 0);
  return canvas;
}
