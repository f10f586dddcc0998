import '@/lib/config/dot-env';
import { resolve } from 'node:path';
import { EnvError } from '@/lib/config/env';
import { systemClock } from '@/lib/clock';
import { backup, BackupError } from './lib/backup';
import { openHouse } from './lib/house';

/** `npm run backup -- FILE`: the whole of it in one file, while people work. */
const [file] = process.argv.slice(2).filter((given) => !given.startsWith('-'));
if (!file) {
  process.stderr.write('Say where to write it: npm run backup -- FILE\n');
  process.exit(2);
}
try {
  const house = await openHouse();
  try {
    const manifest = await backup(house, resolve(file), new Date(systemClock.now()));
    process.stdout.write(`Kept in ${file}: the database, ${manifest.uploads.length} files of photos${manifest.house_files.length > 0 ? ', and the secret that signs links: keep the file as safe as a password' : ''}.\n`);
  } finally {
    await house.close();
  }
} catch (error) {
  if (!(error instanceof BackupError || error instanceof EnvError)) throw error;
  process.stderr.write(`${error.message}\n`);
  process.exitCode = 1;
}
