import type { Migration } from './types';

/** Must sheets, cellar work, rounds, bottles, tastings, share links. */
export const up: Migration['up'] = async (run) => {
  await run(`
    create table catalogue_items (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      sort text not null check (sort in ('ingredient', 'yeast')),
      body jsonb not null,
      created_by uuid references people on delete set null,
      created_at timestamptz not null default now(),
      removed_at timestamptz
    )`);
  await run(`create index catalogue_items_cellar on catalogue_items (cellar_id) where removed_at is null`);

  await run(`
    create table must_sheets (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      name text not null,
      kind text not null,
      latest integer not null default 1,
      changed_at timestamptz not null default now(),
      archived_at timestamptz,
      created_at timestamptz not null default now()
    )`);
  await run(`create index must_sheets_cellar on must_sheets (cellar_id, changed_at desc, id)`);

  // A version is never changed: a batch keeps the sheet it was made from.
  await run(`
    create table must_versions (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      must_id uuid not null references must_sheets on delete cascade,
      version integer not null,
      body jsonb not null,
      -- What the list shows of it: volume, original gravity, strength, each with its spread.
      sketch jsonb not null default '{}',
      change_note text,
      copied_from uuid references must_versions on delete set null,
      created_by uuid references people on delete set null,
      created_at timestamptz not null default now(),
      unique (must_id, version)
    )`);
  await run(`create index must_versions_copied on must_versions (copied_from) where copied_from is not null`);

  await run(`alter table batches add column must_version_id uuid references must_versions on delete set null`);
  // Part of what the sheet made that is in this batch: a split takes its share along, for the cost of a bottle.
  await run(`alter table batches add column must_share double precision not null default 1 check (must_share >= 0 and must_share <= 1)`);
  await run(`create index batches_must_version on batches (must_version_id) where must_version_id is not null`);

  await run(`alter table entries add column detail jsonb`);
  await run(`alter table entries add column revised_at timestamptz`);
  await run(`
    create table entry_revisions (
      id bigint generated always as identity primary key,
      cellar_id uuid not null references cellars on delete cascade,
      entry_id uuid not null references entries on delete cascade,
      at timestamptz not null,
      person_id uuid references people on delete set null,
      before jsonb not null
    )`);
  await run(`create index entry_revisions_entry on entry_revisions (entry_id, id desc)`);

  await run(`
    create table batch_links (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      from_batch uuid not null references batches on delete cascade,
      to_batch uuid not null references batches on delete cascade,
      kind text not null check (kind in ('split', 'blend', 'top_up')),
      litres double precision not null check (litres > 0),
      at timestamptz not null,
      person_id uuid references people on delete set null,
      check (from_batch <> to_batch)
    )`);
  await run(`create index batch_links_from on batch_links (from_batch)`);
  await run(`create index batch_links_to on batch_links (to_batch)`);

  await run(`
    create table finings (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      batch_id uuid not null references batches on delete cascade,
      fining text not null,
      interval_min integer,
      settle_days double precision not null,
      first_at timestamptz not null,
      second_at timestamptz,
      person_id uuid references people on delete set null
    )`);
  await run(`create index finings_batch on finings (batch_id, first_at desc)`);

  await run(`
    create table places (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      name text not null,
      capacity integer check (capacity > 0),
      temperature_c double precision,
      created_at timestamptz not null default now(),
      removed_at timestamptz
    )`);
  await run(`create unique index places_name on places (cellar_id, lower(name)) where removed_at is null`);

  await run(`
    create table lots (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      batch_id uuid not null references batches on delete cascade,
      code text not null,
      name text not null,
      bottled_at timestamptz not null,
      ready_from timestamptz not null,
      volume_l double precision not null check (volume_l > 0),
      original_gravity double precision,
      final_gravity double precision,
      abv jsonb,
      sparkle text not null check (sparkle in ('still', 'light', 'sparkling')),
      -- The plan, the dose and the pressures as they were judged on the day.
      bench jsonb not null,
      override_reason text,
      override_by uuid references people on delete set null,
      override_at timestamptz,
      caution text,
      note text,
      next_time text,
      next_time_by uuid references people on delete set null,
      next_time_at timestamptz,
      cost jsonb not null default '{}',
      created_by uuid references people on delete set null,
      created_at timestamptz not null default now()
    )`);
  await run(`create unique index lots_code on lots (cellar_id, lower(code))`);
  await run(`create index lots_cellar on lots (cellar_id, bottled_at desc, id)`);
  await run(`create index lots_batch on lots (batch_id)`);

  await run(`
    create table lot_bottles (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      lot_id uuid not null references lots on delete cascade,
      position integer not null,
      kind text not null,
      closure text not null,
      size_ml integer not null check (size_ml > 0),
      -- Null: glass that must stay still.
      rating_bar double precision,
      rating_confirmed boolean not null,
      count integer not null check (count > 0),
      -- Upper ends as they were judged: volumes as asked and at worst, bar at each place.
      pressure jsonb not null
    )`);
  await run(`create index lot_bottles_lot on lot_bottles (lot_id, position)`);

  // How many of a lot's bottles of one kind stand where; an empty place has no row.
  await run(`
    create table bottle_stands (
      lot_bottle_id uuid not null references lot_bottles on delete cascade,
      place_id uuid references places on delete set null,
      count integer not null check (count > 0),
      cellar_id uuid not null references cellars on delete cascade
    )`);
  await run(`create unique index bottle_stands_where on bottle_stands (lot_bottle_id, coalesce(place_id, '00000000-0000-0000-0000-000000000000'::uuid))`);
  await run(`create index bottle_stands_place on bottle_stands (place_id)`);

  await run(`
    create table bottle_moves (
      id bigint generated always as identity primary key,
      cellar_id uuid not null references cellars on delete cascade,
      lot_id uuid not null references lots on delete cascade,
      lot_bottle_id uuid not null references lot_bottles on delete cascade,
      from_place uuid references places on delete set null,
      to_place uuid references places on delete set null,
      count integer not null check (count > 0),
      at timestamptz not null,
      person_id uuid references people on delete set null,
      override_reason text
    )`);
  await run(`create index bottle_moves_lot on bottle_moves (lot_id, at desc)`);

  await run(`
    create table openings (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      lot_id uuid not null references lots on delete cascade,
      lot_bottle_id uuid not null references lot_bottles on delete cascade,
      place_id uuid references places on delete set null,
      kind text not null check (kind in ('opened', 'given', 'broken', 'gushed')),
      count integer not null check (count > 0),
      at timestamptz not null,
      given_to text,
      note text,
      person_id uuid references people on delete set null,
      client_id uuid,
      removed_at timestamptz
    )`);
  await run(`create index openings_lot on openings (lot_id, at desc)`);
  await run(`create unique index openings_client on openings (cellar_id, client_id) where client_id is not null`);

  await run(`
    create table shares (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      batch_id uuid not null references batches on delete cascade,
      token_hash bytea not null unique,
      expires_at timestamptz not null,
      revoked_at timestamptz,
      show_people boolean not null default false,
      takes_tastings boolean not null default true,
      looked_at integer not null default 0,
      last_looked_at timestamptz,
      created_by uuid references people on delete set null,
      created_at timestamptz not null default now()
    )`);
  await run(`create index shares_cellar on shares (cellar_id, created_at desc)`);
  await run(`create index shares_batch on shares (batch_id)`);

  await run(`
    create table tastings (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      lot_id uuid not null references lots on delete cascade,
      person_id uuid references people on delete set null,
      share_id uuid references shares on delete set null,
      guest_name text,
      at timestamptz not null,
      look smallint check (look between 1 and 5),
      smell smallint check (smell between 1 and 5),
      taste smallint check (taste between 1 and 5),
      balance smallint check (balance between 1 and 5),
      sparkle text check (sparkle in ('flat', 'less', 'as_planned', 'more', 'gushing')),
      score double precision check (score between 1 and 10),
      words text,
      next_time text,
      show_name boolean not null default false,
      client_id uuid,
      created_at timestamptz not null default now(),
      removed_at timestamptz
    )`);
  await run(`create index tastings_lot on tastings (lot_id, at desc)`);
  await run(`create unique index tastings_client on tastings (cellar_id, client_id) where client_id is not null`);

  await run(`
    create table jobs (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      batch_id uuid references batches on delete cascade,
      lot_id uuid references lots on delete cascade,
      fining_id uuid references finings on delete cascade,
      kind text not null,
      title text not null,
      note text,
      source text not null check (source in ('call', 'schedule', 'timer', 'person')),
      -- One job an occasion: the key of what it is about, for as long as that lasts.
      dedupe_key text,
      due_at timestamptz not null,
      exact boolean not null default false,
      repeat_days integer check (repeat_days > 0),
      repeats uuid references jobs on delete set null,
      taken_by uuid references people on delete set null,
      taken_at timestamptz,
      snoozed_until timestamptz,
      done_at timestamptz,
      done_by uuid references people on delete set null,
      dropped_at timestamptz,
      -- When the program last saw the reason for it, and when it saw it gone.
      seen_at timestamptz,
      over_at timestamptz,
      created_by uuid references people on delete set null,
      created_at timestamptz not null default now()
    )`);
  await run(`create unique index jobs_occasion on jobs (dedupe_key) where dedupe_key is not null and over_at is null`);
  await run(`create index jobs_open on jobs (cellar_id, due_at, id) where done_at is null and dropped_at is null`);
  await run(`create index jobs_batch on jobs (batch_id) where batch_id is not null`);
  await run(`create index jobs_lot on jobs (lot_id) where lot_id is not null`);
  await run(`create index jobs_done on jobs (cellar_id, done_at desc) where done_at is not null`);

  await run(`
    create table calendar_feeds (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      person_id uuid not null references people on delete cascade,
      token_hash bytea not null unique,
      created_at timestamptz not null default now(),
      last_read_at timestamptz,
      revoked_at timestamptz
    )`);
  await run(`create unique index calendar_feeds_person on calendar_feeds (cellar_id, person_id) where revoked_at is null`);
};

export const down: Migration['down'] = async (run) => {
  await run(`drop table if exists calendar_feeds, jobs, tastings, shares, openings, bottle_moves, bottle_stands, lot_bottles, lots, places, finings, batch_links, entry_revisions cascade`);
  await run(`alter table entries drop column detail, drop column revised_at`);
  await run(`alter table batches drop column must_version_id, drop column must_share`);
  await run(`drop table if exists must_versions, must_sheets, catalogue_items cascade`);
};
