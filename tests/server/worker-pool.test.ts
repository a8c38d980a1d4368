import { mkdir, mkdtemp, rm } from 'node:fs/promises';
import { join, resolve } from 'node:path';
import { build } from 'esbuild';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { EnginePool } from '#server/workers/engine-pool.ts';
import { inlineEngine } from '#server/workers/inline-engine.ts';
import { createWorkerPool } from '#server/workers/worker-pool.ts';
import { benchDraft, pinholePicture } from '#tests/support/specimens.ts';

const { bytes, name } = pinholePicture(55);
const never = new AbortController().signal;
const ignore = () => undefined;
let folder: string;
let worker: string;
let pool: EnginePool;

beforeAll(async () => {
  // Inside the project, so that the bundle finds its packages.
  await mkdir('.cache', { recursive: true });
  folder = await mkdtemp(join('.cache', 'worker-'));
  worker = resolve(folder, 'identify.worker.js');
  await build({
    entryPoints: ['server/workers/identify.worker.ts'],
    outfile: worker,
    bundle: true,
    packages: 'external',
    platform: 'node',
    format: 'esm',
    target: 'node20',
  });
  pool = createWorkerPool(worker);
});

afterAll(async () => {
  await pool.close();
  await rm(folder, { recursive: true, force: true });
});

describe('the engine in worker threads', () => {
  it('answers what it answers on the calling thread', async () => {
    const inline = inlineEngine();
    expect(await pool.inspect(bytes, name, benchDraft)).toEqual(
      await inline.inspect(bytes, name, benchDraft),
    );
    expect(await pool.pixels(bytes)).toEqual(await inline.pixels(bytes));
    const center = { x: 100, y: 90, u: 0.5 };
    expect(await pool.thumbnail(bytes, center)).toEqual(await inline.thumbnail(bytes, center));
    expect(await pool.identify(bytes, benchDraft, ignore, never)).toEqual(
      await inline.identify(bytes, benchDraft, ignore, never),
    );
  });

  it('tells its progress, which never falls', async () => {
    const shares: number[] = [];
    await pool.identify(bytes, benchDraft, (_step, share) => shares.push(share), never);
    expect(shares.length).toBeGreaterThan(3);
    expect(shares).toEqual([...shares].sort((a, b) => a - b));
  });

  it('hands a refusal on with its code and sentence', async () => {
    await expect(pool.inspect(Buffer.from('GIF89a'), 'a.gif', benchDraft)).rejects.toMatchObject({
      name: 'Refusal',
      code: 'not-a-picture',
      message: expect.stringMatching(/GIF/),
    });
  });

  it('stops an identification on request and goes on working', async () => {
    const controller = new AbortController();
    const run = pool.identify(bytes, benchDraft, () => controller.abort(), controller.signal);
    await expect(run).rejects.toMatchObject({ name: 'AbortError' });
    expect((await pool.inspect(bytes, name, benchDraft)).unusable).toEqual([]);
  });

  it('ends a run that takes too long with a sentence', async () => {
    const hasty = createWorkerPool(worker, { limit: 1 });
    await expect(hasty.identify(bytes, benchDraft, ignore, never)).rejects.toMatchObject({
      code: 'identification-crashed',
      message: expect.stringMatching(/Crop the picture/),
    });
    await hasty.close();
  });

  it('breaks off what is at work when it closes', async () => {
    const closing = createWorkerPool(worker);
    const run = closing.identify(bytes, benchDraft, () => void closing.close(), never);
    await expect(run).rejects.toThrow();
  });
});
