import { spawn, type ChildProcess } from 'node:child_process';
import { mkdtemp, rm } from 'node:fs/promises';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

export interface RunningServer {
  readonly url: string;
  readonly dataDir: string;
  readonly process: ChildProcess;
  /** Everything that the server printed so far. */
  output(): string;
  stop(signal?: NodeJS.Signals): Promise<void>;
}

export async function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const address = probe.address();
      if (address === null || typeof address === 'string') return reject(new Error('no port'));
      probe.close(() => resolve(address.port));
    });
  });
}

/** Starts the built server on a free port and a folder of its own, and waits until it says that it is ready. */
export async function startServer(
  settings: Record<string, string> = {},
  dataDir?: string,
): Promise<RunningServer> {
  const folder = dataDir ?? (await mkdtemp(join(tmpdir(), 'fringeward-journey-')));
  const port = settings['PORT'] ?? String(await freePort());
  const child = spawn(process.execPath, ['dist/server/main.js'], {
    // The test runner sets a BASE_URL of its own.
    env: { ...process.env, NODE_ENV: 'production', BASE_URL: '', PORT: port, DATA_DIR: folder, ...settings },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let text = '';
  const ended = new Promise<void>((resolve) => child.once('exit', () => resolve()));
  await new Promise<void>((resolve, reject) => {
    const listen = (chunk: Buffer) => {
      text += chunk.toString();
      if (text.includes('Fringeward is ready')) resolve();
    };
    child.stdout.on('data', listen);
    child.stderr.on('data', listen);
    child.once('exit', (code) =>
      reject(new Error(`The server ended with ${code} before it was ready:\n${text}`)),
    );
  });
  return {
    url: `http://127.0.0.1:${port}`,
    dataDir: folder,
    process: child,
    output: () => text,
    async stop(signal = 'SIGTERM') {
      child.kill(signal);
      await ended;
      if (dataDir === undefined && signal === 'SIGTERM') await rm(folder, { recursive: true, force: true });
    },
  };
}
