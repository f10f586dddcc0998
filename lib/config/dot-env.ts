import { existsSync } from 'node:fs';
import { resolve } from 'node:path';

// Every command sees the house that start sees: imported before all else, since other modules read the environment as they load.
const file = resolve(import.meta.dirname, '../../.env');
if (existsSync(file)) process.loadEnvFile(file);
