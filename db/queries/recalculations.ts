import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../client';
import { runPrepared } from './prepared';

/** Asks that readings of a sensor from `from` on are turned again by the calibrations that now are. */
export async function askRecalculation(cellarId: string, sensorId: number, from: Date, transaction: Transaction): Promise<void> {
  await database().query(`insert into recalculations (cellar_id, sensor_id, from_at) values ($cellarId, $sensorId, $from)`, { bind: { cellarId, sensorId, from }, transaction });
}

export interface Recalculation {
  id: number;
  cellarId: string;
  sensorId: number;
  from: Date;
  askedAt: Date;
}

/** Takes the next one due for itself; the lease passes to another worker should this one die. */
export async function takeRecalculation(leaseMs: number): Promise<Recalculation | null> {
  const [row] = await database().query<Recalculation>(
    `update recalculations r set leased_until = now() + $leaseMs * interval '1 millisecond'
     where id = (select id from recalculations where done_at is null and next_at <= now() and coalesce(leased_until, '-infinity') <= now() order by next_at for update skip locked limit 1)
     returning r.id, r.cellar_id as "cellarId", r.sensor_id as "sensorId", r.from_at as "from", r.asked_at as "askedAt"`,
    { bind: { leaseMs }, type: QueryTypes.SELECT },
  );
  return row ?? null;
}

/** Puts it back for later, with what was changed so far. */
export async function putBackRecalculation(id: number, changed: number, afterMs: number): Promise<void> {
  await database().query(`update recalculations set leased_until = null, changed = changed + $changed, next_at = now() + $afterMs * interval '1 millisecond' where id = $id`, { bind: { id, changed, afterMs } });
}

export async function finishRecalculation(id: number, changed: number): Promise<void> {
  await database().query(`update recalculations set done_at = now(), leased_until = null, changed = changed + $changed where id = $id`, { bind: { id, changed } });
}

/** Old ones that are done say nothing any more. */
export async function forgetRecalculations(days: number): Promise<void> {
  await database().query(`delete from recalculations where done_at < now() - $days * interval '1 day'`, { bind: { days } });
}

export interface StoredReading {
  /** As text: a Date would lose the microseconds that are part of the key. */
  at: string;
  /** ms since 1970. */
  ms: number;
  gravity: number | null;
  gravitySent: number | null;
  calibrationId: number | null;
  inclination: number | null;
  temperature: number | null;
}

/** Readings of a sensor from a key on, in order. */
export function readingsFrom(sensorId: number, from: string | Date, limit: number, transaction?: Transaction): Promise<StoredReading[]> {
  return database().query<StoredReading>(
    `select measured_at::text as at, extract(epoch from measured_at)::float8 * 1000 as ms, gravity, gravity_sent as "gravitySent", calibration_id as "calibrationId", inclination, temperature
     from readings where sensor_id = $sensorId and measured_at >= $from::timestamptz order by measured_at limit $limit`,
    { bind: { sensorId, from, limit }, type: QueryTypes.SELECT, transaction },
  );
}

export interface Turned {
  at: string;
  gravity: number | null;
  gravitySent: number | null;
  calibrationId: number | null;
}

const TURN = {
  name: 'turn-readings',
  // The sensor's latest shows the same gravity as its reading.
  text: `with given as (
    select * from unnest($2::timestamptz[], $3::float8[], $4::float8[], $5::int[]) as g (at, gravity, gravity_sent, calibration_id)
  ), turned as (
    update readings r set gravity = g.gravity, gravity_sent = g.gravity_sent, calibration_id = g.calibration_id
    from given g where r.sensor_id = $1 and r.measured_at = g.at returning r.measured_at, r.gravity
  )
  update sensor_latest l set gravity = t.gravity from turned t where l.sensor_id = $1 and l.measured_at = t.measured_at`,
};

export async function turnReadings(sensorId: number, rows: readonly Turned[], transaction?: Transaction): Promise<void> {
  await runPrepared(database(), TURN, [sensorId, rows.map((row) => row.at), rows.map((row) => row.gravity), rows.map((row) => row.gravitySent), rows.map((row) => row.calibrationId)], transaction);
}
