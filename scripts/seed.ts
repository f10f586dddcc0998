import '@/lib/config/dot-env';
import { prepareDatabase } from './lib/prepare';

/** `npm run seed`: migrates DATABASE_URL and fills it with the demo where it is empty. */
const { seededBatches, demoSignIns } = await prepareDatabase({ demo: true });
console.log(seededBatches > 0 ? `The demo cellar was filled: ${seededBatches} batches.` : 'There are people here already; nothing was filled.');
for (const { role, email, password } of demoSignIns) console.log(`${role.padEnd(7)} ${email.padEnd(26)} ${password}`);
