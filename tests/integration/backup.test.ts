import { execFile } from 'node:child_process';
import { createHash } from 'node:crypto';
import { mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Client } from 'pg';
import { forgetEnv } from '@/lib/config/env';
import { forgetObjectStore, objectStore } from '@/lib/storage/objects';
import { photoKey } from '@/lib/services/photos/address';
import { keepPhoto } from '@/lib/services/photos/keep';
import { backup, restore } from '@/scripts/lib/backup';
import { freePort, startCluster, type Cluster } from '@/scripts/lib/postgres';
import { startLocalStorage, type LocalStorage } from '@/scripts/lib/storage';
import { useDatabase } from '../support/database';
import { buildBatch, buildEntry, buildMember, buildSensor, writeReadings } from '../support/factories';
import { useObjectStore } from '../support/object-store';

const run = promisify(execFile);
const db = useDatabase();
useObjectStore();
process.env.AUTH_SECRET ??= 'a secret of the tests, long enough to be one';

/** Every row of every table, as one fingerprint a table. */
async function fingerprints(url: string): Promise<Record<string, string>> {
  const client = new Client({ connectionString: url });
  await client.connect();
  const { rows: tables } = await client.query<{ name: string }>(`select c.relname as name from pg_class c join pg_namespace n on n.oid = c.relnamespace where n.nspname = 'public' and c.relkind in ('r', 'p') and not c.relispartition order by 1`);
  const result: Record<string, string> = {};
  for (const { name } of tables) {
    const { rows } = await client.query<{ line: string }>(`select t::text as line from "${name}" t`);
    result[name] = `${rows.length} ${createHash('sha256').update(rows.map((row) => row.line).sort().join('\n')).digest('hex')}`;
  }
  await client.end();
  return result;
}

describe('a backup', () => {
  const folder = mkdtempSync(join(tmpdir(), 'fb-backup-'));
  const file = join(folder, 'house.fbackup');
  let cluster: Cluster;
  let empty: string;
  let photo: { cellarId: string; id: string };

  beforeAll(async () => {
    const actor = await buildMember('keeper', { name: 'Ōlïve “the 2nd”; --' });
    const batch = await buildBatch({ cellarId: actor.cellarId, pitchedAt: new Date(Date.UTC(2026, 0, 1)) });
    const { sensor } = await buildSensor({ batch });
    await writeReadings(sensor.id, Array.from({ length: 3_000 }, (_, index) => ({ at: Date.UTC(2026, 0, 1) + index * 900_000, gravity: 1.05 - index * 1e-5 })));
    const entry = await buildEntry(batch, { text: 'Line\nbreak, "quotes" and \\ backslash' });
    const picture = await sharp({ create: { width: 200, height: 100, channels: 3, background: '#555' } }).jpeg().toBuffer();
    photo = { cellarId: actor.cellarId, id: (await keepPhoto(actor, { entry: entry.id }, picture)).id };

    cluster = await startCluster(join(folder, 'postgres'), await freePort(22_000));
    const client = new Client({ connectionString: cluster.url });
    await client.connect();
    await client.query('create database fallbright');
    await client.end();
    const url = new URL(cluster.url);
    url.pathname = '/fallbright';
    empty = url.toString();
  }, 120_000);
  afterAll(async () => {
    await cluster?.stop('immediate');
    rmSync(folder, { recursive: true, force: true });
  });

  const newPlace = async (storage: LocalStorage, databaseUrl = empty) => {
    process.env.S3_PORT = String(storage.port);
    forgetEnv();
    forgetObjectStore();
    const kept: Record<string, string> = {};
    return { databaseUrl, store: objectStore(), kept, keepHouseFile: async (name: string, text: string) => void (kept[name] = text) };
  };

  it('holds every row and every file, and an empty cluster has all of them after a restore', async () => {
    const before = await fingerprints(db.url);
    const manifest = await backup({ databaseUrl: db.url, store: objectStore(), houseFiles: { 'auth.secret': 'kept with it' } }, file, new Date());
    expect(manifest.uploads).toHaveLength(2);
    const original = await objectStore().get(photoKey(photo.cellarId, photo.id, 'large'));

    const storage = await startLocalStorage({ directory: join(folder, 'uploads'), port: 0, bucket: 'fallbright' });
    const place = await newPlace(storage);
    await restore(place, file);
    expect(await fingerprints(empty)).toEqual(before);
    expect(Object.keys(before).length).toBeGreaterThan(30);
    expect(before.readings).toMatch(/^3000 /);
    expect(Buffer.from((await place.store.get(photoKey(photo.cellarId, photo.id, 'large')))!)).toEqual(Buffer.from(original!));
    expect(place.kept).toEqual({ 'auth.secret': 'kept with it' });
    await storage.close();
  }, 120_000);

  it('is a file that only its owner reads, since it holds secrets', () => {
    expect(statSync(file).mode & 0o077).toBe(0);
  });

  it('does not go over people who are there already unless told', async () => {
    const storage = await startLocalStorage({ directory: join(folder, 'uploads'), port: 0, bucket: 'fallbright' });
    const place = await newPlace(storage);
    await expect(restore(place, file)).rejects.toThrow('Say --over');
    const before = await fingerprints(empty);
    await restore(place, file, { over: true });
    expect(await fingerprints(empty)).toEqual(before);
    await storage.close();
  }, 120_000);

  it('does not touch a database that is in use', async () => {
    const storage = await startLocalStorage({ directory: join(folder, 'uploads'), port: 0, bucket: 'fallbright' });
    const place = await newPlace(storage);
    const client = new Client({ connectionString: empty });
    await client.connect();
    await expect(restore(place, file, { over: true })).rejects.toThrow('Stop Fallbright first');
    await client.end();
    await storage.close();
  });

  it('changes nothing where it is damaged, or is something else', async () => {
    const storage = await startLocalStorage({ directory: join(folder, 'uploads'), port: 0, bucket: 'fallbright' });
    const place = await newPlace(storage);
    const before = await fingerprints(empty);
    const bytes = readFileSync(file);
    const damaged = join(folder, 'damaged');
    const spoilt = Buffer.from(bytes);
    const at = spoilt.indexOf('PGDMP');
    spoilt.fill(0x5a, at + 200, at + 400);
    writeFileSync(damaged, spoilt);
    await expect(restore(place, damaged, { over: true })).rejects.toThrow('damaged');
    writeFileSync(damaged, 'no archive at all');
    await expect(restore(place, damaged, { over: true })).rejects.toThrow('no backup of Fallbright');
    writeFileSync(join(folder, 'manifest.json'), '{"format":2}');
    await run('tar', ['-cf', damaged, '-C', folder, 'manifest.json']);
    await expect(restore(place, damaged, { over: true })).rejects.toThrow('no backup of Fallbright');
    await expect(restore(place, join(folder, 'nowhere'), { over: true })).rejects.toThrow('There is no file');
    expect(await fingerprints(empty)).toEqual(before);
    await storage.close();
  }, 120_000);

  it('leaves what was there where the dump cannot be put in', async () => {
    const storage = await startLocalStorage({ directory: join(folder, 'uploads'), port: 0, bucket: 'fallbright' });
    const place = await newPlace(storage);
    const before = await fingerprints(empty);
    // A dump that is whole by its fingerprint, and nonsense to PostgreSQL.
    const stage = mkdtempSync(join(folder, 'stage-'));
    writeFileSync(join(stage, 'database.dump'), 'PGDMP but no more');
    const manifest = { format: 1, made_at: new Date().toISOString(), migrations: [], database_sha256: createHash('sha256').update('PGDMP but no more').digest('hex'), uploads: [], house_files: [] };
    writeFileSync(join(stage, 'manifest.json'), JSON.stringify(manifest));
    const archive = join(folder, 'nonsense');
    await run('tar', ['-cf', archive, '-C', stage, '.']);
    await expect(restore(place, archive, { over: true })).rejects.toThrow('pg_restore');
    expect(await fingerprints(empty)).toEqual(before);
    await storage.close();
  }, 120_000);
});
