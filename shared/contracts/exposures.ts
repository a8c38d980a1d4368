import { z } from 'zod';
import { benchCopySchema } from '#shared/contracts/benches.ts';
import { endpoint } from '#shared/contracts/endpoint.ts';
import {
  farFieldSchema,
  identificationStateSchema,
  pictureFactsSchema,
  verdictSchema,
} from '#shared/contracts/identifications.ts';
import { idParam, lineSchema, requiredLineSchema, timestampSchema } from '#shared/contracts/paging.ts';
import { personRefSchema } from '#shared/contracts/people.ts';

/** Limits that the server holds and the upload form states. */
export const pictureLimits = {
  bytes: 64 * 1024 * 1024,
  pixels: 64_000_000,
  side: 16_384,
  smallestSide: 32,
} as const;

export const pictureFormatSchema = z.enum(['png', 'tiff', 'jpeg', 'bmp']);
export type PictureFormat = z.infer<typeof pictureFormatSchema>;

export const channelSchema = z.enum(['grey', 'red', 'green', 'blue']);
export type Channel = z.infer<typeof channelSchema>;

/** What stands out about an exposure before anything is identified. */
export const exposureWarningSchema = z.enum([
  'saturated-core',
  'lossy-file',
  'eight-bit',
  'unknown-dark-level',
  'center-near-edge',
  'near-field-for-drawing',
  'drawing-undersampled',
  'depth-below-bench',
]);
export type ExposureWarning = z.infer<typeof exposureWarningSchema>;

export const exposureSchema = z.object({
  id: z.uuid(),
  caseId: z.uuid(),
  caseNumber: z.string(),
  /** 1, 2, … within the case. */
  number: z.number().int(),
  fileName: z.string(),
  sha256: z.string(),
  byteSize: z.number().int(),
  format: pictureFormatSchema,
  width: z.number().int(),
  height: z.number().int(),
  /** Bits that carry information. */
  bitDepth: z.number().int(),
  fullScale: z.number().int(),
  codeStep: z.number().int(),
  lossy: z.boolean(),
  channel: channelSchema,
  note: z.string(),
  bench: benchCopySchema,
  facts: pictureFactsSchema,
  /** From the drawing's size, before any identification; null when the case names no size. */
  farFieldForDrawing: farFieldSchema.nullable(),
  warnings: z.array(exposureWarningSchema),
  uploadedBy: personRefSchema,
  uploadedAt: timestampSchema,
  withdrawn: z.object({ by: personRefSchema, at: timestampSchema, reason: z.string() }).nullable(),
  latest: z
    .object({
      identificationId: z.uuid(),
      state: identificationStateSchema,
      share: z.number(),
      step: z.string(),
      verdict: verdictSchema.nullable(),
    })
    .nullable(),
  can: z.object({ identify: z.boolean(), withdraw: z.boolean() }),
});
export type Exposure = z.infer<typeof exposureSchema>;

/** Form fields beside the file. The identification starts at once. */
export const uploadExposureSchema = z.object({
  benchId: z.uuid('Choose a bench.'),
  note: lineSchema(300).default(''),
});

export const uploadExposure = endpoint({
  name: 'upload-exposure',
  method: 'POST',
  path: '/api/cases/:caseId/exposures',
  access: 'upload-exposures',
  params: idParam('caseId'),
  body: uploadExposureSchema,
  bodyKind: 'file',
  response: exposureSchema,
  status: 201,
});

export const getExposure = endpoint({
  name: 'get-exposure',
  method: 'GET',
  path: '/api/exposures/:exposureId',
  access: 'read-cases',
  params: idParam('exposureId'),
  response: exposureSchema,
});

export const withdrawExposure = endpoint({
  name: 'withdraw-exposure',
  method: 'POST',
  path: '/api/exposures/:exposureId/withdraw',
  access: 'upload-exposures',
  params: idParam('exposureId'),
  body: z.object({ reason: requiredLineSchema(300, 'the reason') }),
  response: exposureSchema,
});

/** The file as it came. */
export const getExposurePicture = endpoint({
  name: 'get-exposure-picture',
  method: 'GET',
  path: '/api/exposures/:exposureId/picture',
  access: 'read-cases',
  params: idParam('exposureId'),
  responseKind: 'bytes',
});

/** The measured plane: width × height codes, unsigned 16 bits, little endian, row by row from the top. */
export const getExposurePixels = endpoint({
  name: 'get-exposure-pixels',
  method: 'GET',
  path: '/api/exposures/:exposureId/pixels',
  access: 'read-cases',
  params: idParam('exposureId'),
  responseKind: 'bytes',
});

/** 192 × 192 grey PNG about the centre, logarithmic; the screen gives it the colours of its theme. */
export const getExposureThumbnail = endpoint({
  name: 'get-exposure-thumbnail',
  method: 'GET',
  path: '/api/exposures/:exposureId/thumbnail',
  access: 'read-cases',
  params: idParam('exposureId'),
  responseKind: 'bytes',
});
