import '@/lib/config/dot-env';
import { z } from 'zod';
import { closeDatabase } from '@/db/client';
import { EnvError } from '@/lib/config/env';
import { foundCellar } from '@/lib/services/cellars/found';

/** `npm run keeper -- ADDRESS [CELLAR]`: a new cellar, and a link with which that person becomes its keeper. */
const [email, name = 'My cellar'] = process.argv.slice(2);
if (!email) {
  console.error('Usage: npm run keeper -- you@your.example "Name of the cellar"');
  process.exit(2);
}
try {
  const { url } = await foundCellar({ email, name, time_zone: Intl.DateTimeFormat().resolvedOptions().timeZone });
  console.log(`Open this within a day, once, to become the keeper of "${name}":\n${url}`);
} catch (error) {
  process.exitCode = 1;
  if (error instanceof z.ZodError) console.error(error.issues.map((issue) => `The ${issue.path.join('.')} ${issue.message}.`).join('\n'));
  else if (error instanceof EnvError) console.error(error.message);
  else throw error;
} finally {
  await closeDatabase();
}
