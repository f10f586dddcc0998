import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../client';
import { Sensor } from '../models';

export interface FloatStay {
  sensorId: number;
  name: string;
  from: Date;
  to: Date | null;
}

/** Which floats were in a batch, in time. */
export function floatStays(batchId: string): Promise<FloatStay[]> {
  return database().query<FloatStay>(
    `select a.sensor_id as "sensorId", s.name, a.from_at as "from", a.to_at as "to" from assignments a join sensors s on s.id = a.sensor_id where a.batch_id = $batchId order by a.from_at, a.id`,
    { bind: { batchId }, type: QueryTypes.SELECT },
  );
}

export interface ArchiveReading {
  measuredAt: string;
  receivedAt: string;
  gravity: number | null;
  gravitySent: number | null;
  inclination: number | null;
  temperature: number | null;
  battery: number | null;
  signal: number | null;
  foam: number | null;
  sequence: number | null;
  /** The version that the gravity stands by. */
  calibration: number | null;
}

const UTC = (column: string) => `to_char(${column} at time zone 'utc', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"')`;

/** The sensors of the cellar, those that were taken away too; or those that were in one batch. */
export function archiveSensors(cellarId: string, batchId: string | null): Promise<Sensor[]> {
  const inIt = (table: string) => `exists (select 1 from ${table} x where x.sensor_id = s.id and x.batch_id = $batchId::uuid)`;
  const which = batchId === null ? '$batchId::uuid is null' : `(${inIt('assignments')} or ${inIt('probe_assignments')})`;
  return database().query(`select s.* from sensors s where s.cellar_id = $cellarId and ${which} order by s.created_at, s.id`, { bind: { cellarId, batchId }, model: Sensor, mapToModel: true });
}

export interface ArchiveRefusal {
  received_at: string;
  road: 'mqtt' | 'http';
  reason: string;
  /** Base64. */
  body: string;
}

/** What a sensor sent and was refused, while that is kept. */
export function refusalsOf(sensorId: number): Promise<ArchiveRefusal[]> {
  return database().query<ArchiveRefusal>(`select ${UTC('received_at')} as received_at, road, reason, replace(encode(body, 'base64'), E'\\n', '') as body from refusals where sensor_id = $sensorId order by received_at, id`, {
    bind: { sensorId },
    type: QueryTypes.SELECT,
  });
}

export async function insertRefusals(sensorId: number, rows: readonly ArchiveRefusal[], transaction: Transaction): Promise<void> {
  if (rows.length === 0) return;
  await database().query(
    `insert into refusals (sensor_id, received_at, road, reason, body)
     select $sensorId, r.received_at, r.road, r.reason, decode(r.body, 'base64') from jsonb_to_recordset($rows::jsonb) as r (received_at timestamptz, road text, reason text, body text)`,
    { bind: { sensorId, rows: JSON.stringify(rows) }, transaction },
  );
}

export interface SensorStay {
  batch: string;
  as: 'float' | 'probe';
  from: Date;
  to: Date | null;
}

/** Where a sensor was, in time. */
export function staysOf(sensorId: number, batchId: string | null): Promise<SensorStay[]> {
  const of = (table: string, as: string) => `select a.batch_id as batch, '${as}' as "as", a.from_at as "from", a.to_at as "to", b.created_at as made, a.batch_id from ${table} a join batches b on b.id = a.batch_id where a.sensor_id = $sensorId and ($batchId::uuid is null or a.batch_id = $batchId::uuid)`;
  return database().query<SensorStay>(`select batch, "as", "from", "to" from (${of('assignments', 'float')} union all ${of('probe_assignments', 'probe')}) t order by "from", "as", made, batch_id`, { bind: { sensorId, batchId }, type: QueryTypes.SELECT });
}

/** A stay's readings in pages, in order, each as it was kept: times to the microsecond, `real` figures in their shortest form. */
export async function* readingsOfStay({ sensorId, from, to }: { sensorId: number; from: Date | '-infinity'; to: Date | null }, pageSize = 5_000): AsyncGenerator<ArchiveReading[]> {
  let after: string | null = null;
  for (;;) {
    const rows: ArchiveReading[] = await database().query<ArchiveReading>(
      `select ${UTC('measured_at')} as "measuredAt", ${UTC('received_at')} as "receivedAt", gravity, gravity_sent as "gravitySent", inclination, temperature, battery, signal, foam, sequence,
              (select c.version from calibrations c where c.id = calibration_id) as calibration
       from readings where sensor_id = $sensorId and measured_at >= $from and measured_at < coalesce($to::timestamptz, 'infinity') and ($after::timestamptz is null or measured_at > $after::timestamptz)
       order by measured_at limit $limit`,
      { bind: { sensorId, from, to, after, limit: pageSize }, type: QueryTypes.SELECT },
    );
    if (rows.length > 0) yield rows;
    if (rows.length < pageSize) return;
    after = rows.at(-1)!.measuredAt;
  }
}

/** Writes readings of an imported float in one statement; doubled times fall away. Returns how many were new. */
export async function insertImported(sensorId: number, rows: readonly ArchiveReading[], transaction: Transaction): Promise<number> {
  const [result] = await database().query<{ n: number }>(
    `with stored as (
       insert into readings (sensor_id, measured_at, received_at, gravity, gravity_sent, inclination, temperature, battery, signal, foam, sequence, calibration_id)
       select $sensorId, r."measuredAt", r."receivedAt", r.gravity, r."gravitySent", r.inclination, r.temperature, r.battery, r.signal, r.foam, r.sequence, c.id
       from jsonb_to_recordset($rows::jsonb) as r ("measuredAt" timestamptz, "receivedAt" timestamptz, gravity float8, "gravitySent" float8, inclination real, temperature real, battery real, signal real, foam real, sequence bigint, calibration int)
       left join calibrations c on c.sensor_id = $sensorId and c.version = r.calibration
       on conflict do nothing returning 1
     ) select count(*)::int as n from stored`,
    { bind: { sensorId, rows: JSON.stringify(rows) }, type: QueryTypes.SELECT, transaction },
  );
  return result?.n ?? 0;
}

/** Whether a sensor of these that is still in use has spoken here: only the ingest writes its latest. */
export async function heardHere(sensorIds: readonly number[], transaction: Transaction): Promise<boolean> {
  const [row] = await database().query<{ heard: boolean }>(`select exists (select 1 from sensor_latest l join sensors s on s.id = l.sensor_id where s.removed_at is null and s.id = any($ids::int[])) as heard`, {
    bind: { ids: `{${sensorIds.join(',')}}` },
    type: QueryTypes.SELECT,
    transaction,
  });
  return row?.heard ?? false;
}

/** Takes an import's readings away. */
export async function deleteImported(sensorId: number, transaction: Transaction): Promise<void> {
  await database().query('delete from readings where sensor_id = $sensorId', { bind: { sensorId }, transaction });
}
