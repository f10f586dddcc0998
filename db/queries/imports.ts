import type { Transaction } from 'sequelize';
import { database } from '../client';

/** Tables whose rows an import may have made, with what keeps one there: that something else stands on it by now. */
const UNUSED: Readonly<Record<string, string>> = {
  jobs: 'true',
  must_sheets: 'not exists (select 1 from batches b join must_versions v on v.id = b.must_version_id where v.must_id = t.id)',
  catalogue_items: 'true',
  places: 'not exists (select 1 from bottle_stands s where s.place_id = t.id)',
};

/** Takes away what an import made and nothing else uses. */
export async function deleteUnused(made: Readonly<Record<string, readonly string[]>>, transaction: Transaction): Promise<void> {
  for (const [table, unused] of Object.entries(UNUSED)) {
    const ids = made[table] ?? [];
    if (ids.length > 0) await database().query(`delete from ${table} t where t.id = any($ids::uuid[]) and ${unused}`, { bind: { ids }, transaction });
  }
}
