import { z } from 'zod';
import { endpoint } from '#shared/contracts/endpoint.ts';
import { personRefSchema } from '#shared/contracts/people.ts';
import {
  idParam,
  requiredLineSchema,
  lineSchema,
  timestampSchema,
  versionSchema,
} from '#shared/contracts/paging.ts';

const measured = (what: string, min: number, max: number, range: string) =>
  z
    .object({
      value: z
        .number(`Enter the ${what}.`)
        .min(min, `The ${what} must lie between ${range}.`)
        .max(max, `The ${what} must lie between ${range}.`),
      u: z.number('Enter its standard uncertainty.').min(0, 'A standard uncertainty is never negative.'),
    })
    .refine((q) => !(q.value >= min) || q.u < q.value / 2, {
      path: ['u'],
      message: `The standard uncertainty must stay below half of the ${what}.`,
    });

export const geometrySchema = z.enum(['sensor', 'screen', 'lens']);
export type BenchGeometry = z.infer<typeof geometrySchema>;

/**
 * The set-up values that an identification needs; metres. `sensor`: the sensor stands in the pattern; `screen`: a camera
 * photographs a screen, and the pixel pitch is the stated length on the screen per pixel; `lens`: focal plane, and the
 * distance is the focal length.
 */
export const benchValuesSchema = z.object({
  geometry: geometrySchema,
  wavelength: measured('wavelength', 150e-9, 15e-6, '150 nm and 15 000 nm'),
  distance: measured('distance', 1e-3, 1e3, '1 mm and 1 000 000 mm'),
  pixelPitch: measured('pixel pitch', 0.2e-6, 5e-3, '0.2 µm and 5 000 µm'),
  encoding: z.enum(['linear', 'srgb']),
  /** Bits that the camera delivers; 12 in a 16-bit file means left-aligned or right-aligned data, found from the file. */
  bitDepth: z.literal([8, 10, 12, 14, 16]),
  /** In codes of `bitDepth`; null where it is not known. */
  darkLevel: z.number().min(0, 'A dark level is never negative.').max(65535).nullable(),
  /** True where the camera sees the pattern reversed. */
  mirrored: z.boolean(),
});
export type BenchValues = z.infer<typeof benchValuesSchema>;

export const benchDraftSchema = benchValuesSchema
  .extend({ name: requiredLineSchema(80, 'a name for the bench'), note: lineSchema(300).default('') })
  .superRefine((bench, ctx) => {
    if (bench.darkLevel !== null && bench.darkLevel >= 2 ** bench.bitDepth)
      ctx.addIssue({
        code: 'custom',
        path: ['darkLevel'],
        message: `A ${bench.bitDepth}-bit camera has no code above ${2 ** bench.bitDepth - 1}.`,
      });
  });

export const benchSchema = benchValuesSchema.extend({
  id: z.uuid(),
  name: z.string(),
  note: z.string(),
  version: z.number().int(),
  createdAt: timestampSchema,
  createdBy: personRefSchema,
  can: z.object({ edit: z.boolean() }),
});
export type Bench = z.infer<typeof benchSchema>;

/** The bench as it was when an exposure was taken. */
export const benchCopySchema = benchValuesSchema.extend({
  benchId: z.uuid(),
  name: z.string(),
  version: z.number().int(),
});
export type BenchCopy = z.infer<typeof benchCopySchema>;

export const listBenches = endpoint({
  name: 'list-benches',
  method: 'GET',
  path: '/api/benches',
  access: 'read-benches',
  response: z.object({ benches: z.array(benchSchema), can: z.object({ add: z.boolean() }) }),
});

export const addBench = endpoint({
  name: 'add-bench',
  method: 'POST',
  path: '/api/benches',
  access: 'edit-benches',
  body: benchDraftSchema,
  response: benchSchema,
  status: 201,
});

export const editBench = endpoint({
  name: 'edit-bench',
  method: 'PUT',
  path: '/api/benches/:benchId',
  access: 'edit-benches',
  params: idParam('benchId'),
  body: benchDraftSchema.safeExtend({ version: versionSchema }),
  response: benchSchema,
});
