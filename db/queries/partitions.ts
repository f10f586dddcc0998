import { QueryTypes, type Sequelize } from 'sequelize';

/** Held while a partition is made, so that two processes do not make the same one. */
const LOCK = 7_021_985;

/** A month in UTC as months since year 0: `year * 12 + month - 1`. */
export type Month = number;

export function monthOf(ms: number): Month {
  const date = new Date(ms);
  return date.getUTCFullYear() * 12 + date.getUTCMonth();
}

const startOf = (month: Month) => new Date(Date.UTC(Math.floor(month / 12), month % 12, 1)).toISOString();

export function partitionName(month: Month): string {
  return `readings_${Math.floor(month / 12)}_${String((month % 12) + 1).padStart(2, '0')}`;
}

/**
 * Makes the partitions of `readings` for these months where they are missing. A
 * table is made beside and then attached: `create table … partition of` would
 * lock out every reader and writer while it runs, attaching does not. There is
 * no default partition: its rows would block the month's own from being attached.
 */
export async function ensurePartitions(sequelize: Sequelize, months: Iterable<Month>): Promise<void> {
  const wanted = [...new Set(months)].sort((a, b) => a - b);
  const existing = await attached(sequelize);
  const missing = wanted.filter((month) => !existing.has(partitionName(month)));
  for (const month of missing) await createPartition(sequelize, month);
}

async function attached(sequelize: Sequelize): Promise<Set<string>> {
  const rows = await sequelize.query<{ name: string }>(
    `select c.relname as name from pg_inherits i join pg_class c on c.oid = i.inhrelid where i.inhparent = 'readings'::regclass`,
    { type: QueryTypes.SELECT },
  );
  return new Set(rows.map((row) => row.name));
}

async function createPartition(sequelize: Sequelize, month: Month): Promise<void> {
  const name = partitionName(month);
  await sequelize.transaction(async (transaction) => {
    await sequelize.query('select pg_advisory_xact_lock($1)', { bind: [LOCK], transaction });
    const [there] = await sequelize.query<{ name: string | null }>(`select to_regclass($1)::text as name`, { bind: [name], transaction, type: QueryTypes.SELECT });
    if (there?.name) return;
    // Insert-only tables are vacuumed late by default; the covering index answers alone only on vacuumed pages.
    await sequelize.query(`create table ${name} (like readings including all) with (autovacuum_vacuum_insert_scale_factor = 0.01)`, { transaction });
    await sequelize.query(`alter table readings attach partition ${name} for values from ('${startOf(month)}') to ('${startOf(month + 1)}')`, { transaction });
  });
}

/** The months a running house needs next: last, this and the next two. */
export function monthsAhead(now: number): Month[] {
  const month = monthOf(now);
  return [month - 1, month, month + 1, month + 2];
}
