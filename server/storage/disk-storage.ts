import { createHash, randomUUID } from 'node:crypto';
import { mkdir, open, readFile, rename, rm } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import type { PictureStorage } from '#server/storage/storage.ts';

/** Pictures in a folder, two levels deep by their hash; written beside, flushed, then moved into place. */
export function diskStorage(folder: string): PictureStorage {
  const pathOf = (key: string) => join(folder, key.slice(0, 2), key);
  return {
    async put(bytes) {
      const key = sha256(bytes);
      const path = pathOf(key);
      await mkdir(dirname(path), { recursive: true });
      const draft = `${path}.${randomUUID()}.new`;
      try {
        const file = await open(draft, 'wx');
        try {
          await file.writeFile(bytes);
          await file.sync();
        } finally {
          await file.close();
        }
        await rename(draft, path);
        await syncFolder(dirname(path));
      } catch (error) {
        await rm(draft, { force: true });
        throw error;
      }
      return key;
    },
    async find(key) {
      if (!/^[0-9a-f]{64}$/.test(key)) return undefined;
      let bytes: Uint8Array;
      try {
        bytes = await readFile(pathOf(key));
      } catch (error) {
        if ((error as NodeJS.ErrnoException).code === 'ENOENT') return undefined;
        throw error;
      }
      if (sha256(bytes) !== key) throw new Error(`the stored picture ${key} no longer has its hash`);
      return bytes;
    },
  };
}

export function sha256(bytes: Uint8Array): string {
  return createHash('sha256').update(bytes).digest('hex');
}

/** Makes the new name itself durable. */
async function syncFolder(folder: string): Promise<void> {
  const handle = await open(folder, 'r');
  try {
    await handle.sync();
  } finally {
    await handle.close();
  }
}
