import { Client } from 'pg';

async function asAdmin(url: string, sql: string): Promise<void> {
  const client = new Client({ connectionString: url });
  await client.connect();
  try {
    await client.query(sql);
  } finally {
    await client.end();
  }
}

/** The same server, another database. */
export function withDatabase(url: string, name: string): string {
  const changed = new URL(url);
  changed.pathname = `/${name}`;
  return changed.toString();
}

/** Makes a database (a copy of `template` where named) and returns its address. */
export async function createDatabase(url: string, name: string, template?: string): Promise<string> {
  await asAdmin(url, `drop database if exists "${name}" with (force)`);
  await asAdmin(url, `create database "${name}"${template ? ` template "${template}"` : ''}`);
  return withDatabase(url, name);
}

export function dropDatabase(url: string, name: string): Promise<void> {
  return asAdmin(url, `drop database if exists "${name}" with (force)`);
}
