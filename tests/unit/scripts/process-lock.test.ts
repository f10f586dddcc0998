import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { resolve } from 'node:path';
import { describe, expect, it } from 'vitest';
import { until } from '../../support/processes';
import { takeLock } from '@/scripts/lib/process-lock';

const named = (what: string) => `${what} ${process.pid}`;
const HOLDER = `
const { takeLock } = await import(process.env.LOCK_MODULE);
console.log((await takeLock(process.env.LOCK_NAME)) ? 'held' : 'refused');
setInterval(() => undefined, 1_000);
`;

describe('a lock between processes', () => {
  it('is held by one until it is given back', async () => {
    const lock = await takeLock(named('one'));
    expect(lock).not.toBeNull();
    expect(await takeLock(named('one'))).toBeNull();
    const other = await takeLock(named('other'));
    expect(other).not.toBeNull();
    await lock!.free();
    const again = await takeLock(named('one'));
    expect(again).not.toBeNull();
    await Promise.all([again!.free(), other!.free()]);
  });

  it('goes to one of many who ask at once', async () => {
    const taken = (await Promise.all(Array.from({ length: 20 }, () => takeLock(named('many'))))).filter((lock) => lock !== null);
    expect(taken).toHaveLength(1);
    await taken[0]!.free();
  });

  it('is held against other processes, and is free once its holder was killed', async () => {
    const child = spawn(process.execPath, ['--import', 'tsx', '--input-type=module', '-e', HOLDER], {
      cwd: resolve(import.meta.dirname, '../../..'),
      env: { ...process.env, LOCK_MODULE: resolve(import.meta.dirname, '../../../scripts/lib/process-lock.ts'), LOCK_NAME: named('killed') },
      stdio: ['ignore', 'pipe', 'inherit'],
    });
    try {
      const [said] = (await once(child.stdout, 'data')) as [Buffer];
      expect(said.toString().trim()).toBe('held');
      expect(await takeLock(named('killed'))).toBeNull();
    } finally {
      child.kill('SIGKILL');
    }
    const lock = await until('the dead holder’s lock', () => takeLock(named('killed')));
    await lock.free();
  });
});
