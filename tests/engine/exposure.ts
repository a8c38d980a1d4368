import type { Picture, Setup } from '#server/engine/outcome.ts';
import type { ApertureValues } from '#shared/apertures/family.ts';
import { familyOf } from '#shared/apertures/registry.ts';
import { simulatePattern } from '#shared/apertures/simulate.ts';
import { detect, type Detector } from '#shared/physics/detector.ts';
import { seededRandom } from '#shared/physics/random.ts';

/** A seeded exposure of a known opening; everything that is not given is an ordinary laboratory picture. */
export interface ExposureSpec {
  readonly family: string;
  readonly values: ApertureValues;
  readonly model?: string;
  readonly orientation?: number;
  readonly geometry?: Setup['geometry'];
  /** Period in pixels of the finest fringes; sets the distance. */
  readonly finestPeriod?: number;
  readonly width?: number;
  readonly height?: number;
  readonly center?: { readonly x: number; readonly y: number };
  /** 1 fills the well at the centre of the pattern; more saturates it. */
  readonly exposure?: number;
  readonly background?: number;
  readonly slopeX?: number;
  readonly blurVariance?: number;
  readonly bitDepth?: Detector['bitDepth'];
  readonly encoding?: Setup['encoding'];
  readonly fullWell?: number;
  readonly seed?: number;
}

const wavelength = 632.8e-9;
const pixelPitch = 5.2e-6;

export function exposureOf(spec: ExposureSpec): { picture: Picture; setup: Setup } {
  const family = familyOf(spec.family);
  const { width = 240, height = 200, bitDepth = 12, encoding = 'linear', geometry = 'lens' } = spec;
  const model = spec.model ? family.models.find((m) => m.id === spec.model)! : modelFor(spec);
  const extent = family.extent(spec.values);
  const distance = ((spec.finestPeriod ?? 12) * extent * pixelPitch) / wavelength;
  const keys = new Set(family.parameters.map((p) => p.key));
  // Nuisances: the beam is three openings wide.
  const values = model.fromFamily(spec.values).map((v, i) => (keys.has(model.keys[i]) ? v : 3 * extent));
  const pattern = simulatePattern(
    {
      model,
      values,
      orientation: spec.orientation ?? 0,
      geometry: { kind: geometry, wavelength, distance, pixelPitch },
      center: spec.center ?? { x: width / 2 + 3.3, y: height / 2 - 2.7 },
      amplitude: spec.exposure ?? 0.9,
      background: { offset: spec.background ?? 2e-3, slopeX: spec.slopeX ?? 0, slopeY: 0 },
      blurVariance: spec.blurVariance ?? 0,
    },
    { left: 0, top: 0, width, height, step: 1 },
  );
  const darkLevel = encoding === 'linear' ? Math.round(2 ** bitDepth / 64) : 0;
  const detector: Detector = {
    fullWell: spec.fullWell ?? 12_000,
    readNoise: 5,
    bitDepth,
    darkLevel,
    encoding,
  };
  const codes = detect(pattern, detector, seededRandom(spec.seed ?? 1));
  return {
    picture: { width, height, codes, fullScale: 2 ** bitDepth - 1, codeStep: 1, lossy: false },
    setup: {
      geometry,
      wavelength: { value: wavelength, u: 0.1e-9 },
      distance: { value: distance, u: distance * 1e-3 },
      pixelPitch: { value: pixelPitch, u: 5e-9 },
      encoding,
      darkLevel: encoding === 'linear' ? darkLevel : null,
      mirrored: false,
    },
  };
}

/** The model without nuisances where every value is given, the one with the beam where a length is left open. */
function modelFor({ family, values }: ExposureSpec) {
  const { models } = familyOf(family);
  const open = Object.values(values).includes(null);
  return open ? models[models.length - 1] : models[0];
}

/** A picture of one code everywhere, apart from the noise of `spread` codes. */
export function flatPicture(code: number, spread = 0, seed = 1): Picture {
  const random = seededRandom(seed);
  const codes = Uint16Array.from({ length: 200 * 160 }, () =>
    Math.round(Math.min(4095, Math.max(0, code + spread * (random() + random() + random() - 1.5) * 2))),
  );
  return { width: 200, height: 160, codes, fullScale: 4095, codeStep: 1, lossy: false };
}

/** Shortest turn between two directions of this period, radians. */
export function turnBetween(a: number, b: number, period: number): number {
  const d = (((a - b) % period) + period) % period;
  return Math.min(d, period - d);
}
