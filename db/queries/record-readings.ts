import type { Sequelize, Transaction } from 'sequelize';
import { runPrepared } from './prepared';

export interface ReadingRow {
  sensorId: number;
  /** ms since 1970. */
  receivedAt: number;
  reading: Measured;
  /** The calibration that made `gravity`, and what was sent in its place; null or absent: it stands as it was sent. */
  calibrationId?: number | null;
  gravitySent?: number | null;
}

/** What a sensor measured, in the units of the contract; null where it said nothing. */
export interface Measured {
  /** ms since 1970. */
  measuredAt: number;
  gravity: number | null;
  temperature: number | null;
  battery: number | null;
  signal: number | null;
  inclination: number | null;
  foam: number | null;
  sequence: number | null;
}

export interface RefusalRow {
  /** Null where the sender is not a sensor that we know. */
  sensorId: number | null;
  receivedAt: number;
  road: 'mqtt' | 'http';
  reason: string;
  body: Buffer;
}

/**
 * All of a batch in one statement, so in one transaction and one round trip:
 * readings (a doubled one is left as it is), the latest of each sensor, what was
 * refused, and the word to those who listen. Sorted, so that two processes that
 * write the same keys wait for each other instead of deadlocking.
 */
const STATEMENT = {
  name: 'record-readings',
  text: `
with input as materialized (
  select sensor_id, to_timestamp(measured) as measured_at, to_timestamp(received) as received_at,
         gravity, temperature, battery, signal, inclination, foam, sequence, calibration_id, gravity_sent
  from unnest($1::int[], $2::float8[], $3::float8[], $4::float8[], $5::real[], $6::real[], $7::real[], $8::real[], $9::real[], $10::bigint[], $18::int[], $19::float8[])
    as t (sensor_id, measured, received, gravity, temperature, battery, signal, inclination, foam, sequence, calibration_id, gravity_sent)
  order by sensor_id, to_timestamp(measured)
), stored as (
  insert into readings (sensor_id, measured_at, received_at, gravity, temperature, battery, signal, inclination, foam, sequence, calibration_id, gravity_sent)
  select sensor_id, measured_at, received_at, gravity, temperature, battery, signal, inclination, foam, sequence, calibration_id, gravity_sent from input
  on conflict do nothing
  returning sensor_id, measured_at
), latest as (
  insert into sensor_latest as l (sensor_id, measured_at, received_at, gravity, temperature, battery, signal, sequence)
  select distinct on (i.sensor_id) i.sensor_id, i.measured_at, i.received_at, i.gravity, i.temperature, i.battery, i.signal, i.sequence
  from input i join sensors s on s.id = i.sensor_id
  order by i.sensor_id, i.measured_at desc
  on conflict (sensor_id) do update
    set measured_at = excluded.measured_at, received_at = excluded.received_at, gravity = excluded.gravity,
        temperature = excluded.temperature, battery = excluded.battery, signal = excluded.signal, sequence = excluded.sequence
    where excluded.measured_at > l.measured_at
), refused as (
  insert into refusals (sensor_id, received_at, road, reason, body)
  select s.id, to_timestamp(r.received), r.road, r.reason, r.body
  from unnest($11::int[], $12::float8[], $13::text[], $14::text[], $15::bytea[]) with ordinality as r (sensor_id, received, road, reason, body, place)
  left join sensors s on s.id = r.sensor_id
  order by r.place
), told as (
  select pg_notify('fallbright_changes', json_build_object('cellar', cellar_id, 'kind', kind, 'batch', batch_id)::text)
  from (
    select s.cellar_id, 'reading' as kind, a.batch_id
    from (select sensor_id, min(measured_at) as first, max(measured_at) as last from stored where sensor_id = any($16::int[]) group by sensor_id) span
    join sensors s on s.id = span.sensor_id
    left join assignments a on a.sensor_id = span.sensor_id and a.from_at <= span.last and (a.to_at is null or a.to_at > span.first)
    union
    select s.cellar_id, 'sensor', null from sensors s where s.id = any($17::int[])
  ) change
)
select (select count(*) from stored) as stored, (select count(*) from told) as told`,
};

/**
 * Writes a batch; returns how many readings were new. The partitions of their months must be there.
 * @param tell sensors whose new readings are announced; the others' are announced later by {@link tellOfReadings}.
 */
export async function recordReadings(sequelize: Sequelize, readings: readonly ReadingRow[], refusals: readonly RefusalRow[], tell: readonly number[], transaction?: Transaction): Promise<number> {
  const refusedSensors = new Set(refusals.flatMap((refusal) => (refusal.sensorId === null ? [] : [refusal.sensorId])));
  const result = await runPrepared<{ stored: number }>(sequelize, STATEMENT, [
    numbers(readings, (row) => row.sensorId),
    numbers(readings, (row) => row.reading.measuredAt / 1000),
    numbers(readings, (row) => row.receivedAt / 1000),
    numbers(readings, (row) => row.reading.gravity),
    numbers(readings, (row) => row.reading.temperature),
    numbers(readings, (row) => row.reading.battery),
    numbers(readings, (row) => row.reading.signal),
    numbers(readings, (row) => row.reading.inclination),
    numbers(readings, (row) => row.reading.foam),
    numbers(readings, (row) => row.reading.sequence),
    numbers(refusals, (row) => row.sensorId),
    numbers(refusals, (row) => row.receivedAt / 1000),
    refusals.map((row) => row.road),
    refusals.map((row) => row.reason),
    refusals.map((row) => row.body),
    numbers(tell, (id) => id),
    numbers(tell.filter((id) => refusedSensors.has(id)), (id) => id),
    numbers(readings, (row) => row.calibrationId ?? null),
    numbers(readings, (row) => row.gravitySent ?? null),
  ], transaction);
  return result.rows[0]?.stored ?? 0;
}

const TELL = {
  name: 'tell-of-readings',
  text: `
select pg_notify('fallbright_changes', json_build_object('cellar', cellar_id, 'kind', 'reading', 'batch', batch_id)::text)
from (
  select distinct s.cellar_id, a.batch_id
  from unnest($1::int[], $2::float8[], $3::float8[]) as span (sensor_id, first, last)
  join sensors s on s.id = span.sensor_id
  left join assignments a on a.sensor_id = span.sensor_id and a.from_at <= to_timestamp(span.last) and (a.to_at is null or a.to_at > to_timestamp(span.first))
) change`,
};

/** Readings of one sensor, from the first to the last, ms since 1970. */
export interface Span {
  sensorId: number;
  first: number;
  last: number;
}

/** Announces readings that were stored before without a word. */
export async function tellOfReadings(sequelize: Sequelize, spans: readonly Span[]): Promise<void> {
  await runPrepared(sequelize, TELL, [numbers(spans, (span) => span.sensorId), numbers(spans, (span) => span.first / 1000), numbers(spans, (span) => span.last / 1000)]);
}

/** An array as PostgreSQL writes it; the driver's own way quotes and escapes each number. */
function numbers<T>(rows: readonly T[], of: (row: T) => number | null): string {
  let text = '{';
  for (let index = 0; index < rows.length; index += 1) {
    const value = of(rows[index] as T);
    text += (index === 0 ? '' : ',') + (value === null ? 'NULL' : value);
  }
  return `${text}}`;
}
