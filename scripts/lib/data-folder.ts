import { mkdirSync, readFileSync, realpathSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { EnvError } from '@/lib/config/env';
import { takeLock } from './process-lock';

/** Node's own way to make a folder with those above it never comes back where the system has none to give, as below /proc. */
function makeFolder(folder: string): void {
  if (statSync(folder, { throwIfNoEntry: false })?.isDirectory()) return;
  if (dirname(folder) !== folder) makeFolder(dirname(folder));
  try {
    mkdirSync(folder);
  } catch (error) {
    // Somebody else may have made it just now.
    if (!statSync(folder, { throwIfNoEntry: false })?.isDirectory()) throw error;
  }
}

/** @throws EnvError where `work` on the folder fails: it cannot be made, or is full or another person's. */
function inFolder<T>(folder: string, work: () => T): T {
  try {
    return work();
  } catch (error) {
    throw new EnvError(`The variable DATA_DIR names a folder (${folder}) that cannot be made or written in: ${(error as Error).message}. Name another one.`);
  }
}

/** Makes the data folder where it is missing. */
export function makeDataFolder(folder: string): void {
  inFolder(folder, () => makeFolder(folder));
}

/**
 * Makes the data folder and takes it: one start at a time.
 * @returns what gives it back; so does the end of the process
 * @throws EnvError where it cannot be used, or another start has it
 */
export async function takeDataFolder(folder: string): Promise<() => Promise<void>> {
  makeDataFolder(folder);
  const file = join(folder, 'start.pid');
  const lock = await takeLock(`the data folder ${realpathSync(folder)}`);
  if (!lock) throw new EnvError(`Fallbright already runs on ${folder}${holderIn(file)}. Stop it first, or set DATA_DIR to another folder.`);
  inFolder(folder, () => writeFileSync(file, String(process.pid)));
  return async () => {
    rmSync(file, { force: true });
    await lock.free();
  };
}

/** Who has the folder; one that has only just taken it may not have written it down. */
function holderIn(file: string): string {
  try {
    return ` (process ${readFileSync(file, 'utf8')})`;
  } catch {
    return '';
  }
}
