import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { Person } from '@/db/models';
import { closeDatabase, database } from '@/db/client';
import { migrate } from '@/db/migrate';
import { ensurePartitions, monthsAhead } from '@/db/queries/partitions';
import { DEMO_PASSPHRASE, DEMO_PEOPLE } from '@/db/seed/demo';
import { SIMULATORS_FILE } from '@/devices/simulator/sensors-file';
import { systemClock } from '@/lib/clock';
import { env } from '@/lib/config/env';
import { seedDemo } from './demo';

export interface Prepared {
  seededBatches: number;
  /** Nobody can sign in yet. */
  empty: boolean;
  demoSignIns: ReadonlyArray<{ role: string; email: string; password: string }>;
}

/**
 * Brings the tables up to date and fills an empty house with the demo.
 * @param demo true or false as told; null: on a first start.
 */
export async function prepareDatabase({ demo }: { demo: boolean | null }): Promise<Prepared> {
  const sequelize = database();
  try {
    await migrate(sequelize);
    await ensurePartitions(sequelize, monthsAhead(systemClock.now()));
    const empty = (await Person.count()) === 0;
    let seededBatches = 0;
    if (empty && demo !== false) {
      const seeded = await seedDemo(sequelize, systemClock.now());
      writeFileSync(join(env().DATA_DIR, SIMULATORS_FILE), JSON.stringify(seeded.simulators, null, 2), { mode: 0o600 });
      seededBatches = seeded.batches;
    }
    const known = new Set((await Person.findAll({ where: { email: DEMO_PEOPLE.map((person) => person.email) } })).map((person) => person.email));
    return {
      seededBatches,
      empty: empty && seededBatches === 0,
      demoSignIns: DEMO_PEOPLE.filter((person) => known.has(person.email)).map(({ role, email }) => ({ role, email, password: DEMO_PASSPHRASE })),
    };
  } finally {
    await closeDatabase();
  }
}
