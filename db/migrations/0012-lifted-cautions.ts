import type { Migration } from './types';

/** Cautions that were taken off a lot are the lot's own history, which leaves with it; the trail stays where it was written. */
export const up: Migration['up'] = async (run) => {
  await run(`
    create table caution_lifts (
      id uuid primary key default gen_random_uuid(),
      cellar_id uuid not null references cellars on delete cascade,
      lot_id uuid not null references lots on delete cascade,
      caution text not null,
      reason text not null,
      person_id uuid references people on delete set null,
      at timestamptz not null default now()
    )`);
  await run(`create index caution_lifts_lot on caution_lifts (lot_id, at desc)`);
  await run(`
    insert into caution_lifts (cellar_id, lot_id, caution, reason, person_id, at)
    select l.cellar_id, l.id, a.detail->>'caution', a.detail->>'reason', a.person_id, a.at
    from audit a join lots l on l.id::text = a.subject and l.cellar_id = a.cellar_id
    where a.action = 'lot.caution-lifted' and a.detail->>'caution' is not null and a.detail->>'reason' is not null
    order by a.id`);
};

export const down: Migration['down'] = async (run) => {
  await run(`drop table caution_lifts`);
};
