import { mkdtempSync, readdirSync, readFileSync, readlinkSync, rmSync, statSync, truncateSync, writeFileSync } from 'node:fs';
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

  it('begin a new log where their last one has grown large, and keep that one alone beside it', async () => {
    const log = join(folder, 'talker.log');
    writeFileSync(`${log}.1`, 'from long ago');
    writeFileSync(log, '');
    truncateSync(log, 10_000_001);
    const processes = new Processes(folder, () => undefined);
    processes.start({ name: 'talker', args: ['-e', 'console.log("awake"); setInterval(() => undefined, 1000)'] });
    await until('a new log', () => readFileSync(log, 'utf8') === 'awake\n');
    await processes.stop();
    expect(statSync(`${log}.1`).size).toBe(10_000_001);
    expect(readdirSync(folder).filter((name) => name.startsWith('talker'))).toHaveLength(2);
  });
});
