import { encode } from 'fast-png';
import type { Aperture, FarFieldModel } from '#shared/apertures/family.ts';
import { familyOf } from '#shared/apertures/registry.ts';
import { simulatePattern } from '#shared/apertures/simulate.ts';
import type { BenchValues } from '#shared/contracts/benches.ts';
import { detect } from '#shared/physics/detector.ts';
import { seededRandom } from '#shared/physics/random.ts';

export interface DemoExposure {
  /** A member of a family, or any far field with its values (a beam's extent, a shape outside the catalogue). */
  readonly opening: Aperture | { readonly model: FarFieldModel; readonly values: readonly number[] };
  /** Radians. */
  readonly orientation: number;
  readonly width: number;
  readonly height: number;
  readonly center: { readonly x: number; readonly y: number };
  /** Peak as a share of full scale; above 1 the core saturates. */
  readonly peak: number;
  readonly seed: number;
}

/** A photograph as the bench's camera would have taken it, as a PNG of its true depth (12 bits left-aligned in 16). */
export function demoPicture(exposure: DemoExposure, bench: BenchValues): Uint8Array {
  const expected = simulatePattern(
    {
      ...farFieldOf(exposure.opening),
      orientation: exposure.orientation,
      geometry: {
        kind: bench.geometry,
        wavelength: bench.wavelength.value,
        distance: bench.distance.value,
        pixelPitch: bench.pixelPitch.value,
      },
      center: exposure.center,
      amplitude: exposure.peak,
      background: { offset: 0.002, slopeX: 1e-6, slopeY: -1.5e-6 },
      blurVariance: 0.05,
    },
    { left: 0, top: 0, width: exposure.width, height: exposure.height, step: 1 },
  );
  const codes = detect(
    expected,
    {
      fullWell: 12_000,
      readNoise: 5,
      bitDepth: bench.bitDepth,
      darkLevel: bench.darkLevel ?? 0,
      encoding: bench.encoding,
    },
    seededRandom(exposure.seed),
  );
  const { width, height } = exposure;
  if (bench.bitDepth === 8)
    return encode({ width, height, data: Uint8Array.from(codes), channels: 1, depth: 8 });
  const shift = 16 - bench.bitDepth;
  return encode({ width, height, data: codes.map((code) => code << shift), channels: 1, depth: 16 });
}

function farFieldOf(opening: DemoExposure['opening']) {
  if ('model' in opening) return opening;
  const [model] = familyOf(opening.family).models;
  return { model, values: model.fromFamily(opening.values) };
}
