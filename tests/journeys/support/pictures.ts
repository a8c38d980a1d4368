import { decode } from 'fast-png';
import { demoBenches } from '#server/demo/demo-benches.ts';
import { demoPicture, type DemoExposure } from '#server/demo/demo-picture.ts';
import { pngFile } from '#tests/support/png-files.ts';
import { tiffFile } from '#tests/support/tiff-files.ts';

/** A rectangle of 300 by 140 µm at 35°, as the lens bench of the demo laboratory would photograph it. */
function exposure(seed: number): DemoExposure {
  return {
    opening: { family: 'rectangle', values: { length: 300e-6, width: 140e-6 } },
    orientation: (35 * Math.PI) / 180,
    width: 460,
    height: 400,
    center: { x: 233.2, y: 196.7 },
    peak: 0.9,
    seed,
  };
}

/** The same opening three times: PNG of 8 bits, PNG of 16 bits, TIFF of 16 bits. */
export function threePictures(): { name: string; mimeType: string; buffer: Buffer }[] {
  const wide = (seed: number) => decode(demoPicture(exposure(seed), demoBenches.lens));
  const first = wide(201);
  const eight = Uint8Array.from(first.data, (code) => code >> 8);
  const third = wide(203);
  return [
    {
      name: 'window-8.png',
      mimeType: 'image/png',
      buffer: pngFile({ width: first.width, height: first.height, data: eight }),
    },
    {
      name: 'window-16.png',
      mimeType: 'image/png',
      buffer: Buffer.from(demoPicture(exposure(202), demoBenches.lens)),
    },
    {
      name: 'window-16.tif',
      mimeType: 'image/tiff',
      buffer: tiffFile({ width: third.width, height: third.height, data: Uint16Array.from(third.data) }),
    },
  ];
}
