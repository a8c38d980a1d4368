import { mkdir, readFile, rm, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import lockfile from 'proper-lockfile';

/** Another process holds the data folder. */
export class FolderInUse extends Error {}

/**
 * Takes the data folder for this process alone: two processes on one embedded database would destroy it. A lock whose
 * process is dead is taken over at once. Answers the release. Throws `FolderInUse` while another process lives.
 */
export async function lockDataFolder(folder: string): Promise<() => Promise<void>> {
  await mkdir(folder, { recursive: true });
  const ownerFile = join(folder, 'owner.json');
  const lockDir = join(folder, 'owner.lock');
  const options = {
    lockfilePath: lockDir,
    stale: 60_000,
    update: 10_000,
    realpath: false,
    onCompromised: () => undefined,
  };
  for (let attempt = 0; ; attempt++) {
    try {
      const release = await lockfile.lock(folder, options);
      await writeFile(ownerFile, JSON.stringify({ pid: process.pid, since: new Date().toISOString() }));
      return async () => {
        await rm(ownerFile, { force: true });
        await release();
      };
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== 'ELOCKED') throw error;
      const owner = await readOwner(ownerFile);
      // A process killed between lock and record leaves no owner; a moment later that is certain.
      if (attempt < 20 && (owner === undefined || !isAlive(owner.pid))) {
        if (owner !== undefined || attempt >= 10) await rm(lockDir, { recursive: true, force: true });
        else await new Promise((resolve) => setTimeout(resolve, 100));
        continue;
      }
      throw new FolderInUse(
        `The data folder ${folder} is in use by process ${owner?.pid ?? 'unknown'}${owner ? ` since ${owner.since}` : ''}. ` +
          'Stop that process first, or set DATA_DIR to another folder.',
      );
    }
  }
}

async function readOwner(file: string): Promise<{ pid: number; since: string } | undefined> {
  try {
    return JSON.parse(await readFile(file, 'utf8')) as { pid: number; since: string };
  } catch {
    return undefined;
  }
}

function isAlive(pid: number): boolean {
  if (pid === process.pid) return false;
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return (error as NodeJS.ErrnoException).code === 'EPERM';
  }
}
