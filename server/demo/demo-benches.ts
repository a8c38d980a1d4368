import type { BenchValues } from '#shared/contracts/benches.ts';

const idOf = (n: number) => `00000000-0000-4000-8000-0000000002${String(n).padStart(2, '0')}`;

export interface DemoBench extends BenchValues {
  readonly id: string;
  readonly name: string;
  readonly note: string;
}

export const demoBenches = {
  sensor: {
    id: idOf(1),
    name: 'Bench 1, bare sensor',
    note: 'Red helium-neon laser, class 2. Sensor without window stands in the pattern, 5.5 µm pixels binned 2 × 2.',
    geometry: 'sensor',
    wavelength: { value: 632.8e-9, u: 0.02e-9 },
    distance: { value: 0.25, u: 0.0002 },
    pixelPitch: { value: 11e-6, u: 0.005e-6 },
    encoding: 'linear',
    bitDepth: 12,
    darkLevel: 64,
    mirrored: false,
  },
  lens: {
    id: idOf(2),
    name: 'Bench 2, 100 mm lens',
    note: 'Green laser diode, class 2. Sensor in the focal plane, 3.45 µm pixels binned 2 × 2.',
    geometry: 'lens',
    wavelength: { value: 520.4e-9, u: 0.3e-9 },
    distance: { value: 0.1, u: 0.0001 },
    pixelPitch: { value: 6.9e-6, u: 0.003e-6 },
    encoding: 'linear',
    bitDepth: 12,
    darkLevel: 40,
    mirrored: false,
  },
  screen: {
    id: idOf(3),
    name: 'Bench 3, paper screen',
    note: 'Camera photographs a white screen; scale from a steel rule at the screen.',
    geometry: 'screen',
    wavelength: { value: 632.8e-9, u: 0.02e-9 },
    distance: { value: 3.2, u: 0.004 },
    pixelPitch: { value: 80e-6, u: 0.3e-6 },
    encoding: 'srgb',
    bitDepth: 8,
    darkLevel: null,
    mirrored: true,
  },
} as const satisfies Record<string, DemoBench>;
