import type { Migration } from './types';

/** Calibrations, settings of sensors, imports, photos, webhooks. */
export const up: Migration['up'] = async (run) => {
  // A removed sensor keeps its row: what it measured stays where it counted.
  await run(`
    alter table sensors
      add column removed_at timestamptz,
      add column settings_version integer not null default 0,
      add column wanted_interval_s integer,
      add column settings_at timestamptz,
      add column confirmed_version integer,
      add column confirmed_at timestamptz`);

  // Room and foam probes stand beside the float that a batch is judged by; several may.
  await run(`
    create table probe_assignments (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      sensor_id integer not null references sensors on delete cascade,
      batch_id uuid not null references batches on delete cascade,
      from_at timestamptz not null,
      to_at timestamptz,
      check (to_at is null or to_at > from_at),
      exclude using gist (sensor_id with =, tstzrange(from_at, to_at) with &&)
    )`);
  await run(`create index probe_assignments_batch on probe_assignments (batch_id)`);

  await run(`
    create table calibration_points (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      sensor_id integer not null references sensors on delete cascade,
      at timestamptz not null,
      inclination double precision not null,
      gravity double precision not null,
      temperature double precision not null,
      source text not null check (source in ('water', 'sugar', 'hydrometer')),
      sugar_g_per_l double precision,
      entry_id uuid references entries on delete set null,
      created_by uuid references people on delete set null,
      created_at timestamptz not null default now(),
      removed_at timestamptz
    )`);
  await run(`create index calibration_points_sensor on calibration_points (sensor_id) where removed_at is null`);

  // A version is never changed: what a reading was turned by can be read afterwards.
  await run(`
    create table calibrations (
      id integer generated always as identity primary key,
      cellar_id uuid not null references cellars on delete cascade,
      sensor_id integer not null references sensors on delete cascade,
      version integer not null,
      applies_from timestamptz not null,
      -- In powers of the inclination in degrees; null: the gravity it sends is taken, moved by the offset.
      coefficients double precision[],
      low_deg double precision,
      high_deg double precision,
      offset_sg double precision not null default 0,
      corrects_temperature boolean not null default true,
      sigma double precision,
      points jsonb not null default '[]',
      note text,
      created_by uuid references people on delete set null,
      created_at timestamptz not null default now(),
      removed_at timestamptz,
      removed_by uuid references people on delete set null,
      unique (sensor_id, version)
    )`);
  await run(`create index calibrations_sensor on calibrations (sensor_id, applies_from desc) where removed_at is null`);

  // Null in both: the gravity is the one that was sent.
  await run(`alter table readings add column gravity_sent double precision, add column calibration_id integer`);

  // Readings that a calibration still has to turn; asked for in its transaction, done by the worker.
  await run(`
    create table recalculations (
      id bigint generated always as identity primary key,
      cellar_id uuid not null references cellars on delete cascade,
      sensor_id integer not null references sensors on delete cascade,
      from_at timestamptz not null,
      asked_at timestamptz not null default now(),
      leased_until timestamptz,
      next_at timestamptz not null default now(),
      changed integer not null default 0,
      done_at timestamptz
    )`);
  await run(`create index recalculations_open on recalculations (next_at) where done_at is null`);
  await run(`create index recalculations_sensor on recalculations (sensor_id) where done_at is null`);

  await run(`
    create table sensor_limits (
      cellar_id uuid primary key references cellars on delete cascade,
      low_battery_days integer not null default 14,
      empty_battery_v double precision not null default 3.3,
      weak_signal_dbm integer not null default -80,
      missed_percent integer not null default 10,
      clock_offset_s integer not null default 300
    )`);

  await run(`
    create table imports (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      kind text not null check (kind in ('readings', 'batches', 'archive')),
      file_name text not null,
      counts jsonb not null,
      -- The file sensor that carries imported readings.
      sensor_id integer references sensors on delete set null,
      batch_id uuid references batches on delete set null,
      created_by uuid references people on delete set null,
      created_at timestamptz not null default now(),
      undone_at timestamptz,
      undone_by uuid references people on delete set null
    )`);
  await run(`create index imports_cellar on imports (cellar_id, created_at desc)`);
  await run(`alter table batches add column import_id uuid references imports on delete set null`);
  await run(`create index batches_import on batches (import_id) where import_id is not null`);

  await run(`
    create table photos (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      entry_id uuid references entries on delete cascade,
      lot_id uuid references lots on delete cascade,
      tasting_id uuid references tastings on delete cascade,
      bytes integer not null,
      width integer not null,
      height integer not null,
      caption text,
      created_by uuid references people on delete set null,
      created_at timestamptz not null default now(),
      removed_at timestamptz,
      check (num_nonnulls(entry_id, lot_id, tasting_id) = 1)
    )`);
  await run(`create index photos_entry on photos (entry_id) where removed_at is null`);
  await run(`create index photos_lot on photos (lot_id) where removed_at is null`);
  await run(`create index photos_tasting on photos (tasting_id) where removed_at is null`);

  await run(`
    create table webhooks (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      url text not null,
      events text[] not null,
      -- Sealed with a key made from AUTH_SECRET: each delivery has to be signed with it.
      secret bytea not null,
      note text,
      disabled_at timestamptz,
      created_by uuid references people on delete set null,
      created_at timestamptz not null default now()
    )`);
  await run(`create index webhooks_cellar on webhooks (cellar_id)`);
  await run(`
    create table webhook_deliveries (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      webhook_id uuid not null references webhooks on delete cascade,
      event text not null,
      payload jsonb not null,
      created_at timestamptz not null default now(),
      next_attempt_at timestamptz not null default now(),
      leased_until timestamptz,
      attempts integer not null default 0,
      delivered_at timestamptz,
      failed_at timestamptz,
      last_status integer,
      last_error text
    )`);
  await run(`create index webhook_deliveries_due on webhook_deliveries (next_attempt_at) where delivered_at is null and failed_at is null`);
  await run(`create index webhook_deliveries_webhook on webhook_deliveries (webhook_id, created_at desc)`);
};

export const down: Migration['down'] = async (run) => {
  await run(`drop table if exists webhook_deliveries, webhooks, photos cascade`);
  await run(`alter table batches drop column import_id`);
  await run(`drop table if exists imports, sensor_limits, recalculations cascade`);
  await run(`alter table readings drop column gravity_sent, drop column calibration_id`);
  await run(`drop table if exists calibrations, calibration_points, probe_assignments cascade`);
  await run(`
    alter table sensors
      drop column removed_at, drop column settings_version, drop column wanted_interval_s, drop column settings_at, drop column confirmed_version, drop column confirmed_at`);
};
