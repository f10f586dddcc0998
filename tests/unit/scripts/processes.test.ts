import { mkdtempSync, readdirSync, readFileSync, readlinkSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { Processes } from '@/scripts/lib/processes';
import { until } from '../../support/processes';

const folder = mkdtempSync(join(tmpdir(), 'fallbright-parts-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const openLogs = () =>
  readdirSync('/proc/self/fd').filter((fd) => {
    try {
      return readlinkSync(`/proc/self/fd/${fd}`).startsWith(folder);
    } catch {
      return false;
    }
  });

describe('the parts of the house', () => {
  it('write into their logs, are started again when they die, and leave no file open behind', async () => {
    const said: string[] = [];
    const processes = new Processes(folder, (sentence) => said.push(sentence));
    processes.start({ name: 'faint', args: ['-e', 'console.log("awake"); process.exit(3)'] });
    await until('a second life', () => (readFileSync(join(folder, 'faint.log'), 'utf8').match(/awake/g)?.length ?? 0) >= 2);
    await processes.stop();
    expect(said[0]).toContain('faint ended (3); starting it again in 1 s.');
    expect(openLogs()).toEqual([]);
  });
});
