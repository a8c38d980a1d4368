import { createHash } from 'node:crypto';
import { mkdtemp, readdir, rm, stat, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { diskStorage } from '#server/storage/disk-storage.ts';
import { memoryStorage } from '#server/storage/memory-storage.ts';

const bytes = Uint8Array.from({ length: 5000 }, (_, i) => i % 251);
const key = createHash('sha256').update(bytes).digest('hex');

let folder: string;
beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), 'fringeward-storage-'));
});
afterEach(() => rm(folder, { recursive: true }));

describe.each([
  ['on disk', () => diskStorage(folder)],
  ['in memory', () => memoryStorage()],
])('pictures %s', (_, create) => {
  it('are found under the SHA-256 of their bytes, and stored again without a change', async () => {
    const storage = create();
    expect(await storage.put(bytes)).toBe(key);
    expect(await storage.put(bytes)).toBe(key);
    expect(Uint8Array.from((await storage.find(key))!)).toEqual(bytes);
  });

  it('are not found under a key that was never stored', async () => {
    const storage = create();
    expect(await storage.find('0'.repeat(64))).toBeUndefined();
  });

  it('do not change when the caller changes the bytes afterwards', async () => {
    const storage = create();
    const own = Uint8Array.from(bytes);
    await storage.put(own);
    own.fill(0);
    expect(Uint8Array.from((await storage.find(key))!)).toEqual(bytes);
  });
});

describe('pictures on disk', () => {
  const file = () => join(folder, key.slice(0, 2), key);

  it('lie whole in one file each, with nothing half-written beside', async () => {
    const storage = diskStorage(folder);
    await Promise.all(Array.from({ length: 10 }, () => storage.put(bytes)));
    expect(await readdir(join(folder, key.slice(0, 2)))).toEqual([key]);
    expect((await stat(file())).size).toBe(bytes.length);
  });

  it('are not handed out when they no longer have their hash', async () => {
    const storage = diskStorage(folder);
    await storage.put(bytes);
    await writeFile(file(), bytes.slice(0, 100));
    await expect(storage.find(key)).rejects.toThrow('no longer has its hash');
    await storage.put(bytes);
    expect(Uint8Array.from((await storage.find(key))!)).toEqual(bytes);
  });

  it.each(['../secret', `${'0'.repeat(62)}/x`, '', 'A'.repeat(64)])(
    'are not looked for under %j',
    async (wrong) => {
      expect(await diskStorage(folder).find(wrong)).toBeUndefined();
    },
  );
});
