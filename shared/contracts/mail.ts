import { z } from 'zod';
import { endpoint } from '#shared/contracts/endpoint.ts';
import { pageOf, pageQuery, timestampSchema } from '#shared/contracts/paging.ts';

/** `held`: no mail server is set, so the message waits here to be read. */
export const mailStateSchema = z.enum(['held', 'queued', 'sent', 'failed']);

export const mailSchema = z.object({
  id: z.uuid(),
  to: z.string(),
  subject: z.string(),
  text: z.string(),
  state: mailStateSchema,
  lastError: z.string().nullable(),
  createdAt: timestampSchema,
  sentAt: timestampSchema.nullable(),
});
export type Mail = z.infer<typeof mailSchema>;

export const listMail = endpoint({
  name: 'list-mail',
  method: 'GET',
  path: '/api/mail',
  access: 'read-mail',
  query: z.object({ ...pageQuery }),
  response: pageOf(mailSchema),
});
