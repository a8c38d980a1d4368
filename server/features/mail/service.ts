import type { Database } from '#server/db/database.ts';
import type { Deps } from '#server/deps.ts';
import { insertMail, selectMail } from '#server/features/mail/store.ts';
import type { Mail } from '#shared/contracts/mail.ts';

/** Writes a message into the outbox inside the caller's transaction; it is sent only if that commits. */
export async function postMail(
  tx: Database,
  deps: Deps,
  message: { to: string; subject: string; text: string },
): Promise<void> {
  const id = deps.newId();
  const sends = deps.settings.mailServer !== undefined;
  await insertMail(tx, {
    id,
    ...message,
    state: sends ? 'queued' : 'held',
    lastError: null,
    createdAt: deps.clock(),
    sentAt: null,
  });
  if (sends) await deps.jobs.send(tx, 'send-mail', { mailId: id });
}

export async function readOutbox(deps: Deps, page: number, pageSize: number) {
  const { total, rows } = await selectMail(deps.db, pageSize, (page - 1) * pageSize);
  return {
    total,
    page,
    pageSize,
    rows: rows.map((row): Mail => ({
      ...row,
      createdAt: row.createdAt.toISOString(),
      sentAt: row.sentAt?.toISOString() ?? null,
    })),
  };
}
