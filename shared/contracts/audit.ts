import { z } from 'zod';
import { endpoint } from '#shared/contracts/endpoint.ts';
import { pageOf, pageQuery, timestampSchema } from '#shared/contracts/paging.ts';
import { personRefSchema } from '#shared/contracts/people.ts';

export const auditEventSchema = z.object({
  id: z.string(),
  at: timestampSchema,
  by: personRefSchema.nullable(),
  /** Verb-noun, such as `submit-match`. */
  event: z.string(),
  subject: z.string(),
  subjectId: z.string().nullable(),
  detail: z.record(z.string(), z.unknown()),
});
export type AuditEvent = z.infer<typeof auditEventSchema>;

export const listAudit = endpoint({
  name: 'list-audit',
  method: 'GET',
  path: '/api/audit',
  access: 'read-audit',
  query: z.object({ ...pageQuery, q: z.string().trim().max(100).optional() }),
  response: pageOf(auditEventSchema),
});
