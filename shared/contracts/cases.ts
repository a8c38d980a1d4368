import { z } from 'zod';
import { apertureSchema } from '#shared/contracts/apertures.ts';
import { endpoint } from '#shared/contracts/endpoint.ts';
import { exposureSchema } from '#shared/contracts/exposures.ts';
import { candidateSchema } from '#shared/contracts/identifications.ts';
import { matchSchema } from '#shared/contracts/matches.ts';
import {
  idParam,
  lineSchema,
  pageOf,
  pageQuery,
  requiredLineSchema,
  textSchema,
  timestampSchema,
  versionSchema,
} from '#shared/contracts/paging.ts';
import { personRefSchema } from '#shared/contracts/people.ts';

export const caseStateSchema = z.enum(['open', 'in-review', 'closed']);
export type CaseState = z.infer<typeof caseStateSchema>;

/** Where the work of a case stands, from its newest exposure in use, its newest identification and its newest match. */
export const caseStageSchema = z.enum([
  'no-exposure',
  'running',
  'failed',
  'identified',
  'ambiguous',
  'unidentified',
  'in-review',
  'returned',
  'rejected',
  'confirmed',
]);
export type CaseStage = z.infer<typeof caseStageSchema>;

/** What the drawing says: nominal sizes and, per size, the lower and upper limit; metres. */
export const drawingSchema = z
  .object({
    aperture: apertureSchema,
    limits: z.record(z.string(), z.object({ lower: z.number().positive(), upper: z.number().positive() })),
  })
  .superRefine((drawing, ctx) => {
    for (const [key, limit] of Object.entries(drawing.limits)) {
      const nominal = drawing.aperture.values[key];
      if (nominal === undefined || nominal === null)
        ctx.addIssue({ code: 'custom', path: ['limits', key], message: 'Limits need a nominal size.' });
      else if (!(limit.lower <= nominal && nominal <= limit.upper))
        ctx.addIssue({
          code: 'custom',
          path: ['limits', key],
          message: 'The nominal size must lie between the lower and the upper limit.',
        });
    }
  });
export type Drawing = z.infer<typeof drawingSchema>;

export const caseDraftSchema = z.object({
  title: requiredLineSchema(120, 'a title'),
  part: requiredLineSchema(120, 'the part'),
  lot: lineSchema(80).default(''),
  specimen: lineSchema(80).default(''),
  question: textSchema(1000).default(''),
  drawing: drawingSchema.nullable().default(null),
});

const caseBase = caseDraftSchema.extend({
  id: z.uuid(),
  number: z.string(),
  state: caseStateSchema,
  stage: caseStageSchema,
  version: z.number().int(),
  createdBy: personRefSchema,
  createdAt: timestampSchema,
  updatedAt: timestampSchema,
});

export const caseRowSchema = caseBase.extend({
  exposureCount: z.number().int(),
  /** The exposure that the stage speaks of. */
  exposureId: z.uuid().nullable(),
  progress: z.object({ share: z.number(), step: z.string() }).nullable(),
  /** Best candidates: one when identified, the ones that cannot be told apart (at most three) when ambiguous. */
  leading: z.array(candidateSchema),
  /** The newest match's decision, when it came back. */
  cameBack: z.object({ by: personRefSchema, at: timestampSchema, reason: z.string() }).nullable(),
  matchId: z.uuid().nullable(),
  /** True when the reader is the one who has the next deed. */
  waitsForYou: z.boolean(),
});
export type CaseRow = z.infer<typeof caseRowSchema>;

export const caseSchema = caseBase.extend({
  exposures: z.array(exposureSchema),
  matches: z.array(matchSchema),
  can: z.object({ edit: z.boolean(), upload: z.boolean(), reopen: z.boolean() }),
});
export type Case = z.infer<typeof caseSchema>;

export const listCases = endpoint({
  name: 'list-cases',
  method: 'GET',
  path: '/api/cases',
  access: 'read-cases',
  query: z.object({
    ...pageQuery,
    /** Searches number, title, part, lot and specimen. */
    q: z.string().trim().max(100).optional(),
    state: caseStateSchema.optional(),
  }),
  response: pageOf(caseRowSchema),
});

export const openCase = endpoint({
  name: 'open-case',
  method: 'POST',
  path: '/api/cases',
  access: 'edit-cases',
  body: caseDraftSchema,
  response: caseSchema,
  status: 201,
});

export const getCase = endpoint({
  name: 'get-case',
  method: 'GET',
  path: '/api/cases/:caseId',
  access: 'read-cases',
  params: idParam('caseId'),
  response: caseSchema,
});

export const editCase = endpoint({
  name: 'edit-case',
  method: 'PUT',
  path: '/api/cases/:caseId',
  access: 'edit-cases',
  params: idParam('caseId'),
  body: caseDraftSchema.extend({ version: versionSchema }),
  response: caseSchema,
});

export const reopenCase = endpoint({
  name: 'reopen-case',
  method: 'POST',
  path: '/api/cases/:caseId/reopen',
  access: 'edit-cases',
  params: idParam('caseId'),
  body: z.object({ reason: requiredLineSchema(300, 'the reason') }),
  response: caseSchema,
});
