import { z } from 'zod';
import { permissions, roleSchema, type Permission } from '#shared/permissions.ts';
import { endpoint } from '#shared/contracts/endpoint.ts';
import { emailSchema, passwordSchema } from '#shared/contracts/people.ts';
import { requiredLineSchema } from '#shared/contracts/paging.ts';

const permissionSchema = z.enum(Object.keys(permissions) as [Permission, ...Permission[]]);

export const sessionSchema = z.object({
  person: z
    .object({
      id: z.uuid(),
      name: z.string(),
      email: z.string(),
      roles: z.array(roleSchema),
      permissions: z.array(permissionSchema),
    })
    .nullable(),
  laboratory: z.string(),
});
export type Session = z.infer<typeof sessionSchema>;

export const signInSchema = z.object({
  email: z.string().trim().min(1, 'Enter your e-mail address.').max(200),
  password: z.string().min(1, 'Enter your password.').max(200),
});

export const getSession = endpoint({
  name: 'get-session',
  method: 'GET',
  path: '/api/session',
  access: 'anyone',
  response: sessionSchema,
});

export const signIn = endpoint({
  name: 'sign-in',
  method: 'POST',
  path: '/api/session',
  access: 'anyone',
  body: signInSchema,
  response: sessionSchema,
});

export const signOut = endpoint({
  name: 'sign-out',
  method: 'DELETE',
  path: '/api/session',
  access: 'signed-in',
});

export const signInOptionsSchema = z.object({
  /** Accounts of the demo laboratory, offered on the sign-in page; empty outside demo mode. */
  demoAccounts: z.array(
    z.object({ name: z.string(), email: z.string(), password: z.string(), roles: z.array(roleSchema) }),
  ),
  /** True until the first administrator exists. */
  needsFirstAdministrator: z.boolean(),
});
export type SignInOptions = z.infer<typeof signInOptionsSchema>;

export const getSignInOptions = endpoint({
  name: 'get-sign-in-options',
  method: 'GET',
  path: '/api/sign-in-options',
  access: 'anyone',
  response: signInOptionsSchema,
});

export const firstAdministratorSchema = z.object({
  code: requiredLineSchema(40, 'the one-time code from the console'),
  name: requiredLineSchema(80, 'your name'),
  email: emailSchema,
  password: passwordSchema,
});

export const createFirstAdministrator = endpoint({
  name: 'create-first-administrator',
  method: 'POST',
  path: '/api/first-administrator',
  access: 'anyone',
  body: firstAdministratorSchema,
  response: sessionSchema,
  status: 201,
});

export const changePasswordSchema = z.object({
  currentPassword: z.string().min(1, 'Enter your present password.').max(200),
  newPassword: passwordSchema,
});

export const changePassword = endpoint({
  name: 'change-password',
  method: 'POST',
  path: '/api/session/password',
  access: 'signed-in',
  body: changePasswordSchema,
});
