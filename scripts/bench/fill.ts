import type { Client } from 'pg';
import { QueryTypes, type Sequelize } from 'sequelize';
import { ensurePartitions, monthOf } from '@/db/queries/partitions';

const DAY_MS = 86_400_000;
export const BENCH_DAYS = 90;
export const READINGS_PER_BATCH = BENCH_DAYS * 96;

/** Where the bench's readings end: a fixed time, so that two runs fill the same months. */
export const BENCH_END = Date.UTC(2026, 9, 20);
export const BENCH_START = BENCH_END - BENCH_DAYS * DAY_MS;

async function one<T extends object>(sequelize: Sequelize, sql: string, bind: unknown[] = []): Promise<T> {
  const [row] = await sequelize.query<T>(sql, { bind, type: QueryTypes.SELECT });
  if (!row) throw new Error('The bench’s own query gave no row.');
  return row;
}

/** A cellar with a keeper and `batches` working batches, each with a sensor since 90 days. Readings are written in the order they would arrive. */
export async function fillCellar(sequelize: Sequelize, batches: number): Promise<{ cellarId: string; personId: string; batchId: string }> {
  const { id: cellarId } = await one<{ id: string }>(sequelize, `insert into cellars (name) values ('Bench') returning id`);
  const { id: personId } = await one<{ id: string }>(sequelize, `insert into people (name, email) values ('Bench Keeper', 'bench@cellar.example') returning id`);
  await sequelize.query(`insert into memberships (cellar_id, person_id, role) values ($1, $2, 'keeper')`, { bind: [cellarId, personId] });
  await sequelize.query(
    `insert into batches (cellar_id, name, kind, drink_colour, vessel_kind, tag, volume_l, vessel_l, neck, pitched_at, original_gravity, created_by)
     select $1, 'Bench ' || n, 'cider', 'gold', 'demijohn', n, 4.5, 5, 'airlock', to_timestamp($2::float8 / 1000), 1.06, $3 from generate_series(1, $4) n`,
    { bind: [cellarId, BENCH_START, personId, batches] },
  );
  await sequelize.query(
    `with made as (insert into sensors (cellar_id, identifier, secret_hash, name) select $1, 'bench-' || n, '\\x00', 'Float ' || n from generate_series(1, $2) n returning id, name)
     insert into assignments (cellar_id, sensor_id, batch_id, from_at)
     select $1, made.id, b.id, to_timestamp($3::float8 / 1000) from made join batches b on b.cellar_id = $1 and b.tag = split_part(made.name, ' ', 2)::int`,
    { bind: [cellarId, batches, BENCH_START] },
  );
  const { lo, hi } = await one<{ lo: number; hi: number }>(sequelize, `select min(id) as lo, max(id) as hi from sensors where cellar_id = $1`, [cellarId]);
  await fillReadings(sequelize, lo, hi);
  const { id: batchId } = await one<{ id: string }>(sequelize, `select id from batches where cellar_id = $1 and tag = 1`, [cellarId]);
  return { cellarId, personId, batchId };
}

/** 90 days of readings for each of a span of sensor keys; they need no sensor row, as others' readings need none of ours. */
export async function fillReadings(sequelize: Sequelize, firstSensor: number, lastSensor: number): Promise<void> {
  const months = Array.from({ length: BENCH_DAYS + 1 }, (_, day) => monthOf(BENCH_START + day * DAY_MS));
  await ensurePartitions(sequelize, months);
  // An exponential fall with noise and a daily swing; the order of arrival puts each sensor's next reading on another page.
  await sequelize.transaction(async (transaction) => {
    await sequelize.query('set local statement_timeout = 0', { transaction });
    await sequelize.query(
      `insert into readings (sensor_id, measured_at, received_at, gravity, temperature, battery, signal)
       select s, t, t + interval '2 seconds', 1.0 + 0.06 * exp(-extract(epoch from t - to_timestamp($1::float8 / 1000)) / 86400 / 9) + (random() - 0.5) * 0.001,
         19 + sin(extract(epoch from t) / 86400 * 2 * pi()) + (random() - 0.5) * 0.2, 3.9, -60
       from generate_series(to_timestamp($1::float8 / 1000), to_timestamp($2::float8 / 1000) - interval '15 minutes', interval '15 minutes') t, generate_series($3::int, $4::int) s`,
      { bind: [BENCH_START, BENCH_END, firstSensor, lastSensor], transaction },
    );
  });
}

/** Lets PostgreSQL settle as autovacuum would, so that the covering index answers alone. Not through the pool: vacuum runs in no transaction and takes its time. */
export async function settle(client: Client): Promise<void> {
  for (const statement of ['vacuum (analyze) readings', 'vacuum (analyze) batches', 'vacuum (analyze) assignments', 'vacuum (analyze) sensors', 'checkpoint']) await client.query(statement);
}
