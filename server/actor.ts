import type { Role } from '#shared/permissions.ts';

/** Who asks. */
export interface Actor {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly roles: readonly Role[];
}
