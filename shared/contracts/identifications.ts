import { z } from 'zod';
import { endpoint } from '#shared/contracts/endpoint.ts';
import { idParam, timestampSchema } from '#shared/contracts/paging.ts';
import { personRefSchema } from '#shared/contracts/people.ts';
import { problemSchema } from '#shared/problems.ts';

export const verdictSchema = z.enum(['identified', 'ambiguous', 'unidentified']);

export const candidateSchema = z.object({
  family: z.string(),
  model: z.string(),
  /** Metres (counts as they are); null where the picture does not resolve the value. */
  values: z.record(z.string(), z.number().nullable()),
  dimensions: z.record(
    z.string(),
    z.object({
      value: z.number().nullable(),
      uImage: z.number(),
      uSetup: z.number(),
      u: z.number(),
      bound: z.enum(['at-least', 'at-most']).nullable(),
    }),
  ),
  /** Radians counter-clockwise as displayed. */
  orientation: z.object({ value: z.number(), u: z.number() }).nullable(),
  orientationPeriod: z.number().nullable(),
  probability: z.number().min(0).max(1),
  reducedChiSquare: z.number(),
  fit: z.object({
    values: z.array(z.number()),
    center: z.object({ x: z.number(), y: z.number() }),
    amplitude: z.number(),
    background: z.object({ offset: z.number(), slopeX: z.number(), slopeY: z.number() }),
    blurVariance: z.number(),
  }),
});
export type Candidate = z.infer<typeof candidateSchema>;

export const untoldSchema = z.enum([
  'half-turn-twin',
  'complement',
  'scale',
  'place',
  'unresolved-length',
  'bounded-dimension',
  'near-field',
  'undersampled',
  'unknown-response',
]);
export type Untold = z.infer<typeof untoldSchema>;

export const unusableReasonSchema = z.enum([
  'no-contrast',
  'all-dark',
  'all-saturated',
  'mostly-saturated',
  'no-center',
  'too-few-pixels',
  'fringes-undersampled',
  'no-minimum-in-frame',
]);
export type UnusableReason = z.infer<typeof unusableReasonSchema>;

export const pictureFactsSchema = z.object({
  saturatedShare: z.number(),
  maskedShare: z.number(),
  /** Pixels, x right and y down from the centre of the top-left pixel. */
  center: z.object({ x: z.number(), y: z.number(), u: z.number() }).nullable(),
  noise: z.object({ a: z.number(), b: z.number(), c: z.number() }).nullable(),
});
export type PictureFacts = z.infer<typeof pictureFactsSchema>;

export const farFieldSchema = z.object({
  holds: z.boolean(),
  fresnelNumber: z.number().nullable(),
  distanceNeeded: z.number().nullable(),
});
export type FarFieldFinding = z.infer<typeof farFieldSchema>;

export const outcomeSchema = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('answer'),
    verdict: verdictSchema,
    candidates: z.array(candidateSchema),
    untold: z.array(untoldSchema),
    farField: farFieldSchema,
    picture: pictureFactsSchema,
  }),
  z.object({
    kind: z.literal('unusable'),
    reasons: z.array(unusableReasonSchema),
    picture: pictureFactsSchema,
  }),
]);
export type Outcome = z.infer<typeof outcomeSchema>;

export const identificationStateSchema = z.enum(['queued', 'running', 'done', 'failed', 'cancelled']);
export type IdentificationState = z.infer<typeof identificationStateSchema>;

/** An approved reference of a candidate's family whose sizes agree with the candidate's. */
export const nearReferenceSchema = z.object({
  referenceId: z.uuid(),
  number: z.string(),
  name: z.string(),
  /** Rank of the candidate (0 = best) that it is near to. */
  candidate: z.number().int(),
  /** Largest difference of a dimension, as a share of the reference's. */
  largestDifference: z.number(),
  /** True when every difference lies within the combined expanded uncertainty. */
  agrees: z.boolean(),
});
export type NearReference = z.infer<typeof nearReferenceSchema>;

export const identificationSchema = z.object({
  id: z.uuid(),
  exposureId: z.uuid(),
  /** 1, 2, … within the exposure. */
  run: z.number().int(),
  state: identificationStateSchema,
  /** 0 … 1 while running, with what is being done. */
  progress: z.object({ share: z.number(), step: z.string() }),
  outcome: outcomeSchema.nullable(),
  /** Why it failed. */
  problem: problemSchema.nullable(),
  nearReferences: z.array(nearReferenceSchema),
  engineVersion: z.string(),
  atlasVersion: z.string(),
  startedBy: personRefSchema,
  queuedAt: timestampSchema,
  startedAt: timestampSchema.nullable(),
  finishedAt: timestampSchema.nullable(),
  can: z.object({ cancel: z.boolean(), submit: z.boolean() }),
});
export type Identification = z.infer<typeof identificationSchema>;

export const startIdentification = endpoint({
  name: 'start-identification',
  method: 'POST',
  path: '/api/exposures/:exposureId/identifications',
  access: 'run-identifications',
  params: idParam('exposureId'),
  response: identificationSchema,
  status: 202,
});

export const listIdentifications = endpoint({
  name: 'list-identifications',
  method: 'GET',
  path: '/api/exposures/:exposureId/identifications',
  access: 'read-cases',
  params: idParam('exposureId'),
  /** Newest first. */
  response: z.object({ identifications: z.array(identificationSchema) }),
});

export const getIdentification = endpoint({
  name: 'get-identification',
  method: 'GET',
  path: '/api/identifications/:identificationId',
  access: 'read-cases',
  params: idParam('identificationId'),
  response: identificationSchema,
});

export const cancelIdentification = endpoint({
  name: 'cancel-identification',
  method: 'POST',
  path: '/api/identifications/:identificationId/cancel',
  access: 'run-identifications',
  params: idParam('identificationId'),
  response: identificationSchema,
});
