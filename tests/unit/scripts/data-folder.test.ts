import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { makeDataFolder, takeDataFolder } from '@/scripts/lib/data-folder';

const home = mkdtempSync(join(tmpdir(), 'fallbright-folder-'));
afterAll(() => rmSync(home, { recursive: true, force: true }));

describe('the data folder', () => {
  it('is made with those above it, once', () => {
    const folder = join(home, 'a/b/c');
    makeDataFolder(folder);
    makeDataFolder(folder);
    expect(existsSync(folder)).toBe(true);
  });

  it.each(['/proc/nowhere/data', '/proc/1/a/b', '/dev/null/data', join(home, 'file/data'), join(home, 'file')])('is refused by a sentence where it cannot be: %s', async (folder) => {
    writeFileSync(join(home, 'file'), '');
    expect(() => makeDataFolder(folder)).toThrow(/^The variable DATA_DIR names a folder \(.+\) that cannot be made or written in: .+\. Name another one\.$/);
    await expect(takeDataFolder(folder)).rejects.toThrow('DATA_DIR');
  });

  it('is one start’s of many that begin at once, whatever an earlier one left, and free again after it', async () => {
    const folder = join(home, 'taken');
    makeDataFolder(folder);
    writeFileSync(join(folder, 'start.pid'), '');
    const starts = await Promise.allSettled(Array.from({ length: 10 }, () => takeDataFolder(folder)));
    const taken = starts.filter((start) => start.status === 'fulfilled');
    expect(taken).toHaveLength(1);
    expect(starts.filter((start) => start.status === 'rejected').map(({ reason }) => String((reason as Error).message))).toEqual(Array(9).fill(expect.stringMatching(/^Fallbright already runs on .+\. Stop it first, or set DATA_DIR to another folder\.$/)));
    expect(readFileSync(join(folder, 'start.pid'), 'utf8')).toBe(String(process.pid));
    await taken[0]!.value();
    const next = await takeDataFolder(folder);
    await next();
    expect(existsSync(join(folder, 'start.pid'))).toBe(false);
  });
});
