// Brings a fresh clone to where `npm start` and `npm test` can run: packages, builds and, with `--browser`, Chromium.
// Uses nothing that would have to be installed first. Everything it says goes to the error stream.
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

const wants = new Set(process.argv.slice(2));
const say = (text) => process.stderr.write(`${text}\n`);

function run(command, args, options = {}) {
  const result = spawnSync(command, args, { stdio: ['ignore', 2, 2], ...options });
  if (result.status !== 0) {
    say(`"${command} ${args.join(' ')}" failed. Its own words stand above.`);
    process.exit(result.status ?? 1);
  }
}

function filesUnder(path) {
  if (!existsSync(path)) return [];
  if (statSync(path).isFile()) return [path];
  return readdirSync(path, { withFileTypes: true })
    .sort((a, b) => (a.name < b.name ? -1 : 1))
    .flatMap((entry) => filesUnder(join(path, entry.name)));
}

function hashOf(paths) {
  const hash = createHash('sha256');
  for (const file of paths.flatMap(filesUnder))
    hash.update(file).update('\0').update(readFileSync(file)).update('\0');
  return hash.digest('hex');
}

/** Runs `work` unless the stamp says that it was done for the same inputs. */
function once(stamp, inputs, work) {
  const hash = hashOf(inputs);
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === hash) return;
  work();
  mkdirSync(join(stamp, '..'), { recursive: true });
  writeFileSync(stamp, hash);
}

const [major = 0, minor = 0] = process.versions.node.split('.').map(Number);
if (major < 20 || (major === 20 && minor < 19)) {
  say(
    `Node ${process.versions.node} is too old. Install Node 20.19 or later and run the same command again.`,
  );
  process.exit(1);
}

once('node_modules/.fringeward-stamp', ['package-lock.json', '.npmrc'], () => {
  say('Installing packages …');
  run('npm', ['ci', '--no-audit', '--no-fund', '--loglevel=error']);
});

const serverSources = ['shared', 'server', 'reference-patterns', 'scripts/build.mjs', 'package-lock.json'];
once('dist/.server-stamp', serverSources, () => {
  say('Building the server …');
  run(process.execPath, ['scripts/build.mjs', '--server']);
});

if (!wants.has('--no-client'))
  once(
    'dist/.client-stamp',
    ['shared', 'src', 'vite.config.ts', 'scripts/build.mjs', 'package-lock.json'],
    () => {
      say('Building the pages …');
      run(process.execPath, ['scripts/build.mjs', '--client']);
    },
  );

if (wants.has('--browser') && !existsSync('/usr/bin/chromium')) {
  const mayInstall = process.getuid?.() === 0 && existsSync('/usr/bin/apt-get');
  if (!mayInstall) {
    say(
      'The journeys need Chromium at /usr/bin/chromium: install the Debian package "chromium", then run again.',
    );
    process.exit(1);
  }
  say('Installing Chromium …');
  run('apt-get', ['update', '-qq']);
  run('apt-get', ['install', '-y', '-qq', 'chromium'], {
    env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
  });
}
