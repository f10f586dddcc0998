import '@/lib/config/dot-env';
import { closeDatabase, database } from '@/db/client';
import { migrate } from '@/db/migrate';

/** `npm run migrate`: brings the tables of DATABASE_URL up to date; start does it by itself. */
const ran = await migrate(database());
console.log(ran.length > 0 ? `Migrated: ${ran.join(', ')}` : 'The tables are up to date.');
await closeDatabase();
