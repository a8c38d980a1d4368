import { Measured } from '#src/ui/measured.tsx';
import type { BenchValues } from '#shared/contracts/benches.ts';

export const geometryWords = {
  sensor: 'sensor in the pattern',
  screen: 'camera photographs a screen',
  lens: 'focal plane of a lens',
} as const;

/** The values of a set-up in one line; U with k = 2. */
export function BenchLine({ bench }: { bench: BenchValues }) {
  return (
    <span>
      <Measured {...bench.wavelength} unit="nm" />, {bench.geometry === 'lens' ? 'f\u00a0=\u00a0' : ''}
      <Measured {...bench.distance} unit="mm" />, <Measured {...bench.pixelPitch} unit="um" /> per pixel,{' '}
      {geometryWords[bench.geometry]}, {bench.bitDepth} bit {bench.encoding === 'srgb' ? 'sRGB' : 'linear'}
      {bench.mirrored ? ', seen mirrored' : ''}
      <span className="text-ink3"> (U, k = 2)</span>
    </span>
  );
}
