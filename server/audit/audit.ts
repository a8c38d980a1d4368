import type { Actor } from '#server/actor.ts';
import type { Database } from '#server/db/database.ts';
import { auditEvents } from '#server/db/schema/audit.ts';

/** Records who did what, inside the caller's transaction: the event stands if and only if the deed does. */
export async function record(
  tx: Database,
  actor: Pick<Actor, 'id'> | null,
  at: Date,
  event: string,
  subject: { kind: string; id: string | null },
  detail: Record<string, unknown> = {},
): Promise<void> {
  await tx
    .insert(auditEvents)
    .values({ at, by: actor?.id ?? null, event, subject: subject.kind, subjectId: subject.id, detail });
}
