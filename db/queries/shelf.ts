import { QueryTypes } from 'sequelize';
import { database } from '../client';
import { runPrepared, type Prepared } from './prepared';

export interface LaneSeriesRow {
  batchId: string;
  count: number;
  at: number[];
  gravity: Array<number | null>;
  temperature: Array<number | null>;
}

const LANES: Prepared = {
  name: 'shelf-lanes',
  // Sorted inside the aggregate's input, so that the columns come in time.
  text: `select batch_id as "batchId", sum(n)::int as count, json_agg(at) as at, json_agg(gravity) as gravity, json_agg(temperature) as temperature
     from (
       select batch_id, count(*)::int as n, (avg(s) + $2::float8)::bigint as at, round(avg(g)::numeric, 5)::float8 as gravity, round(avg(t)::numeric, 2)::float8 as temperature
       from (
         select a.batch_id, date_part('epoch', r.measured_at) - $2::float8 as s, r.gravity as g, r.temperature as t
         from assignments a join readings r on r.sensor_id = a.sensor_id
           and r.measured_at >= greatest(a.from_at, to_timestamp($2::float8)) and r.measured_at < least(coalesce(a.to_at, 'infinity'), to_timestamp($3::float8))
         where a.batch_id = any($1::uuid[]) offset 0
       ) x
       group by batch_id, floor(s / $4::float8) order by batch_id, floor(s / $4::float8)
     ) y
     group by batch_id`,
};

/** Means of buckets of `widthS` for many batches, in one statement; times in s since 1970. */
export async function laneSeries(batchIds: readonly string[], from: number, to: number, widthS: number): Promise<LaneSeriesRow[]> {
  if (batchIds.length === 0) return [];
  return (await runPrepared<LaneSeriesRow>(database(), LANES, [batchIds, from, to, widthS])).rows;
}

export interface LaneEntryRow {
  id: string;
  batchId: string;
  kind: string;
  at: Date;
  gravity: number | null;
  neck: string | null;
  text: string | null;
}

/** What was logged of many batches between two times, in time. */
export function laneEntries(batchIds: readonly string[], from: Date, to: Date): Promise<LaneEntryRow[]> {
  if (batchIds.length === 0) return Promise.resolve([]);
  return database().query<LaneEntryRow>(
    `select id, batch_id as "batchId", kind, at, gravity, neck, text from entries
     where batch_id = any($batchIds::uuid[]) and at >= $from and at < $to and removed_at is null order by at, id`,
    { bind: { batchIds, from, to }, type: QueryTypes.SELECT },
  );
}
