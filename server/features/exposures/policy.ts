import type { Actor } from '#server/actor.ts';
import type { ExposureRow } from '#server/features/exposures/store.ts';
import { permits } from '#shared/permissions.ts';

/** While a match is under review or the case is closed, its evidence stays as it is. */
export function mayWithdraw(actor: Actor, row: ExposureRow): boolean {
  return (
    permits(actor.roles, 'upload-exposures') && row.exposure.withdrawnAt === null && row.caseState === 'open'
  );
}

export function mayIdentify(actor: Actor, row: ExposureRow): boolean {
  return (
    permits(actor.roles, 'run-identifications') &&
    row.exposure.withdrawnAt === null &&
    row.caseState === 'open'
  );
}
