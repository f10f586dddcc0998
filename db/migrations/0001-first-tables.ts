import type { Migration } from './types';

/** People, cellars, batches, sensors, readings, judgements, alerts. */
export const up: Migration['up'] = async (run) => {
  await run(`create extension if not exists btree_gist`);

  await run(`
    create table people (
      id uuid primary key default gen_random_uuid(),
      name text not null,
      email text not null,
      password_hash text,
      time_zone text not null default 'UTC',
      created_at timestamptz not null default now()
    )`);
  await run(`create unique index people_email on people (lower(email))`);

  // A session that can be ended from afar is a row: the signed cookie only names it.
  await run(`
    create table sign_ins (
      id uuid primary key default gen_random_uuid(),
      person_id uuid not null references people on delete cascade,
      user_agent text not null default '',
      created_at timestamptz not null default now(),
      last_seen_at timestamptz not null default now(),
      expires_at timestamptz not null,
      ended_at timestamptz
    )`);
  await run(`create index sign_ins_person on sign_ins (person_id) where ended_at is null`);

  // Tries at signing in, by account and by address. Losing them in a crash gives a guesser nothing of worth.
  await run(`
    create unlogged table sign_in_tries (
      key text primary key,
      tries integer not null,
      last_at timestamptz not null,
      locked_until timestamptz not null
    )`);

  await run(`
    create table cellars (
      id uuid primary key default gen_random_uuid(),
      name text not null,
      time_zone text not null default 'UTC',
      created_at timestamptz not null default now()
    )`);
  await run(`
    create table memberships (
      cellar_id uuid not null references cellars on delete cascade,
      person_id uuid not null references people on delete cascade,
      role text not null check (role in ('keeper', 'brewer', 'hand', 'guest')),
      created_at timestamptz not null default now(),
      primary key (cellar_id, person_id)
    )`);
  await run(`create index memberships_person on memberships (person_id)`);

  await run(`
    create table batches (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      name text not null,
      kind text not null check (kind in ('beer', 'cider', 'mead', 'wine')),
      drink_colour text not null,
      vessel_kind text not null check (vessel_kind in ('demijohn', 'carboy', 'flask')),
      tag integer,
      place text,
      volume_l double precision not null check (volume_l > 0),
      vessel_l double precision not null check (vessel_l >= volume_l),
      neck text not null check (neck in ('blow_off', 'airlock', 'bung', 'open')),
      pitched_at timestamptz,
      original_gravity double precision,
      yeast text,
      attenuation_min_percent double precision,
      attenuation_max_percent double precision,
      alcohol_tolerance_abv double precision,
      temperature_min_c double precision,
      temperature_max_c double precision,
      state text not null default 'working' check (state in ('working', 'ended')),
      ended_at timestamptz,
      created_by uuid references people on delete set null,
      created_at timestamptz not null default now(),
      updated_at timestamptz not null default now()
    )`);
  await run(`create index batches_cellar on batches (cellar_id, state, created_at desc, id)`);

  await run(`
    create table entries (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      batch_id uuid not null references batches on delete cascade,
      kind text not null,
      at timestamptz not null,
      text text,
      gravity double precision,
      gravity_read double precision,
      temperature_c double precision,
      calibrated_at_c double precision,
      neck text,
      volume_l double precision,
      sugar_g double precision,
      fruit_g double precision,
      person_id uuid references people on delete set null,
      client_id uuid,
      created_at timestamptz not null default now(),
      -- Taken back, not erased: the past stays explainable.
      removed_at timestamptz,
      removed_by uuid references people on delete set null
    )`);
  await run(`create index entries_batch on entries (batch_id, at desc, id)`);
  await run(`create unique index entries_client on entries (cellar_id, client_id) where client_id is not null`);

  // A small key keeps the covering index of readings small.
  await run(`
    create table sensors (
      id integer generated always as identity primary key,
      cellar_id uuid not null references cellars on delete cascade,
      identifier text not null unique,
      secret_hash bytea not null,
      name text not null,
      kind text not null default 'float',
      interval_s integer not null default 900,
      disabled_at timestamptz,
      created_at timestamptz not null default now()
    )`);
  await run(`create index sensors_cellar on sensors (cellar_id)`);

  // One sensor is in one batch at a time; a late reading goes where the sensor was then.
  await run(`
    create table assignments (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      sensor_id integer not null references sensors on delete cascade,
      batch_id uuid not null references batches on delete cascade,
      from_at timestamptz not null,
      to_at timestamptz,
      check (to_at is null or to_at > from_at),
      exclude using gist (sensor_id with =, tstzrange(from_at, to_at) with &&)
    )`);
  await run(`create index assignments_batch on assignments (batch_id)`);
  await run(`create index assignments_sensor on assignments (sensor_id, from_at desc)`);

  // The key carries what charts and the analysis read: the index alone answers them.
  await run(`
    create table readings (
      sensor_id integer not null,
      measured_at timestamptz not null,
      received_at timestamptz not null default now(),
      gravity double precision,
      temperature real,
      battery real,
      signal real,
      inclination real,
      foam real,
      sequence bigint,
      primary key (sensor_id, measured_at) include (gravity, temperature, battery, signal, received_at)
    ) partition by range (measured_at)`);

  await run(`
    create table sensor_latest (
      sensor_id integer primary key references sensors on delete cascade,
      measured_at timestamptz not null,
      received_at timestamptz not null,
      gravity double precision,
      temperature real,
      battery real,
      signal real,
      sequence bigint
    ) with (fillfactor = 50)`);

  await run(`
    create table refusals (
      id bigint generated always as identity primary key,
      sensor_id integer references sensors on delete cascade,
      received_at timestamptz not null default now(),
      road text not null check (road in ('mqtt', 'http')),
      reason text not null,
      body bytea not null
    )`);
  await run(`create index refusals_sensor on refusals (sensor_id, received_at desc)`);
  await run(`create index refusals_age on refusals (received_at)`);

  await run(`
    create table batch_states (
      batch_id uuid primary key references batches on delete cascade,
      cellar_id uuid not null references cellars on delete cascade,
      assessed_at timestamptz not null,
      assessment jsonb not null,
      curve jsonb not null default '[]',
      expected jsonb not null default '[]'
    )`);
  // Kept whenever a verdict changes, so that the past can be explained.
  await run(`
    create table assessments (
      id bigint generated always as identity primary key,
      cellar_id uuid not null references cellars on delete cascade,
      batch_id uuid not null references batches on delete cascade,
      at timestamptz not null,
      changed text[] not null,
      assessment jsonb not null
    )`);
  await run(`create index assessments_batch on assessments (batch_id, at desc)`);

  await run(`
    create table alerts (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      batch_id uuid not null references batches on delete cascade,
      call text not null,
      kind text,
      level text not null check (level in ('act', 'check', 'know')),
      state text not null check (state in ('open', 'acknowledged', 'resolved')),
      since timestamptz not null,
      opened_at timestamptz not null,
      acknowledged_at timestamptz,
      acknowledged_by uuid references people on delete set null,
      note text,
      look_again_at timestamptz,
      resolved_at timestamptz,
      resolved_by uuid references people on delete set null,
      evidence jsonb not null
    )`);
  await run(`create index alerts_cellar on alerts (cellar_id, state, opened_at desc, id)`);
  await run(`create index alerts_batch on alerts (batch_id, opened_at desc)`);

  // Where each rule's state machine stands, so that a restart goes on where it was.
  await run(`
    create table alert_states (
      batch_id uuid not null references batches on delete cascade,
      rule text not null,
      state jsonb not null,
      alert_id uuid references alerts on delete set null,
      updated_at timestamptz not null default now(),
      primary key (batch_id, rule)
    )`);

  await run(`
    create table outbox (
      id bigint generated always as identity primary key,
      cellar_id uuid references cellars on delete cascade,
      alert_id uuid references alerts on delete cascade,
      person_id uuid references people on delete cascade,
      means text not null check (means in ('mail')),
      dedupe_key text not null unique,
      payload jsonb not null,
      created_at timestamptz not null default now(),
      next_attempt_at timestamptz not null default now(),
      -- A sender that has taken it; when that time passes the sender died and another may.
      leased_until timestamptz,
      attempts integer not null default 0,
      sent_at timestamptz,
      failed_at timestamptz,
      last_error text
    )`);
  await run(`create index outbox_due on outbox (next_attempt_at) where sent_at is null and failed_at is null`);
  await run(`create index outbox_alert on outbox (alert_id)`);
  await run(`create index outbox_person on outbox (person_id) where sent_at is null and failed_at is null`);

  // Where the watch over the house's own parts stands (is the ingest up, and since when).
  await run(`
    create table system_states (
      rule text primary key,
      state jsonb not null,
      updated_at timestamptz not null default now()
    )`);

  await run(`
    create table audit (
      id bigint generated always as identity primary key,
      cellar_id uuid references cellars on delete cascade,
      person_id uuid references people on delete set null,
      at timestamptz not null default now(),
      action text not null,
      subject text not null,
      detail jsonb not null default '{}'
    )`);
  await run(`create index audit_cellar on audit (cellar_id, at desc)`);

  // Each process says that it lives; /api/health reads it.
  await run(`
    create table heartbeats (
      part text not null,
      instance text not null,
      at timestamptz not null,
      detail jsonb not null default '{}',
      primary key (part, instance)
    )`);
};

export const down: Migration['down'] = async (run) => {
  await run(`
    drop table if exists heartbeats, audit, system_states, outbox, alert_states, alerts, assessments, batch_states, refusals,
      sensor_latest, readings, assignments, sensors, entries, batches, memberships, cellars, sign_in_tries, sign_ins, people cascade`);
};
