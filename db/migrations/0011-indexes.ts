import type { Migration } from './types';

/** Lists that are read newest first are read from an index in that order. */
export const up: Migration['up'] = async (run) => {
  // audit_cellar stays: it serves the days of a filter.
  await run(`create index audit_cellar_newest on audit (cellar_id, id desc)`);
  await run(`create index audit_person_newest on audit (person_id, id desc)`);
  await run(`drop index audit_person`);
  // alerts_cellar stays: it serves the counts by state.
  await run(`create index alerts_cellar_newest on alerts (cellar_id, opened_at desc, id desc)`);
  await run(`create index outbox_person_newest on outbox (person_id, created_at desc)`);
};

export const down: Migration['down'] = async (run) => {
  await run(`drop index outbox_person_newest, alerts_cellar_newest`);
  await run(`create index audit_person on audit (person_id, at desc)`);
  await run(`drop index audit_person_newest, audit_cellar_newest`);
};
