import { z } from 'zod';
import { endpoint } from '#shared/contracts/endpoint.ts';
import {
  candidateSchema,
  farFieldSchema,
  untoldSchema,
  verdictSchema,
} from '#shared/contracts/identifications.ts';
import { idParam, pageOf, pageQuery, textSchema, timestampSchema } from '#shared/contracts/paging.ts';
import { personRefSchema } from '#shared/contracts/people.ts';

export const matchStateSchema = z.enum(['submitted', 'confirmed', 'returned', 'rejected', 'superseded']);
export type MatchState = z.infer<typeof matchStateSchema>;

export const decisionSchema = z.enum(['confirm', 'return', 'reject']);
export type Decision = z.infer<typeof decisionSchema>;

/** What a signature under each decision means, shown before signing and kept with it. */
export const signatureMeanings: Record<Decision, string> = {
  confirm: 'I have compared the picture with the candidate and agree with the match as stated.',
  return: 'I have compared the picture with the candidate and ask for the work named in the reason.',
  reject: 'I have compared the picture with the candidate and do not accept it as a match.',
};

export const matchSchema = z.object({
  id: z.uuid(),
  caseId: z.uuid(),
  caseNumber: z.string(),
  caseTitle: z.string(),
  part: z.string(),
  /** 1, 2, … within the case. */
  version: z.number().int(),
  exposureId: z.uuid(),
  identificationId: z.uuid(),
  /** Rank of the candidate in its identification, 0 = best. */
  candidateIndex: z.number().int(),
  /** As it stood in the identification. */
  candidate: candidateSchema,
  verdict: verdictSchema,
  untold: z.array(untoldSchema),
  farField: farFieldSchema,
  engineVersion: z.string(),
  atlasVersion: z.string(),
  comment: z.string(),
  state: matchStateSchema,
  submittedBy: personRefSchema,
  submittedAt: timestampSchema,
  decision: z
    .object({
      decision: decisionSchema,
      by: personRefSchema,
      at: timestampSchema,
      reason: z.string(),
      meaning: z.string(),
    })
    .nullable(),
  can: z.object({ decide: z.boolean() }),
  /** Why this reader may not decide, in a sentence; null when they may or when nothing is open. */
  whyNot: z.string().nullable(),
});
export type Match = z.infer<typeof matchSchema>;

export const submitMatchSchema = z.object({
  identificationId: z.uuid(),
  candidateIndex: z.number().int().min(0).max(50),
  comment: textSchema(2000).default(''),
});

export const submitMatch = endpoint({
  name: 'submit-match',
  method: 'POST',
  path: '/api/cases/:caseId/matches',
  access: 'submit-matches',
  params: idParam('caseId'),
  body: submitMatchSchema,
  response: matchSchema,
  status: 201,
});

export const listMatches = endpoint({
  name: 'list-matches',
  method: 'GET',
  path: '/api/matches',
  access: 'read-matches',
  query: z.object({
    ...pageQuery,
    state: matchStateSchema.optional(),
    caseId: z.uuid().optional(),
    /** Only those that the reader may decide on. */
    mine: z.enum(['decide']).optional(),
    q: z.string().trim().max(100).optional(),
  }),
  response: pageOf(matchSchema),
});

export const getMatch = endpoint({
  name: 'get-match',
  method: 'GET',
  path: '/api/matches/:matchId',
  access: 'read-matches',
  params: idParam('matchId'),
  response: matchSchema.extend({ earlier: z.array(matchSchema) }),
});

export const decideMatchSchema = z
  .object({
    decision: decisionSchema,
    reason: textSchema(2000).default(''),
    password: z.string().min(1, 'Enter your password to sign.').max(200),
  })
  .refine((d) => d.decision === 'confirm' || d.reason.length > 0, {
    path: ['reason'],
    message: 'Say why, so that the analyst knows what to do.',
  });

export const decideMatch = endpoint({
  name: 'decide-match',
  method: 'POST',
  path: '/api/matches/:matchId/decision',
  access: 'decide-matches',
  params: idParam('matchId'),
  body: decideMatchSchema,
  response: matchSchema,
});
