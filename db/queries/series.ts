import { database } from '../client';
import { runPrepared, type Prepared } from './prepared';

/** One reading as a chart takes it; `at` in whole seconds since 1970. */
export interface SeriesPoint {
  at: number;
  gravity: number | null;
  temperature: number | null;
}

/** What the readings of a batch span, s since 1970; null where it has none there. */
export interface SeriesExtent {
  first: number | null;
  last: SeriesPoint | null;
}

/** A batch's readings are those of each sensor for as long as it was in it: assignments bound the readings, never a column of theirs. */
const WITHIN = `r.sensor_id = a.sensor_id
  and r.measured_at >= greatest(a.from_at, to_timestamp($2::float8)) and r.measured_at < least(coalesce(a.to_at, 'infinity'), to_timestamp($3::float8))`;
const OF_BATCH = `from assignments a join readings r on ${WITHIN} where a.batch_id = $1`;

const EXTENT: Prepared = {
  name: 'series-extent',
  text: `select (select id from batches where id = $1 and cellar_id = $4) as batch,
       (select min(f.at) from assignments a cross join lateral (select date_part('epoch', r.measured_at) as at from readings r where ${WITHIN} order by r.measured_at limit 1) f where a.batch_id = $1) as first,
       l.at, l.gravity, l.temperature
     from (select 1) one left join lateral (
       select x.* from assignments a cross join lateral (
         select date_part('epoch', r.measured_at) as at, r.gravity, r.temperature from readings r where ${WITHIN} order by r.measured_at desc limit 1
       ) x where a.batch_id = $1 order by x.at desc limit 1
     ) l on true`,
};

/**
 * The span of a batch's readings between two times, s since 1970, from the ends of the index.
 * @returns null where the cellar has no such batch
 */
export async function seriesExtent(cellarId: string, batchId: string, from: number, to: number): Promise<SeriesExtent | null> {
  const { rows } = await runPrepared<{ batch: string | null; first: number | null; at: number | null; gravity: number | null; temperature: number | null }>(database(), EXTENT, [batchId, from, to, cellarId]);
  const [row] = rows;
  if (!row?.batch) return null;
  return { first: row.first === null ? null : Math.floor(row.first), last: row.at === null ? null : { at: Math.floor(row.at), gravity: row.gravity, temperature: row.temperature } };
}

/**
 * How a reading is packed into one double, so that a plain min or max finds the
 * reading itself and not only its value: gravity in 0.00001 above 0.9 (or its
 * absence), temperature in 0.01 °C above -10 (or its absence), and the seconds
 * since its bucket began. The largest is 7e15, below the 2^53 that is exact.
 * PostgreSQL 15 has no min over rows, and arrays cost ten times as much.
 */
const PACK = { offset: 1e7, temperature: 1e4, gravity: 1e5, noTemperature: 9_999, noGravity: 99_999 } as const;

const THINNED: Prepared = {
  name: 'series-thinned',
  // `offset 0` keeps the planner from writing each expression out twice.
  text: `select bucket, count(*)::int as count, min(by_gravity) as g_low, max(by_gravity) as g_high, min(by_temperature) as t_low, max(by_temperature) as t_high
     from (
       select bucket, (g * ${PACK.temperature} + coalesce(t, ${PACK.noTemperature})) * ${PACK.offset} + since as by_gravity,
         (t * ${PACK.gravity} + coalesce(g, ${PACK.noGravity})) * ${PACK.offset} + since as by_temperature
       from (
         select floor(s / $4::float8) as bucket, floor(s - floor(s / $4::float8) * $4::float8) as since, g, t
         from (
           select date_part('epoch', r.measured_at) - $2::float8 as s, round((r.gravity - 0.9) * 1e5) as g, round((r.temperature + 10) * 100) as t ${OF_BATCH} offset 0
         ) x offset 0
       ) y offset 0
     ) z group by bucket`,
};

interface ThinnedRow {
  bucket: number;
  count: number;
  g_low: number | null;
  g_high: number | null;
  t_low: number | null;
  t_high: number | null;
}

const gravityOf = (code: number) => (code === PACK.noGravity ? null : Math.round(code + 90_000) / 1e5);
const temperatureOf = (code: number) => (code === PACK.noTemperature ? null : Math.round(code - 1000) / 100);

function unpack(packed: number, first: 'gravity' | 'temperature', start: number): SeriesPoint {
  const since = packed % PACK.offset;
  const codes = (packed - since) / PACK.offset;
  const base = first === 'gravity' ? PACK.temperature : PACK.gravity;
  const low = codes % base;
  const high = (codes - low) / base;
  return { at: start + since, gravity: gravityOf(first === 'gravity' ? high : low), temperature: temperatureOf(first === 'gravity' ? low : high) };
}

/** A reading's place in its bucket has seven digits; a bucket of more seconds is asked for in parts. */
const LONGEST_PART_S = PACK.offset - 1;
const KINDS = [
  ['g_low', 'gravity', -1],
  ['g_high', 'gravity', 1],
  ['t_low', 'temperature', -1],
  ['t_high', 'temperature', 1],
] as const;

/**
 * A batch's readings in `[from, to)`, s since 1970: from each bucket of `widthS`
 * its lowest and highest in gravity and in temperature, in time. Gravities to
 * 0.00001, temperatures to 0.01 °C.
 * @param widthS whole seconds
 */
export async function thinnedSeries(batchId: string, from: number, to: number, widthS: number): Promise<{ count: number; points: SeriesPoint[] }> {
  const parts = Math.ceil(widthS / LONGEST_PART_S);
  const partS = Math.ceil(widthS / parts);
  const { rows } = await runPrepared<ThinnedRow>(database(), THINNED, [batchId, from, to, partS]);
  const best = new Map<string, { value: number; point: SeriesPoint }>();
  let count = 0;
  for (const row of rows) {
    count += row.count;
    for (const [column, first, sign] of KINDS) {
      const packed = row[column];
      if (packed === null) continue;
      const point = unpack(packed, first, from + row.bucket * partS);
      const value = sign * (point[first] ?? 0);
      const key = `${Math.floor(row.bucket / parts)} ${column}`;
      const held = best.get(key);
      if (!held || value > held.value) best.set(key, { value, point });
    }
  }
  const points = new Map([...best.values()].map(({ point }) => [point.at, point]));
  return { count, points: [...points.values()].sort((a, b) => a.at - b.at) };
}

const ALL: Prepared = {
  name: 'series-all',
  text: `select floor(date_part('epoch', r.measured_at)) as at, r.gravity, r.temperature ${OF_BATCH} order by r.measured_at`,
};

/** A batch's readings in `[from, to)`, every one. */
export async function allReadings(batchId: string, from: number, to: number): Promise<SeriesPoint[]> {
  return (await runPrepared<SeriesPoint>(database(), ALL, [batchId, from, to])).rows;
}
