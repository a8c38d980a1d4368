// Runs every check of the project and ends with one line "N passed, N failed".
// A static check counts as one test. Arguments narrow the run: `npm test -- static`, `unit`, `journeys`.
import { spawnSync } from 'node:child_process';
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs';

const parts = process.argv.slice(2);
const wants = (part) => parts.length === 0 || parts.includes(part);
const tally = { passed: 0, failed: 0 };

function binary(name) {
  return `node_modules/.bin/${name}`;
}

function check(title, command, args) {
  console.log(`\n# ${title}`);
  const ok = spawnSync(command, args, { stdio: 'inherit' }).status === 0;
  if (ok) tally.passed += 1;
  else tally.failed += 1;
  console.log(`${ok ? 'passed' : 'FAILED'}: ${title}`);
}

function suite(title, config) {
  console.log(`\n# ${title}`);
  mkdirSync('.cache', { recursive: true });
  const file = `.cache/${config}.json`;
  rmSync(file, { force: true });
  const args = [
    'run',
    '--config',
    config,
    '--reporter=default',
    '--reporter=json',
    `--outputFile.json=${file}`,
  ];
  const status = spawnSync(binary('vitest'), args, { stdio: 'inherit' }).status;
  const result = existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')) : undefined;
  const failed = (result?.numFailedTests ?? 0) + (result?.numPendingTests ?? 0);
  tally.passed += result?.numPassedTests ?? 0;
  // A suite that broke outside its tests, ran none or skipped some has failed.
  tally.failed += failed === 0 && (status !== 0 || !result?.numPassedTests) ? 1 : failed;
}

if (wants('static')) {
  check('format (prettier)', binary('prettier'), ['--check', '--log-level=warn', '.']);
  check('lint (eslint)', binary('eslint'), ['.', '--max-warnings=0']);
  check('types (tsc)', binary('tsc'), ['-b']);
  check('direction of imports (dependency-cruiser)', binary('depcruise'), [
    '--config',
    '.dependency-cruiser.cjs',
    'shared',
    'server',
    'src',
    'tests',
  ]);
  check('unused code (knip)', binary('knip'), []);
}
if (wants('unit')) suite('unit and API tests', 'vitest.config.ts');
if (wants('journeys')) suite('journeys in a browser', 'vitest.journeys.config.ts');

console.log(`\n${tally.passed} passed, ${tally.failed} failed`);
process.exit(tally.failed === 0 && tally.passed > 0 ? 0 : 1);
