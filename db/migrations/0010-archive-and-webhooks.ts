import type { Migration } from './types';

/** What an archive brought besides batches, to be taken out again; since when a webhook fails. */
export const up: Migration['up'] = async (run) => {
  await run(`alter table imports add column made jsonb not null default '{}'`);
  // Null where the last try arrived.
  await run(`alter table webhooks add column failing_since timestamptz`);
  // Switched off by the house, not by a person; disabled_at is set with it.
  await run(`alter table webhooks add column given_up_at timestamptz`);
};

export const down: Migration['down'] = async (run) => {
  await run(`alter table webhooks drop column given_up_at, drop column failing_since`);
  await run(`alter table imports drop column made`);
};
