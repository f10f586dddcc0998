import { spawn } from 'node:child_process';
import { chmodSync, existsSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { Client } from 'pg';
import { afterAll, describe, expect, it } from 'vitest';
import { freePort, startCluster } from '@/scripts/lib/postgres';
import { until } from '../support/processes';

const ROOT = resolve(import.meta.dirname, '../..');
const folder = mkdtempSync(join(tmpdir(), 'fallbright-cluster-'));
// As root the server runs as another user, who has to reach it.
chmodSync(folder, 0o755);
afterAll(() => rmSync(folder, { recursive: true, force: true }));

describe('the PostgreSQL that start manages', () => {
  it('comes up after a power cut while it was being made', async () => {
    const place = join(folder, 'postgres');
    const port = await freePort(24_000);
    const program = `const { startCluster } = await import(${JSON.stringify(join(ROOT, 'scripts/lib/postgres.ts'))}); await startCluster(${JSON.stringify(place)}, ${port});`;
    const first = spawn(process.execPath, ['--import', 'tsx', '--input-type=module', '-e', program], { cwd: ROOT, stdio: 'ignore', detached: true });
    const ended = new Promise((done) => first.on('exit', done));
    await until('the half of it', () => ['data', 'data.making'].some((name) => existsSync(join(place, name, 'PG_VERSION'))));
    process.kill(-first.pid!, 'SIGKILL');
    await ended;

    const cluster = await startCluster(place, port);
    try {
      const client = new Client({ connectionString: cluster.url });
      await client.connect();
      expect((await client.query('select 1 as one')).rows).toEqual([{ one: 1 }]);
      await client.end();
    } finally {
      await cluster.stop('immediate');
    }
  });
});
