import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../client';

/** A part of the archive as its table has it. */
export interface PartTable {
  table: string;
  fields: Readonly<Record<string, { column: string; is: string }>>;
  order: string;
  where?: string;
  ofCellar?: string;
  ofBatch: string | null;
  keepsOwn?: boolean;
}
export type PartRow = Record<string, unknown>;

/** A time to the microsecond, as JSON has it. */
const utc = (column: string) => `to_char(t.${column} at time zone 'utc', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"')`;

const selected = ({ fields }: PartTable) => Object.entries(fields).map(([name, { column, is }]) => `${is === 'time' ? utc(column) : `t.${column}`} as "${name}"`);

/** A part's rows of a cellar, or those that go with one batch; people still by their ids. */
export async function selectPart(part: PartTable, cellarId: string, batchId: string | null): Promise<PartRow[]> {
  if (batchId !== null && part.ofBatch === null) return [];
  const wheres = [part.ofCellar ?? 't.cellar_id = $cellarId', ...(part.where ? [part.where] : []), ...(batchId === null ? [] : [part.ofBatch])];
  return database().query<PartRow>(`select ${selected(part).join(', ')} from ${part.table} t where ${wheres.join(' and ')} order by ${part.order}`, { bind: { cellarId, ...(batchId !== null && { batchId }) }, type: QueryTypes.SELECT });
}

/** Writes a part's rows, keyed by column. `more`: columns that the archive does not hold. Returns how many were new. */
export async function insertPart(part: PartTable, cellarId: string, rows: readonly PartRow[], transaction: Transaction, more: readonly string[] = []): Promise<number> {
  if (rows.length === 0) return 0;
  const columns = [...(part.ofCellar ? [] : ['cellar_id']), ...Object.values(part.fields).map(({ column }) => column), ...more].map((column) => `"${column}"`).join(', ');
  const [result] = await database().query<{ n: number }>(
    `with stored as (
       insert into ${part.table} (${columns}) select ${columns} from jsonb_populate_recordset(null::${part.table}, $rows::jsonb)
       ${part.keepsOwn ? 'on conflict do nothing' : ''} returning 1
     ) select count(*)::int as n from stored`,
    { bind: { rows: JSON.stringify(rows.map((row) => ({ ...row, cellar_id: cellarId }))) }, type: QueryTypes.SELECT, transaction },
  );
  return result?.n ?? 0;
}
