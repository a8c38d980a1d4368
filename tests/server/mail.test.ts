import { afterEach, describe, expect, it } from 'vitest';
import { postMail } from '#server/features/mail/service.ts';
import { listMail } from '#shared/contracts/mail.ts';
import { startMailServer } from '#tests/journeys/support/mail-server.ts';
import { freePort } from '#tests/journeys/support/server.ts';
import { createTestApp, until, type TestApp } from '#tests/support/test-app.ts';

let app: TestApp;
afterEach(() => app.close());

const message = {
  to: 'tamsin.orrel@example.org',
  subject: 'FW-0001: match 1 was returned',
  text: 'Größe prüfen.',
};

async function outbox() {
  return (await (await app.signInAs('administrator')).call(listMail)).rows;
}

describe('mail', () => {
  it('waits in the outbox, to be read there, when no mail server is set', async () => {
    app = await createTestApp();
    await app.deps.db.transaction((tx) => postMail(tx, app.deps, message));
    expect(await outbox()).toMatchObject([{ ...message, state: 'held', sentAt: null }]);
  });

  it('goes out once through the mail server that is set, and the outbox says when', async () => {
    const server = await startMailServer();
    app = await createTestApp({ settings: { mailServer: server.url } });
    await app.deps.db.transaction((tx) => postMail(tx, app.deps, message));
    const [sent] = await until(outbox, ([row]) => row.state === 'sent');
    expect(sent.sentAt).not.toBeNull();
    expect(server.received).toHaveLength(1);
    expect(server.received[0].to).toEqual([message.to]);
    expect(server.received[0].source).toContain('From: fringeward@example.org');
    expect(server.received[0].source).toContain(`Subject: ${message.subject}`);
    await server.stop();
  });

  it('is neither stored nor sent when the transaction that wrote it fails', async () => {
    const server = await startMailServer();
    app = await createTestApp({ settings: { mailServer: server.url } });
    const failing = app.deps.db.transaction(async (tx) => {
      await postMail(tx, app.deps, { ...message, subject: 'Never' });
      throw new Error('the rest went wrong');
    });
    await expect(failing).rejects.toThrow('the rest went wrong');
    await app.deps.db.transaction((tx) => postMail(tx, app.deps, message));
    await until(outbox, (rows) => rows.every((row) => row.state === 'sent') && rows.length > 0);
    expect((await outbox()).map((row) => row.subject)).toEqual([message.subject]);
    expect(server.received).toHaveLength(1);
    await server.stop();
  });

  it('stays in the outbox with the reason while the mail server does not answer, and is tried again', async () => {
    app = await createTestApp({ settings: { mailServer: `smtp://127.0.0.1:${await freePort()}` } });
    await app.deps.db.transaction((tx) => postMail(tx, app.deps, message));
    const [row] = await until(outbox, ([first]) => first.lastError !== null);
    expect(row.state).toBe('queued');
    expect(row.lastError).toContain('ECONNREFUSED');
  });
});
