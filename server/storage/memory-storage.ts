import { sha256 } from '#server/storage/disk-storage.ts';
import type { PictureStorage } from '#server/storage/storage.ts';

/** Pictures in memory, for tests. */
export function memoryStorage(): PictureStorage {
  const kept = new Map<string, Uint8Array>();
  return {
    async put(bytes) {
      const key = sha256(bytes);
      kept.set(key, Uint8Array.from(bytes));
      return key;
    },
    async find(key) {
      return kept.get(key);
    },
  };
}
