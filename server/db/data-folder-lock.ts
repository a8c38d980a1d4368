import { mkdir, readFile, rename, rm, stat, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import lockfile from 'proper-lockfile';

/** Another process holds the data folder (or the database). */
export class DataInUse extends Error {}

interface Owner {
  readonly pid: number;
  /** When the process began, in the kernel's count: tells it from a later process of the same number. */
  readonly began: string | null;
  readonly since: string;
}

/**
 * Takes the data folder for this process alone: two processes on one embedded database would destroy it. A lock whose
 * process is dead is taken over at once. Answers the release. Throws `DataInUse` while another process lives.
 */
export async function lockDataFolder(folder: string): Promise<() => Promise<void>> {
  const paths = {
    owner: join(folder, 'owner.json'),
    lock: join(folder, 'owner.lock'),
    takeover: join(folder, 'owner.takeover'),
  };
  const options = {
    lockfilePath: paths.lock,
    // Dead owners are known by their process, so age says nothing here.
    stale: 24 * 3600_000,
    update: 60_000,
    realpath: false,
    onCompromised: () => undefined,
  };
  let unnamed = 0;
  for (;;) {
    try {
      const release = await lockfile.lock(folder, options);
      await writeOwner(paths.owner);
      return async () => {
        await rm(paths.owner, { force: true });
        await release();
      };
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== 'ELOCKED') throw error;
    }
    const owner = await readOwner(paths.owner);
    if (owner && (await isAlive(owner)))
      throw new DataInUse(
        `The data folder ${folder} is in use by process ${owner.pid} since ${owner.since}. ` +
          'Stop that process first, or set DATA_DIR to another folder.',
      );
    // A process killed between the lock and its name leaves none; a moment later that is certain.
    if (owner || ++unnamed > 30) {
      await takeOver(paths, owner);
      unnamed = 0;
    }
    await sleep(100);
  }
}

/** Removes a dead process's lock; of several who want to, one does, so that nobody removes the next one's. */
async function takeOver(
  paths: { owner: string; lock: string; takeover: string },
  dead: Owner | undefined,
): Promise<void> {
  try {
    await mkdir(paths.takeover);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error;
    const begun = (await stat(paths.takeover).catch(() => undefined))?.mtimeMs ?? Date.now();
    if (Date.now() - begun > 5000) await rm(paths.takeover, { recursive: true, force: true });
    return;
  }
  try {
    const owner = await readOwner(paths.owner);
    if (owner?.pid !== dead?.pid || owner?.since !== dead?.since) return;
    await rm(paths.owner, { force: true });
    await rm(paths.lock, { recursive: true, force: true });
  } finally {
    await rm(paths.takeover, { recursive: true, force: true });
  }
}

async function writeOwner(file: string): Promise<void> {
  const owner: Owner = {
    pid: process.pid,
    began: (await statusOf(process.pid))?.began ?? null,
    since: new Date().toISOString(),
  };
  await writeFile(`${file}.new`, JSON.stringify(owner));
  await rename(`${file}.new`, file);
}

async function readOwner(file: string): Promise<Owner | undefined> {
  try {
    return JSON.parse(await readFile(file, 'utf8')) as Owner;
  } catch {
    return undefined;
  }
}

async function isAlive(owner: Owner): Promise<boolean> {
  try {
    process.kill(owner.pid, 0);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'EPERM') return false;
  }
  const fields = await statusOf(owner.pid);
  // A process that was killed and whose parent has not asked for it yet is dead all the same.
  if (fields?.state === 'Z' || fields?.state === 'X') return false;
  return owner.began === null || fields === null || fields.began === owner.began;
}

/** Fields 3 and 22 of Linux's `/proc/<pid>/stat`; null where there is no such file. */
async function statusOf(pid: number): Promise<{ state: string; began: string } | null> {
  try {
    const line = await readFile(`/proc/${pid}/stat`, 'utf8');
    const fields = line.slice(line.lastIndexOf(')') + 2).split(' ');
    return { state: fields[0], began: fields[19] };
  } catch {
    return null;
  }
}
