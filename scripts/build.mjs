// Bundles the server, its worker and the command into dist/server, and the client into dist/client.
// `--server` or `--client` builds one of the two.
import { build } from 'esbuild';
import { cp } from 'node:fs/promises';

const only = process.argv.slice(2);
const wants = (part) => only.length === 0 || only.includes(`--${part}`);

if (wants('server')) {
  await build({
    entryPoints: {
      main: 'server/main.ts',
      identify: 'server/cli/identify.ts',
      'identify.worker': 'server/workers/identify.worker.ts',
    },
    outdir: 'dist/server',
    bundle: true,
    packages: 'external',
    platform: 'node',
    format: 'esm',
    target: 'node20',
    sourcemap: true,
    logLevel: 'warning',
  });
  await cp('server/db/migrations', 'dist/server/migrations', { recursive: true });
  await cp('reference-patterns', 'dist/server/reference-patterns', { recursive: true });
}

if (wants('client')) {
  const vite = await import('vite');
  await vite.build({ logLevel: 'warn' });
}
