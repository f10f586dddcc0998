import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { chmod, mkdir, mkdtemp, open, readFile, rename, rm, stat, writeFile } from 'node:fs/promises';
import { dirname, join, relative } from 'node:path';
import { Client } from 'pg';
import { z } from 'zod';
import type { ObjectStore } from '@/lib/storage/objects';
import { postgresBinaries } from './postgres';

/** A sentence for the person at the terminal. */
export class BackupError extends Error {}

export interface Place {
  databaseUrl: string;
  store: ObjectStore;
  /** Small files of the house itself that the rows belong with (the secret that signs), by name. */
  houseFiles: Record<string, string>;
}

const manifestSchema = z.object({
  format: z.literal(1),
  made_at: z.string(),
  migrations: z.array(z.string()),
  database_sha256: z.string(),
  uploads: z.array(z.object({ key: z.string(), bytes: z.number().int() })),
  house_files: z.array(z.string()),
});
export type Manifest = z.infer<typeof manifestSchema>;

/** Keys that this house makes; whatever else an archive names is not written anywhere. */
const UPLOAD_KEY = /^photos\/[0-9a-f-]{36}\/[0-9a-f-]{36}\.(small|large)\.jpg$/;
const HOUSE_FILE = /^[a-z][a-z0-9.-]{1,40}$/;

/** The address goes by environment: a command line is everybody's to read. */
function connectionOf(databaseUrl: string): NodeJS.ProcessEnv {
  const url = new URL(databaseUrl);
  return { ...process.env, PGHOST: url.hostname, PGPORT: url.port || '5432', PGUSER: decodeURIComponent(url.username), PGPASSWORD: decodeURIComponent(url.password), PGDATABASE: decodeURIComponent(url.pathname.slice(1)), PGAPPNAME: 'fallbright-backup' };
}

function run(command: string, args: string[], env: NodeJS.ProcessEnv = process.env): Promise<void> {
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, { env, stdio: ['ignore', 'ignore', 'pipe'] });
    let said = '';
    child.stderr.on('data', (chunk: Buffer) => (said = (said + chunk.toString()).slice(-4_000)));
    child.on('error', reject);
    child.on('exit', (code) => (code === 0 ? resolve() : reject(new BackupError(`${command.split('/').at(-1)} ended with ${code}: ${said.trim() || 'it said nothing'}`))));
  });
}

async function programs(): Promise<{ dump: string; restore: string }> {
  const bin = await postgresBinaries();
  if (!bin) throw new BackupError("PostgreSQL's programs are missing. Install Debian's package `postgresql`, then try again.");
  return { dump: join(bin, 'pg_dump'), restore: join(bin, 'pg_restore') };
}

async function sha256(file: string): Promise<string> {
  const hash = createHash('sha256');
  for await (const chunk of createReadStream(file)) hash.update(chunk as Buffer);
  return hash.digest('hex');
}

async function asked<T>(databaseUrl: string, work: (client: Client) => Promise<T>): Promise<T> {
  const client = new Client({ connectionString: databaseUrl, application_name: 'fallbright-backup' });
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}

/**
 * The whole house in one file: a dump of the database at one moment, the uploads,
 * and the secret that its links are signed with. Nobody waits meanwhile. The file
 * appears under its name when it is whole.
 */
export async function backup(place: Place, file: string, madeAt: Date): Promise<Manifest> {
  const { dump } = await programs();
  await mkdir(dirname(file), { recursive: true });
  const stage = await mkdtemp(join(dirname(file), '.backup-'));
  try {
    await chmod(stage, 0o700);
    await run(dump, ['--format=custom', '--no-owner', '--no-privileges', `--file=${join(stage, 'database.dump')}`], connectionOf(place.databaseUrl));
    const migrations = await asked(place.databaseUrl, async (client) => (await client.query<{ name: string }>('select name from migrations order by name')).rows.map((row) => row.name));

    // After the dump: a photo's files are there before its row, so no row is without them.
    const uploads: Manifest['uploads'] = [];
    for await (const { key } of place.store.list('photos/')) {
      if (!UPLOAD_KEY.test(key)) continue;
      const body = await place.store.get(key);
      if (!body) continue;
      const path = join(stage, 'uploads', key);
      await mkdir(dirname(path), { recursive: true });
      await writeFile(path, body);
      uploads.push({ key, bytes: body.length });
    }
    for (const [name, text] of Object.entries(place.houseFiles)) {
      await mkdir(join(stage, 'house'), { recursive: true });
      await writeFile(join(stage, 'house', name), text, { mode: 0o600 });
    }
    const manifest: Manifest = { format: 1, made_at: madeAt.toISOString(), migrations, database_sha256: await sha256(join(stage, 'database.dump')), uploads, house_files: Object.keys(place.houseFiles) };
    await writeFile(join(stage, 'manifest.json'), JSON.stringify(manifest, null, 2));

    const part = `${file}.part`;
    await run('tar', ['--create', '--file', part, '--directory', stage, '--sort=name', '.']);
    await chmod(part, 0o600);
    const handle = await open(part, 'r');
    await handle.sync();
    await handle.close();
    await rename(part, file);
    return manifest;
  } finally {
    await rm(stage, { recursive: true, force: true });
  }
}

function jsonOf(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}

async function readManifest(stage: string): Promise<Manifest> {
  const text = await readFile(join(stage, 'manifest.json'), 'utf8').catch(() => null);
  const parsed = text === null ? null : manifestSchema.safeParse(jsonOf(text));
  if (!parsed?.success) throw new BackupError('This is no backup of Fallbright, or of a later version than this one.');
  if ((await sha256(join(stage, 'database.dump'))) !== parsed.data.database_sha256) throw new BackupError('The backup is damaged: its database is not the one that was written.');
  return parsed.data;
}

async function refuseWhereInUse(client: Client, over: boolean): Promise<void> {
  const { rows: others } = await client.query(`select 1 from pg_stat_activity where datname = current_database() and pid <> pg_backend_pid() and backend_type = 'client backend' limit 1`);
  if (others.length > 0) throw new BackupError('Something else is connected to this database. Stop Fallbright first, then restore.');
  const { rows: tables } = await client.query<{ people: string | null }>(`select to_regclass('public.people')::text as people`);
  if (tables[0]?.people && !over && (await client.query('select 1 from people limit 1')).rows.length > 0) {
    throw new BackupError('This database holds people already. Say --over to put the backup in its place; what is there now is lost then.');
  }
}

/**
 * Puts a backup in place: all of the database or nothing, then the uploads. What
 * was there before is kept aside until the new one stands.
 */
export async function restore(place: Omit<Place, 'houseFiles'> & { keepHouseFile(name: string, text: string): Promise<void> }, file: string, { over = false } = {}): Promise<Manifest> {
  const { restore: program } = await programs();
  if (!(await stat(file).catch(() => null))?.isFile()) throw new BackupError(`There is no file ${relative(process.cwd(), file) || file}.`);
  const stage = await mkdtemp(join(dirname(file), '.restore-'));
  try {
    await chmod(stage, 0o700);
    await run('tar', ['--extract', '--file', file, '--directory', stage, '--no-same-owner', '--no-same-permissions']).catch(() => {
      throw new BackupError('This is no backup of Fallbright: it cannot be unpacked.');
    });
    const manifest = await readManifest(stage);
    await asked(place.databaseUrl, async (client) => {
      await refuseWhereInUse(client, over);
      await client.query('begin');
      await client.query('drop schema if exists before_restore cascade');
      await client.query('alter schema public rename to before_restore');
      await client.query('create schema public');
      // It is shared by both, and the old schema goes in the end.
      const { rows } = await client.query(`select 1 from pg_extension where extname = 'btree_gist'`);
      if (rows.length > 0) await client.query('alter extension btree_gist set schema public');
      await client.query('commit');
    });
    try {
      await run(program, ['--no-owner', '--no-privileges', '--exit-on-error', '--single-transaction', `--dbname=${new URL(place.databaseUrl).pathname.slice(1)}`, join(stage, 'database.dump')], connectionOf(place.databaseUrl));
    } catch (error) {
      await asked(place.databaseUrl, async (client) => {
        await client.query('begin');
        const { rows } = await client.query(`select 1 from pg_extension where extname = 'btree_gist'`);
        if (rows.length > 0) await client.query('alter extension btree_gist set schema before_restore');
        await client.query('drop schema public cascade');
        await client.query('alter schema before_restore rename to public');
        await client.query('commit');
      });
      throw error;
    }
    await asked(place.databaseUrl, async (client) => {
      await client.query('drop schema before_restore cascade');
      await client.query('analyze');
    });
    for (const { key } of manifest.uploads) if (UPLOAD_KEY.test(key)) await place.store.put(key, await readFile(join(stage, 'uploads', key)), 'image/jpeg');
    for (const name of manifest.house_files) if (HOUSE_FILE.test(name)) await place.keepHouseFile(name, await readFile(join(stage, 'house', name), 'utf8'));
    return manifest;
  } finally {
    await rm(stage, { recursive: true, force: true });
  }
}
