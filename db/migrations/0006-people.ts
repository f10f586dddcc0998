import type { Migration } from './types';

/** Invitations, one-time links, letters, second factor, API tokens, a person's units, and from where the audit trail's lines came. */
export const up: Migration['up'] = async (run) => {
  await run(`
    alter table people
      add column locale text not null default 'en',
      add column gravity_unit text not null default 'sg' check (gravity_unit in ('sg', 'brix', 'plato')),
      add column temperature_unit text not null default 'c' check (temperature_unit in ('c', 'f')),
      add column volume_unit text not null default 'l' check (volume_unit in ('l', 'us_gal', 'imp_gal')),
      -- Sealed with a key made from the server's secret: a copy of the database alone gives no codes.
      add column totp_sealed bytea,
      add column totp_confirmed_at timestamptz,
      -- The last period whose code was taken, so that none is taken twice (RFC 6238 5.2).
      add column totp_last_step bigint`);

  // A sign-in that nobody uses ends before its time is up.
  await run(`alter table sign_ins add column idle_s integer not null default 1209600`);

  await run(`
    create table recovery_codes (
      id uuid primary key default gen_random_uuid(),
      person_id uuid not null references people on delete cascade,
      code_hash bytea not null,
      used_at timestamptz
    )`);
  await run(`create index recovery_codes_person on recovery_codes (person_id)`);

  // What a mail's link does, once. For an address that nobody has, the row stands without a person and no mail goes.
  await run(`
    create table account_links (
      id uuid primary key default gen_random_uuid(),
      kind text not null check (kind in ('sign-in', 'password', 'mail-old', 'mail-new')),
      person_id uuid references people on delete cascade,
      token_hash bytea not null unique,
      new_email text,
      created_at timestamptz not null default now(),
      expires_at timestamptz not null,
      used_at timestamptz
    )`);
  await run(`create index account_links_person on account_links (person_id)`);

  await run(`
    create table invitations (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      email text not null,
      role text not null check (role in ('keeper', 'brewer', 'hand', 'guest')),
      token_hash bytea not null unique,
      invited_by uuid references people on delete set null,
      created_at timestamptz not null default now(),
      expires_at timestamptz not null,
      accepted_at timestamptz,
      accepted_by uuid references people on delete set null,
      revoked_at timestamptz
    )`);
  await run(`create unique index invitations_open on invitations (cellar_id, lower(email)) where accepted_at is null and revoked_at is null`);

  await run(`
    create table api_tokens (
      id uuid primary key default gen_random_uuid(),
      person_id uuid not null references people on delete cascade,
      cellar_id uuid not null references cellars on delete cascade,
      role text not null check (role in ('keeper', 'brewer', 'hand', 'guest')),
      name text not null,
      token_hash bytea not null unique,
      last_four text not null,
      created_at timestamptz not null default now(),
      expires_at timestamptz,
      last_used_at timestamptz,
      revoked_at timestamptz
    )`);
  await run(`create index api_tokens_person on api_tokens (person_id, cellar_id)`);

  // Mails about an account or an invitation, each to one address that may belong to nobody yet, sent alone and at once.
  await run(`
    create table letters (
      id bigint generated always as identity primary key,
      cellar_id uuid references cellars on delete cascade,
      person_id uuid references people on delete cascade,
      to_email text not null,
      to_name text not null,
      dedupe_key text not null unique,
      payload jsonb not null,
      created_at timestamptz not null default now(),
      next_attempt_at timestamptz not null default now(),
      leased_until timestamptz,
      attempts integer not null default 0,
      refusals integer not null default 0,
      sent_at timestamptz,
      failed_at timestamptz,
      last_error text
    )`);
  await run(`create index letters_due on letters (next_attempt_at) where sent_at is null and failed_at is null`);

  await run(`alter table audit add column address text, add column means text`);
  await run(`create index audit_person on audit (person_id, at desc)`);
};

export const down: Migration['down'] = async (run) => {
  await run(`drop index if exists audit_person`);
  await run(`alter table audit drop column if exists address, drop column if exists means`);
  await run(`drop table if exists letters, api_tokens, invitations, account_links, recovery_codes`);
  await run(`alter table sign_ins drop column if exists idle_s`);
  await run(`
    alter table people
      drop column if exists locale, drop column if exists gravity_unit, drop column if exists temperature_unit, drop column if exists volume_unit,
      drop column if exists totp_sealed, drop column if exists totp_confirmed_at, drop column if exists totp_last_step`);
};
