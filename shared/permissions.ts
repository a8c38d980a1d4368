import { z } from 'zod';

export const roles = ['analyst', 'reviewer', 'curator', 'administrator'] as const;
export const roleSchema = z.enum(roles);
export type Role = z.infer<typeof roleSchema>;

const everyone: readonly Role[] = roles;

/** The one table of permissions: what each role may do. Rules about a single record stand in the feature's policy. */
export const permissions = {
  'read-cases': everyone,
  'edit-cases': ['analyst'],
  'read-benches': everyone,
  'edit-benches': ['analyst', 'administrator'],
  'upload-exposures': ['analyst'],
  'run-identifications': ['analyst'],
  'submit-matches': ['analyst'],
  'read-matches': everyone,
  'decide-matches': ['reviewer'],
  'read-references': everyone,
  'manage-people': ['administrator'],
  'read-mail': ['administrator'],
  'read-audit': ['administrator'],
} as const satisfies Record<string, readonly Role[]>;

export type Permission = keyof typeof permissions;

/** True when one of the roles holds the permission. */
export function permits(held: readonly Role[], permission: Permission): boolean {
  const allowed: readonly Role[] = permissions[permission];
  return held.some((role) => allowed.includes(role));
}
