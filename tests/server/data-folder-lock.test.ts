import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { mkdir, mkdtemp, readdir, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { DataInUse, lockDataFolder } from '#server/db/data-folder-lock.ts';

let folder: string;
beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), 'fringeward-lock-'));
});
afterEach(() => rm(folder, { recursive: true, force: true }));

const owner = (value: object) => writeFile(join(folder, 'owner.json'), JSON.stringify(value));
const since = '2026-01-01T00:00:00.000Z';

async function deadProcess(): Promise<number> {
  const child = spawn(process.execPath, ['-e', '']);
  await once(child, 'exit');
  return child.pid!;
}

describe('the data folder', () => {
  it('is held by one, who is named to the next, until it is released', async () => {
    const release = await lockDataFolder(folder);
    const refused = lockDataFolder(folder);
    await expect(refused).rejects.toThrow(DataInUse);
    await expect(refused).rejects.toThrow(
      `The data folder ${folder} is in use by process ${process.pid} since`,
    );
    await release();
    await (
      await lockDataFolder(folder)
    )();
    expect(await readdir(folder)).toEqual([]);
  });

  it('is taken over at once from a process that is dead', async () => {
    await mkdir(join(folder, 'owner.lock'));
    await owner({ pid: await deadProcess(), began: '1', since });
    await (
      await lockDataFolder(folder)
    )();
  });

  it('is taken over from a dead process whose number another one has now', async () => {
    await mkdir(join(folder, 'owner.lock'));
    // This very process, said to have begun at another time.
    await owner({ pid: process.pid, began: '1', since });
    await (
      await lockDataFolder(folder)
    )();
  });

  it('is taken over from a process that was killed before it wrote its name', async () => {
    await mkdir(join(folder, 'owner.lock'));
    await (
      await lockDataFolder(folder)
    )();
  });

  it('is taken over although the one who took it over before was killed while doing so', async () => {
    await mkdir(join(folder, 'owner.lock'));
    await mkdir(join(folder, 'owner.takeover'));
    await owner({ pid: await deadProcess(), began: '1', since });
    await (
      await lockDataFolder(folder)
    )();
  });

  it('goes to one of many who want it from a dead process at the same moment', async () => {
    await mkdir(join(folder, 'owner.lock'));
    await owner({ pid: await deadProcess(), began: '1', since });
    const results = await Promise.allSettled(Array.from({ length: 12 }, () => lockDataFolder(folder)));
    expect(results.filter((r) => r.status === 'fulfilled')).toHaveLength(1);
    for (const r of results) if (r.status === 'rejected') expect(r.reason).toBeInstanceOf(DataInUse);
    for (const r of results) if (r.status === 'fulfilled') await r.value();
  });
});
