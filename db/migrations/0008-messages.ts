import type { Migration } from './types';

/** Rules as a cellar sets them, who is told by which means and when, mutes, turns, push, links that take an alert. */
export const up: Migration['up'] = async (run) => {
  await run(`alter table outbox drop constraint outbox_means_check`);
  await run(`alter table outbox add constraint outbox_means_check check (means in ('mail', 'push'))`);
  // Why it waits: the person's quiet hours, a mute of the vessel, or its turn after others who may answer.
  await run(`alter table outbox add column held_by text check (held_by in ('quiet', 'mute', 'turn'))`);
  // Given up because nobody had to hear it any more; failed_at is set with it.
  await run(`alter table outbox add column dropped_at timestamptz`);

  // A batch's own setting goes before the cellar's; what is null is the rule's usual.
  await run(`
    create table rule_settings (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      batch_id uuid references batches on delete cascade,
      rule text not null,
      enabled boolean not null default true,
      for_min integer check (for_min >= 0),
      keep_min integer check (keep_min >= 0)
    )`);
  await run(`create unique index rule_settings_cellar on rule_settings (cellar_id, rule) where batch_id is null`);
  await run(`create unique index rule_settings_batch on rule_settings (batch_id, rule) where batch_id is not null`);

  // Only what differs from the usual is kept.
  await run(`
    create table message_choices (
      cellar_id uuid not null,
      person_id uuid not null,
      rule text not null,
      means text not null check (means in ('mail', 'push')),
      wanted boolean not null,
      primary key (cellar_id, person_id, rule, means),
      foreign key (cellar_id, person_id) references memberships on delete cascade
    )`);

  // Minutes after midnight on the person's own clock.
  await run(`
    create table message_times (
      person_id uuid primary key references people on delete cascade,
      quiet_from smallint check (quiet_from between 0 and 1439),
      quiet_to smallint check (quiet_to between 0 and 1439),
      digest_at smallint check (digest_at between 0 and 1439),
      check ((quiet_from is null) = (quiet_to is null)),
      check (quiet_from <> quiet_to)
    )`);

  await run(`
    create table escalations (
      cellar_id uuid primary key references cellars on delete cascade,
      after_min integer not null check (after_min between 1 and 1440),
      people uuid[] not null
    )`);

  await run(`
    create table mutes (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      batch_id uuid not null references batches on delete cascade,
      muted_by uuid references people on delete set null,
      from_at timestamptz not null,
      until_at timestamptz not null,
      ended_at timestamptz,
      ended_by uuid references people on delete set null,
      check (until_at > from_at)
    )`);
  await run(`create index mutes_batch on mutes (batch_id, until_at) where ended_at is null`);

  // A device belongs to the sign-in that registered it: signed out, it hears nothing more.
  await run(`
    create table push_subscriptions (
      id uuid primary key default gen_random_uuid(),
      person_id uuid not null references people on delete cascade,
      sign_in_id uuid not null references sign_ins on delete cascade,
      endpoint text not null unique,
      p256dh text not null,
      auth text not null,
      user_agent text not null default '',
      created_at timestamptz not null default now(),
      last_taken_at timestamptz,
      last_error text
    )`);
  await run(`create index push_subscriptions_person on push_subscriptions (person_id)`);

  // A link in a mail takes one alert for one person, once.
  await run(`
    create table take_links (
      id uuid primary key,
      cellar_id uuid not null references cellars on delete cascade,
      alert_id uuid not null references alerts on delete cascade,
      person_id uuid not null references people on delete cascade,
      token_hash bytea not null unique,
      expires_at timestamptz not null,
      used_at timestamptz,
      unique (alert_id, person_id)
    )`);
};

export const down: Migration['down'] = async (run) => {
  await run(`drop table take_links, push_subscriptions, mutes, escalations, message_times, message_choices, rule_settings`);
  await run(`delete from outbox where means <> 'mail'`);
  await run(`alter table outbox drop column dropped_at, drop column held_by`);
  await run(`alter table outbox drop constraint outbox_means_check`);
  await run(`alter table outbox add constraint outbox_means_check check (means in ('mail'))`);
};
