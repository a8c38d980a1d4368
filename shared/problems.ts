import { z } from 'zod';

/** Every refusal the server may answer, with its HTTP status and title. The sentence (`detail`) is written where it is refused. */
export const problems = {
  'invalid-input': { status: 422, title: 'Some values need a correction' },
  'malformed-request': { status: 400, title: 'The request could not be read' },
  'request-too-large': { status: 413, title: 'The request is too large' },
  'not-signed-in': { status: 401, title: 'Sign in first' },
  'wrong-credentials': { status: 401, title: 'E-mail or password is not right' },
  'wrong-password': { status: 403, title: 'The password is not right' },
  'not-permitted': { status: 403, title: 'Your role does not include this' },
  'foreign-origin': { status: 403, title: 'The request came from another site' },
  'not-found-or-not-yours': { status: 404, title: 'Not found' },
  'too-many-attempts': { status: 429, title: 'Too many attempts' },
  'stale-edit': { status: 409, title: 'Somebody else changed this meanwhile' },
  'wrong-state': { status: 409, title: 'This is not possible in the present state' },
  'own-match': { status: 403, title: 'Nobody decides on their own match' },
  'email-taken': { status: 409, title: 'This e-mail address has an account already' },
  'last-administrator': { status: 409, title: 'One administrator must remain' },
  'wrong-code': { status: 403, title: 'The one-time code is not right' },
  'bench-name-taken': { status: 409, title: 'A bench of this name exists already' },
  'same-file-in-case': { status: 409, title: 'This picture is in the case already' },
  'file-missing': { status: 422, title: 'No file came with the request' },
  'file-empty': { status: 422, title: 'The file is empty' },
  'file-too-large': { status: 413, title: 'The file is too large' },
  'picture-too-large': { status: 422, title: 'The picture has too many pixels' },
  'picture-too-small': { status: 422, title: 'The picture has too few pixels' },
  'not-a-picture': { status: 415, title: 'This is not a picture that can be read' },
  'picture-truncated': { status: 422, title: 'The picture file ends early' },
  'picture-damaged': { status: 422, title: 'The picture file is damaged' },
  'picture-of-many': { status: 422, title: 'The file holds more than one picture' },
  'picture-type-differs': { status: 422, title: 'The file is of another type than its name says' },
  'picture-format-unsupported': { status: 415, title: 'This kind of picture cannot be measured' },
  'picture-of-two-lasers': { status: 422, title: 'The picture holds light of more than one colour' },
  'picture-unusable': { status: 422, title: 'The picture cannot be measured' },
  'identification-running': { status: 409, title: 'An identification of this exposure is under way' },
  'identification-cancelled': { status: 409, title: 'The identification was cancelled' },
  'identification-crashed': { status: 500, title: 'The identification broke off' },
  'server-closing': { status: 503, title: 'The server is closing' },
  'internal-fault': { status: 500, title: 'Something broke on the server' },
} as const satisfies Record<string, { status: number; title: string }>;

export type ProblemCode = keyof typeof problems;

export const problemCodeSchema = z.enum(Object.keys(problems) as [ProblemCode, ...ProblemCode[]]);

/** One wrong field: an RFC 6901 pointer into the request body and a sentence with the mend. */
export const fieldErrorSchema = z.object({ pointer: z.string(), detail: z.string() });
export type FieldError = z.infer<typeof fieldErrorSchema>;

/** RFC 9457 problem details. */
export const problemSchema = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  detail: z.string(),
  instance: z.string().optional(),
  code: problemCodeSchema,
  requestId: z.string().optional(),
  errors: z.array(fieldErrorSchema).max(50).optional(),
});
export type Problem = z.infer<typeof problemSchema>;
