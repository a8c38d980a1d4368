// Runs the API tests against a PostgreSQL server of its own: a throw-away cluster from Debian's package "postgresql",
// on a free loopback port, removed afterwards.
import { spawnSync } from 'node:child_process';
import { chmodSync, existsSync, mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

const root = process.getuid?.() === 0;
const say = (text) => process.stderr.write(`${text}\n`);

function binaries() {
  const base = '/usr/lib/postgresql';
  const versions = existsSync(base) ? readdirSync(base).sort((a, b) => Number(b) - Number(a)) : [];
  return versions.map((v) => join(base, v, 'bin')).find((bin) => existsSync(join(bin, 'initdb')));
}

if (!binaries()) {
  if (!root || !existsSync('/usr/bin/apt-get')) {
    say('No PostgreSQL server found: install the Debian package "postgresql", then run again.');
    process.exit(1);
  }
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  spawnSync('apt-get', ['update', '-qq'], { stdio: 'inherit', env });
  spawnSync('apt-get', ['install', '-y', '-qq', 'postgresql'], { stdio: ['ignore', 2, 2], env });
}
const bin = binaries();
if (!bin) {
  say('Installing the Debian package "postgresql" failed; its own words stand above.');
  process.exit(1);
}

const port = await new Promise((resolve) => {
  const probe = createServer().listen(0, '127.0.0.1', () => {
    const { port: free } = probe.address();
    probe.close(() => resolve(free));
  });
});
const folder = mkdtempSync(join(tmpdir(), 'fringeward-postgres-'));

/** PostgreSQL refuses to run as root: then everything of it runs as the package's own user. */
function asPostgres(program, args) {
  const [command, list] = root
    ? ['runuser', ['-u', 'postgres', '--', join(bin, program), ...args]]
    : [join(bin, program), args];
  const result = spawnSync(command, list, { stdio: ['ignore', 'ignore', 'inherit'], cwd: '/' });
  if (result.status !== 0) throw new Error(`${program} failed`);
}

let status = 1;
try {
  if (root) {
    chmodSync(folder, 0o755);
    spawnSync('chown', ['postgres', folder]);
  }
  const data = join(folder, 'data');
  asPostgres('initdb', [
    '-D',
    data,
    '-U',
    'fringeward',
    '-A',
    'trust',
    '-E',
    'UTF8',
    '--locale=C',
    '--no-sync',
  ]);
  const options = `-p ${port} -c listen_addresses=127.0.0.1 -c unix_socket_directories=${folder} -c fsync=off`;
  asPostgres('pg_ctl', ['-D', data, '-w', '-l', join(folder, 'log'), '-o', options, 'start']);
  try {
    status =
      spawnSync(
        'node_modules/.bin/vitest',
        ['run', 'tests/server', 'tests/promises', ...process.argv.slice(2)],
        {
          stdio: 'inherit',
          env: { ...process.env, DATABASE_URL: `postgres://fringeward@127.0.0.1:${port}/postgres` },
        },
      ).status ?? 1;
  } finally {
    asPostgres('pg_ctl', ['-D', data, '-m', 'immediate', 'stop']);
  }
} finally {
  rmSync(folder, { recursive: true, force: true });
}
process.exit(status);
