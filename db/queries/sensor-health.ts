import { QueryTypes } from 'sequelize';
import { database } from '../client';

export interface HealthRow {
  heard24h: number;
  sequences: number[] | null;
  cell: { at: number; volts: number }[] | null;
  signal: number | null;
  weakest: number | null;
  /** Arrival less measuring, s, at its smallest of the latest readings: the clocks' difference with the shortest way on top. Null where too few messages came: a backlog says nothing of it. */
  delayS: number | null;
  timed: boolean;
  waiting: number;
}

/** How a sensor did lately, `at` ms since 1970: a day of running numbers and signal, a month of its cell. */
export async function sensorHealth(sensorId: number, at: number): Promise<HealthRow> {
  const [row] = await database().query<HealthRow>(
    `with day as (select measured_at, received_at, sequence, signal from readings where sensor_id = $sensorId and measured_at > to_timestamp($at::float8 / 1000) - interval '24 hours' and measured_at <= to_timestamp($at::float8 / 1000) + interval '15 minutes'),
     latest as (select measured_at, received_at from readings where sensor_id = $sensorId and measured_at > to_timestamp($at::float8 / 1000) - interval '14 days' order by measured_at desc limit 200)
     select (select count(*)::int from day) as "heard24h",
       (select json_agg(sequence order by measured_at) from day where sequence is not null) as sequences,
       (select json_agg(json_build_object('at', at, 'volts', volts) order by at) from (
          select extract(epoch from date_trunc('hour', measured_at))::float8 * 1000 as at, percentile_cont(0.5) within group (order by battery) as volts
          from readings where sensor_id = $sensorId and measured_at > to_timestamp($at::float8 / 1000) - interval '30 days' and battery is not null group by 1) x) as cell,
       (select percentile_cont(0.5) within group (order by signal) from day where signal is not null) as signal,
       (select min(signal) from day) as weakest,
       (select case when count(distinct received_at) >= 5 then extract(epoch from min(received_at - measured_at))::float8 end from latest) as "delayS",
       (select coalesce(bool_or(received_at <> measured_at), false) from latest) as timed,
       (select count(*)::int from (select 1 from readings where sensor_id = $sensorId and gravity is null and inclination is not null and calibration_id is null limit 100000) w) as waiting`,
    { bind: { sensorId, at }, type: QueryTypes.SELECT },
  );
  return row!;
}

export interface RefusalGroup {
  reason: string;
  count: number;
  last: Date;
  within24h: number;
}

/** Refused messages by their reason, most recent first. */
export function refusalGroups(sensorId: number, at: number): Promise<RefusalGroup[]> {
  return database().query<RefusalGroup>(
    `select reason, count(*)::int as count, max(received_at) as last, count(*) filter (where received_at > to_timestamp($at::float8 / 1000) - interval '24 hours')::int as "within24h"
     from refusals where sensor_id = $sensorId group by reason order by max(received_at) desc limit 20`,
    { bind: { sensorId, at }, type: QueryTypes.SELECT },
  );
}

export interface StayRow {
  batchId: string;
  batchName: string;
  from: Date;
  to: Date | null;
  readings: number;
}

/** Where a sensor was, newest first, with how many of its readings count there. */
export function staysOf(sensorId: number): Promise<StayRow[]> {
  return database().query<StayRow>(
    `select b.id as "batchId", b.name as "batchName", a.from_at as "from", a.to_at as "to",
       (select count(*)::int from readings r where r.sensor_id = $sensorId and r.measured_at >= a.from_at and r.measured_at < coalesce(a.to_at, 'infinity')) as readings
     from (select batch_id, from_at, to_at from assignments where sensor_id = $sensorId union all select batch_id, from_at, to_at from probe_assignments where sensor_id = $sensorId) a
     join batches b on b.id = a.batch_id order by a.from_at desc limit 200`,
    { bind: { sensorId }, type: QueryTypes.SELECT },
  );
}

export interface RawRow {
  measuredAt: Date;
  receivedAt: Date;
  gravity: number | null;
  gravitySent: number | null;
  inclination: number | null;
  temperature: number | null;
  battery: number | null;
  signal: number | null;
  foam: number | null;
  sequence: number | null;
}

/** The latest readings as they were sent, newest first. */
export function latestRaw(sensorId: number, limit: number): Promise<RawRow[]> {
  return database().query<RawRow>(
    `select measured_at as "measuredAt", received_at as "receivedAt", gravity, gravity_sent as "gravitySent", inclination, temperature, battery, signal, foam, sequence
     from readings where sensor_id = $sensorId order by measured_at desc limit $limit`,
    { bind: { sensorId, limit }, type: QueryTypes.SELECT },
  );
}
