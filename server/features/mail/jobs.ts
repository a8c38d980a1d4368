import { createTransport } from 'nodemailer';
import type { Deps } from '#server/deps.ts';
import { findMail, markMail } from '#server/features/mail/store.ts';
import type { JobDefinition } from '#server/jobs/job-queue.ts';

/** Sends a message of the outbox once; a message that went out already is left alone. */
export function sendMailJob(deps: Deps): JobDefinition<{ mailId: string }> {
  return {
    name: 'send-mail',
    attempts: 8,
    concurrency: 1,
    async run({ mailId }, { lastAttempt }) {
      const row = await findMail(deps.db, mailId);
      if (!row || row.state === 'sent') return;
      if (deps.settings.mailServer === undefined) return markMail(deps.db, mailId, { state: 'held' });
      const transport = createTransport(deps.settings.mailServer, { from: deps.settings.mailFrom });
      try {
        await transport.sendMail({
          to: row.to,
          subject: row.subject,
          text: row.text,
          messageId: `<${row.id}@fringeward>`,
        });
        await markMail(deps.db, mailId, { state: 'sent', sentAt: deps.clock(), lastError: null });
      } catch (error) {
        await markMail(deps.db, mailId, {
          state: lastAttempt ? 'failed' : 'queued',
          lastError: (error as Error).message.slice(0, 300),
        });
        throw error;
      } finally {
        transport.close();
      }
    },
  };
}
