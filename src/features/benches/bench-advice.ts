import type { BenchGeometry } from '#shared/contracts/benches.ts';
import { farFieldDistance, pixelsPerFringe, pixelsPerFringeLimit } from '#shared/physics/sampling.ts';
import { printQuantity } from '#shared/quantities.ts';

export interface TypedBench {
  geometry: BenchGeometry;
  wavelength: number | null;
  distance: number | null;
  pixelPitch: number | null;
  /** Largest extent of the openings that are expected here, a help for this form alone; metres. */
  expected: number | null;
}

interface Advice {
  lead: string;
  rest: string;
}

/** Values outside these are seldom meant: they usually come from a slip of the unit. Common practice, no source. */
const usual = {
  wavelength: [300e-9, 2e-6],
  distance: [20e-3, 20],
  pitch: { sensor: [1e-6, 30e-6], lens: [1e-6, 30e-6], screen: [5e-6, 2e-3] },
} as const;

const outside = (value: number, range: readonly [number, number] | readonly number[]) =>
  value < range[0] || value > range[1];

export function wavelengthAdvice({ wavelength }: TypedBench): Advice | null {
  if (!wavelength || !(wavelength > 0) || !outside(wavelength, usual.wavelength)) return null;
  return {
    lead: `${printQuantity(wavelength, 'nm')} is unusual for a laser of this work.`,
    rest: 'Every size scales with it. Check the unit: visible lasers lie between 400 and 700 nm.',
  };
}

/** Near field for the opening that is expected; or a distance that looks like a slip of the unit. */
export function distanceAdvice(bench: TypedBench): Advice | null {
  const { distance, wavelength, expected, geometry } = bench;
  if (!distance || !(distance > 0)) return null;
  if (outside(distance, usual.distance))
    return {
      lead: `${printQuantity(distance, 'mm')} is implausible here.`,
      rest: `An opening would come out ${distance < 0.1 ? 'far too small' : 'far too large'}. Was it ${distance < 0.1 ? 'metres' : 'micrometres'}? Type millimetres: 1 m is 1000 mm.`,
    };
  if (geometry === 'lens' || !expected || !wavelength || !(expected > 0) || !(wavelength > 0)) return null;
  const needed = farFieldDistance(expected, wavelength);
  if (distance >= needed) return null;
  return {
    lead: `Near field for openings of ${printQuantity(expected, 'um')}.`,
    rest: `The far field begins at ${printQuantity(needed, 'mm', 3)}. Move the sensor back or use a lens; sizes over ${printQuantity(expected * Math.sqrt(distance / needed), 'um', 3)} can’t be trusted here.`,
  };
}

export function pitchAdvice(bench: TypedBench): Advice | null {
  const { pixelPitch, distance, wavelength, expected, geometry } = bench;
  if (!pixelPitch || !(pixelPitch > 0)) return null;
  if (outside(pixelPitch, usual.pitch[geometry]))
    return {
      lead: `${printQuantity(pixelPitch, 'um')} per pixel is implausible here.`,
      rest:
        geometry === 'screen'
          ? 'Give the length on the screen that one pixel covers.'
          : 'Sensor pixels are 1 to 30 µm wide. Check the data sheet of the camera.',
    };
  if (!expected || !wavelength || !distance || !(expected > 0 && wavelength > 0 && distance > 0)) return null;
  const fringe = pixelsPerFringe(expected, wavelength, distance, pixelPitch);
  if (fringe >= pixelsPerFringeLimit) return null;
  return {
    lead: `Fringes of ${fringe.toFixed(1)} pixels.`,
    rest: `At least ${pixelsPerFringeLimit} are needed for openings of ${printQuantity(expected, 'um')}. Go farther back or take finer pixels.`,
  };
}
