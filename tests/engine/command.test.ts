import { execFile } from 'node:child_process';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { build } from 'esbuild';
import { encode } from 'fast-png';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { exposureOf, type ExposureSpec } from '#tests/engine/exposure.ts';

const run = promisify(execFile);
/** Inside the tree, so that the bundle finds its packages. */
const bundle = join(process.cwd(), 'node_modules', '.cache', `command-${process.pid}`);
let folder = '';

const slot: ExposureSpec = { family: 'slot', values: { length: 150e-6, width: 60e-6 }, orientation: 0.6 };
const { picture, setup } = exposureOf({ ...slot, width: 240, height: 200 });

async function identify(...words: string[]): Promise<{ code: number; stdout: string; stderr: string }> {
  try {
    const { stdout, stderr } = await run(process.execPath, [join(bundle, 'identify.js'), ...words]);
    return { code: 0, stdout, stderr };
  } catch (error) {
    const { code, stdout, stderr } = error as { code: number; stdout: string; stderr: string };
    return { code, stdout, stderr };
  }
}

beforeAll(async () => {
  await build({
    entryPoints: {
      identify: 'server/cli/identify.ts',
      'identify.worker': 'server/workers/identify.worker.ts',
    },
    outdir: bundle,
    bundle: true,
    packages: 'external',
    platform: 'node',
    format: 'esm',
    target: 'node20',
  });
  folder = await mkdtemp(join(tmpdir(), 'fringeward-command-'));
  // 12 bits left-aligned in a 16-bit PNG, as cameras write them.
  const data = picture.codes.map((code) => code * 16);
  await writeFile(
    join(folder, 'slot.png'),
    encode({ width: picture.width, height: picture.height, data, depth: 16, channels: 1 }),
  );
  await writeFile(join(folder, 'broken.png'), 'no picture');
});

afterAll(async () => {
  await rm(folder, { recursive: true, force: true });
  await rm(bundle, { recursive: true, force: true });
});

const words = () => [
  ...['--wavelength-nm', '632.8', '--wavelength-u-nm', '0.1'],
  ...['--distance-mm', String(setup.distance.value * 1e3), '--pixel-um', '5.2', '--geometry', 'lens'],
  ...['--bit-depth', '12', '--dark-level', '64'],
];

describe('the command for one picture', () => {
  it('prints a table with the family, the dimensions and the direction', async () => {
    const { code, stdout } = await identify(join(folder, 'slot.png'), ...words());
    expect(code).toBe(0);
    expect(stdout).toMatch(/^Verdict {5}identified$/m);
    expect(stdout).toMatch(/Slot +\d+\.\d %/);
    expect(stdout).toMatch(/Overall length +150\.\d+\s±\s0\.\d+\sµm/);
    expect(stdout).toMatch(/Direction of the long axis +34\.\d+°/);
  });

  it('prints data with --json, in the form of a predictions line', async () => {
    const { code, stdout } = await identify(join(folder, 'slot.png'), ...words(), '--json');
    expect(code).toBe(0);
    const answer = JSON.parse(stdout) as { verdict: string; ranked: { params: Record<string, number> }[] };
    expect(answer.verdict).toBe('identified');
    expect(answer.ranked[0].params['lengthUm']).toBeCloseTo(150, 0);
    expect(answer.ranked[0].params['widthUm']).toBeCloseTo(60, 0);
  });

  it.each([
    [['picture.png'], '--wavelength-nm is needed with a picture.'],
    [[], 'Name a picture, or many with --cases cases.jsonl.'],
    [['a.png', 'b.png'], 'Name one picture, not 2; many pictures go with --cases.'],
    [
      ['a.png', '--wavelength-nm', 'red', '--distance-mm', '1', '--pixel-um', '1'],
      '--wavelength-nm must be a number, not "red".',
    ],
    [
      ['a.png', '--wavelength-nm', '2', '--distance-mm', '100', '--pixel-um', '5'],
      'The wavelength must lie between 150 nm and 15 000 nm.',
    ],
    [['--cases', 'c.jsonl', '--threads', '0'], '--threads must be a whole number from 1 to 64, not 0.'],
    [['--colour'], "Unknown option '--colour'"],
  ])('refuses %j with a sentence and exit code 2', async (given, sentence) => {
    const { code, stderr, stdout } = await identify(...given);
    expect(code).toBe(2);
    expect(stderr).toContain(sentence);
    expect(stdout).toBe('');
  });

  it('ends with code 1 and the reason when the picture cannot be decoded', async () => {
    const { code, stderr } = await identify(join(folder, 'broken.png'), ...words());
    expect(code).toBe(1);
    expect(stderr).toMatch(/^The picture could not be identified: .+\.$/m);
  });
});

describe('the command for many pictures', () => {
  it('answers every line in order, files relative to the cases, and goes on after one that fails', async () => {
    const bench = {
      setup: {
        geometry: 'lens',
        wavelengthNm: 632.8,
        wavelengthUNm: 0.1,
        distanceMm: setup.distance.value * 1e3,
        distanceUMm: 0.5,
        pixelPitchUm: 5.2,
        pixelPitchUUm: 0.005,
      },
      encoding: 'linear',
      bitDepth: 12,
      darkLevel: 64,
    };
    const lines = [
      JSON.stringify({ id: 'missing', file: 'nowhere.png', ...bench }),
      'no json',
      JSON.stringify({ id: 'slot', file: 'slot.png', ...bench }),
      JSON.stringify({ id: 'odd', file: 'slot.png', ...bench, setup: { geometry: 'mirror' } }),
    ];
    await writeFile(join(folder, 'cases.jsonl'), `${lines.join('\n')}\n`);
    const out = join(folder, 'predictions.jsonl');
    const { code, stderr } = await identify(
      ...['--cases', join(folder, 'cases.jsonl'), '--out', out, '--threads', '2'],
    );
    expect(code).toBe(0);
    expect(stderr).toContain('4 cases answered, 3 of them with an error.');
    const answers = (await readFile(out, 'utf8'))
      .trim()
      .split('\n')
      .map((line) => JSON.parse(line) as Record<string, unknown> & { ranked: Record<string, unknown>[] });
    expect(answers.map((a) => a['id'])).toEqual(['missing', 'line-2', 'slot', 'odd']);
    expect(answers.map((a) => typeof a['error'])).toEqual(['string', 'string', 'undefined', 'string']);
    for (const answer of answers) {
      expect(['identified', 'ambiguous', 'unidentified']).toContain(answer['verdict']);
      expect(typeof answer['farField']).toBe('boolean');
      expect(typeof answer['elapsedMs']).toBe('number');
    }
    const [best] = answers[2].ranked;
    expect(Object.keys(best['params'] as object)).toEqual(['lengthUm', 'widthUm']);
    expect(Object.keys(best['standardUncertainty'] as object)).toEqual([
      'lengthUm',
      'widthUm',
      'orientationDeg',
    ]);
    expect(best['orientationDeg']).toBeCloseTo((0.6 * 180) / Math.PI, 0);
    expect(answers[2]['centerPx']).toEqual([expect.closeTo(123.3, 1), expect.closeTo(97.3, 1)]);
  });
});
