import { spawn } from 'node:child_process';
import { mkdir, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { freeLock, takeLock } from '../../support/folder-lock';

let folder: string;
let lock: string;
beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), 'fallbright-lock-'));
  lock = join(folder, 'build.lock');
});
afterEach(() => rm(folder, { recursive: true, force: true }));

/** A process that has come and gone. */
async function deadPid(): Promise<number> {
  const child = spawn(process.execPath, ['-e', '']);
  await new Promise((done) => child.on('exit', done));
  return child.pid!;
}

describe('the lock of the web build', () => {
  it('is held by one until it is given back', async () => {
    expect(await takeLock(lock)).toBe(true);
    expect(await takeLock(lock)).toBe(false);
    expect(await readFile(join(lock, 'pid'), 'utf8')).toBe(String(process.pid));
    await freeLock(lock);
    expect(await takeLock(lock)).toBe(true);
  });

  it('goes to one of many who ask at once', async () => {
    const taken = await Promise.all(Array.from({ length: 20 }, () => takeLock(lock)));
    expect(taken.filter(Boolean)).toHaveLength(1);
  });

  it('is taken over from a holder that was killed', async () => {
    expect(await takeLock(lock, await deadPid())).toBe(true);
    expect(await takeLock(lock)).toBe(false);
    expect(await takeLock(lock)).toBe(true);
  });

  it('is taken over where the holder was killed before it wrote who it was', async () => {
    await mkdir(lock);
    expect(await takeLock(lock)).toBe(true);
  });

  it('is taken over where what stands in it is no process', async () => {
    await mkdir(lock);
    await writeFile(join(lock, 'pid'), '');
    await takeLock(lock);
    expect(await takeLock(lock)).toBe(true);
  });

  it('goes to one of many who find a dead holder’s, and leaves nothing else behind', async () => {
    await takeLock(lock, await deadPid());
    const rounds = await Promise.all(Array.from({ length: 20 }, async () => (await takeLock(lock)) || takeLock(lock)));
    expect(rounds.filter(Boolean).length).toBeLessThanOrEqual(1);
    expect(rounds.some(Boolean) || (await takeLock(lock))).toBe(true);
    expect(await readdir(folder)).toEqual(['build.lock']);
  });
});
