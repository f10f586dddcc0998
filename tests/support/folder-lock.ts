import { mkdtemp, readFile, rename, rm, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { runs } from './processes';

const alive = (pid: number) => pid > 0 && runs(pid);
const holderOf = async (folder: string) => Number(await readFile(join(folder, 'pid'), 'utf8').catch(() => NaN));

/**
 * Tries to take a lock: a folder that holds its holder's pid. It comes to its
 * place by a rename, pid and all, which fails while another stands there and
 * takes the place of an empty one: a holder killed at any moment leaves either
 * a pid that runs no more or nothing to wait for. One that a dead process left
 * is cleared for the next try.
 */
export async function takeLock(lock: string, pid = process.pid): Promise<boolean> {
  const made = await mkdtemp(`${lock}-`);
  await writeFile(join(made, 'pid'), String(pid));
  try {
    await rename(made, lock);
    return true;
  } catch {
    await rm(made, { recursive: true, force: true });
  }
  const holder = await holderOf(lock);
  if (!alive(holder)) await clear(lock, holder);
  return false;
}

/** Puts a dead holder's lock away. Somebody may have taken it over meanwhile: what is put away is looked at, and put back where its holder lives. */
async function clear(lock: string, dead: number): Promise<void> {
  const away = await mkdtemp(`${lock}-`);
  try {
    await rename(lock, away);
    const holder = await holderOf(away);
    if (holder !== dead && alive(holder)) await rename(away, lock);
  } catch {
    // Gone already, or taken again: the next try sees how it stands.
  }
  await rm(away, { recursive: true, force: true });
}

export const freeLock = (lock: string) => rm(lock, { recursive: true, force: true });
