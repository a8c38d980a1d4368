import { count, desc, eq, ilike, or, type SQL } from 'drizzle-orm';
import type { Database } from '#server/db/database.ts';
import { containing } from '#server/db/containing.ts';
import { auditEvents } from '#server/db/schema/audit.ts';
import { people } from '#server/db/schema/people.ts';

export async function selectAudit(db: Database, q: string | undefined, limit: number, offset: number) {
  const where: SQL | undefined = q
    ? or(
        ilike(auditEvents.event, containing(q)),
        ilike(auditEvents.subject, containing(q)),
        ilike(people.name, containing(q)),
      )
    : undefined;
  const base = db
    .select({ n: count() })
    .from(auditEvents)
    .leftJoin(people, eq(people.id, auditEvents.by))
    .where(where);
  const rows = db
    .select({
      id: auditEvents.id,
      at: auditEvents.at,
      event: auditEvents.event,
      subject: auditEvents.subject,
      subjectId: auditEvents.subjectId,
      detail: auditEvents.detail,
      by: { id: people.id, name: people.name },
    })
    .from(auditEvents)
    .leftJoin(people, eq(people.id, auditEvents.by))
    .where(where)
    .orderBy(desc(auditEvents.id))
    .limit(limit)
    .offset(offset);
  return { total: (await base)[0].n, rows: await rows };
}
