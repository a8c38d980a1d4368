import { z } from 'zod';
import { roleSchema } from '#shared/permissions.ts';
import { endpoint } from '#shared/contracts/endpoint.ts';
import { idParam, requiredLineSchema, timestampSchema, versionSchema } from '#shared/contracts/paging.ts';

export const personRefSchema = z.object({ id: z.uuid(), name: z.string() });

export const emailSchema = z
  .email('Enter an e-mail address such as name@example.org.')
  .max(200)
  .transform((s) => s.toLowerCase());

export const passwordSchema = z
  .string()
  .min(12, 'At least 12 characters; a few unrelated words are good.')
  .max(200, 'At most 200 characters.');

export const rolesSchema = z
  .array(roleSchema)
  .min(1, 'Choose at least one role.')
  .transform((list) => [...new Set(list)]);

export const personSchema = z.object({
  id: z.uuid(),
  name: z.string(),
  email: z.string(),
  roles: z.array(roleSchema),
  active: z.boolean(),
  version: z.number().int(),
  createdAt: timestampSchema,
});
export type Person = z.infer<typeof personSchema>;

export const addPersonSchema = z.object({
  name: requiredLineSchema(80, 'a name'),
  email: emailSchema,
  roles: rolesSchema,
  password: passwordSchema,
});

export const editPersonSchema = z.object({
  name: requiredLineSchema(80, 'a name'),
  roles: rolesSchema,
  active: z.boolean(),
  version: versionSchema,
});

export const listPeople = endpoint({
  name: 'list-people',
  method: 'GET',
  path: '/api/people',
  access: 'manage-people',
  response: z.object({ people: z.array(personSchema) }),
});

export const addPerson = endpoint({
  name: 'add-person',
  method: 'POST',
  path: '/api/people',
  access: 'manage-people',
  body: addPersonSchema,
  response: personSchema,
  status: 201,
});

export const editPerson = endpoint({
  name: 'edit-person',
  method: 'PUT',
  path: '/api/people/:personId',
  access: 'manage-people',
  params: idParam('personId'),
  body: editPersonSchema,
  response: personSchema,
});
