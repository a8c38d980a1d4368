import { z } from 'zod';
import { apertureSchema } from '#shared/contracts/apertures.ts';
import { endpoint } from '#shared/contracts/endpoint.ts';
import { pageOf, pageQuery, timestampSchema } from '#shared/contracts/paging.ts';
import { personRefSchema } from '#shared/contracts/people.ts';

export const referenceStateSchema = z.enum(['draft', 'approved', 'retired']);

export const referenceSchema = z.object({
  id: z.uuid(),
  number: z.string(),
  name: z.string(),
  /** Where the entry comes from. */
  origin: z.enum(['designed', 'drawn', 'measured']),
  aperture: apertureSchema,
  note: z.string(),
  state: referenceStateSchema,
  version: z.number().int(),
  approvedBy: personRefSchema.nullable(),
  approvedAt: timestampSchema.nullable(),
});
export type Reference = z.infer<typeof referenceSchema>;

export const listReferences = endpoint({
  name: 'list-references',
  method: 'GET',
  path: '/api/references',
  access: 'read-references',
  query: z.object({ ...pageQuery, family: z.string().max(40).optional() }),
  response: pageOf(referenceSchema),
});

/** One file of `reference-patterns`: a designed opening in SI units. */
export const referencePatternSchema = z.object({
  number: z.string().regex(/^[A-Z]{2}-\d{3}$/),
  name: z.string().min(1).max(120),
  aperture: apertureSchema,
  note: z.string().max(300),
});
