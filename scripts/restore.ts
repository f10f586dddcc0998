import '@/lib/config/dot-env';
import { resolve } from 'node:path';
import { EnvError } from '@/lib/config/env';
import { BackupError, restore } from './lib/backup';
import { openHouse } from './lib/house';

/** `npm run restore -- FILE [--over]`: puts a backup in place; what it replaces has to be named as such. */
const given = process.argv.slice(2);
const [file] = given.filter((argument) => !argument.startsWith('-'));
if (!file) {
  process.stderr.write('Say which file: npm run restore -- FILE [--over]\n');
  process.exit(2);
}
try {
  const house = await openHouse();
  try {
    const manifest = await restore(house, resolve(file), { over: given.includes('--over') });
    process.stdout.write(`Restored what was kept at ${manifest.made_at}: the database and ${manifest.uploads.length} files of photos. Start Fallbright as ever; it brings the tables up to date.\n`);
  } finally {
    await house.close();
  }
} catch (error) {
  if (!(error instanceof BackupError || error instanceof EnvError)) throw error;
  process.stderr.write(`${error.message}\n`);
  process.exitCode = 1;
}
