import { z } from 'zod';
import { benchValuesSchema, type BenchValues } from '#shared/contracts/benches.ts';
import { toSi, type Unit } from '#shared/quantities.ts';

/** A picture to identify: a line of a cases file. */
export interface Case {
  readonly id: string;
  /** Relative to the cases file. */
  readonly file: string;
  readonly bench: BenchValues;
}

const setupSchema = z.object({
  geometry: z.enum(['sensor', 'screen', 'lens']),
  wavelengthNm: z.number(),
  wavelengthUNm: z.number().default(0),
  distanceMm: z.number(),
  distanceUMm: z.number().default(0),
  pixelPitchUm: z.number(),
  pixelPitchUUm: z.number().default(0),
});

/** `encoding`, `bitDepth` and `darkLevel` may stand beside the set-up or in it. */
const cameraSchema = z.object({
  encoding: z.enum(['linear', 'srgb']).default('linear'),
  bitDepth: z.number().default(8),
  darkLevel: z.number().nullable().default(null),
  mirrored: z.boolean().default(false),
});

const lineSchema = z.object({
  id: z.string().min(1),
  file: z.string().min(1),
  setup: setupSchema.loose(),
});

/** The name a line goes by in the answers, even where the rest of it cannot be read. */
export function idOfLine(line: string, number: number): string {
  try {
    const { id } = z.object({ id: z.string().min(1) }).parse(JSON.parse(line));
    return id;
  } catch {
    return `line-${number}`;
  }
}

/** Reads one line. Throws an Error whose message names every fault. */
export function parseCaseLine(line: string): Case {
  let json: unknown;
  try {
    json = JSON.parse(line);
  } catch {
    throw new Error('The line is no JSON.');
  }
  const { id, file, setup } = checked(lineSchema, json);
  const camera = checked(cameraSchema, { ...setup, ...(json as object) });
  const quantity = (value: number, u: number, unit: Unit) => ({ value: toSi(value, unit), u: toSi(u, unit) });
  const bench = checked(benchValuesSchema, {
    geometry: setup.geometry,
    wavelength: quantity(setup.wavelengthNm, setup.wavelengthUNm, 'nm'),
    distance: quantity(setup.distanceMm, setup.distanceUMm, 'mm'),
    pixelPitch: quantity(setup.pixelPitchUm, setup.pixelPitchUUm, 'um'),
    ...camera,
  });
  return { id, file, bench };
}

function checked<T>(schema: z.ZodType<T>, value: unknown): T {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  throw new Error(
    parsed.error.issues.map((issue) => `${issue.path.join('.') || 'line'}: ${issue.message}`).join('; '),
  );
}
