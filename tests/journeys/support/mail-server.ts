import type { AddressInfo } from 'node:net';
import { SMTPServer } from 'smtp-server';

export interface ReceivedMail {
  readonly to: string[];
  readonly source: string;
}

/** A mail server on loopback that keeps what it is given. */
export async function startMailServer() {
  const received: ReceivedMail[] = [];
  const server = new SMTPServer({
    disabledCommands: ['AUTH', 'STARTTLS'],
    logger: false,
    onData(stream, session, done) {
      const chunks: Buffer[] = [];
      stream.on('data', (chunk: Buffer) => chunks.push(chunk));
      stream.on('end', () => {
        received.push({
          to: session.envelope.rcptTo.map((r) => r.address),
          source: Buffer.concat(chunks).toString('utf8'),
        });
        done();
      });
    },
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.server.address() as AddressInfo;
  return {
    url: `smtp://127.0.0.1:${port}`,
    received,
    stop: () => new Promise<void>((resolve) => server.close(() => resolve())),
  };
}
