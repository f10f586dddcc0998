import { QueryTypes, type Transaction } from 'sequelize';
import { CALL_OF_KIND } from '@/lib/core/rounds/wanted';
import { database } from '../client';
import type { Job } from '../models';

export interface JobRow extends Pick<Job, 'id' | 'kind' | 'title' | 'note' | 'source' | 'exact' | 'repeatDays' | 'snoozedUntil' | 'doneAt' | 'droppedAt'> {
  /** A snooze moves it. */
  dueAt: Date;
  dueAtText: string;
  batch: { id: string; name: string; tag: number | null; place: string | null; vesselKind: string; drinkColour: string; neck: string; volumeL: number; vesselL: number } | null;
  lot: { id: string; code: string; name: string; place: string | null } | null;
  /** Of the call it comes from, in the last judgement. */
  evidence: { name: string; value: number; threshold: number | null; unit: string }[] | null;
  takenBy: { id: string; name: string } | null;
  doneBy: { id: string; name: string } | null;
  createdBy: { id: string; name: string } | null;
}

export interface JobFilter {
  cellarId: string;
  id?: string;
  state?: 'open' | 'done' | 'dropped';
  until?: Date;
  batchId?: string;
  lotId?: string;
  order?: 'due' | 'walk';
  after?: { at: string; key: string } | null;
  limit: number;
}

const DUE = 'greatest(j.due_at, coalesce(j.snoozed_until, j.due_at))';
const person = (alias: string) => `case when ${alias}.id is not null then json_build_object('id', ${alias}.id, 'name', ${alias}.name) end`;

/** Jobs with what they are about and who has them; open ones by time or in the order of the walk, done ones newest first. */
export function findJobs(filter: JobFilter, transaction?: Transaction): Promise<JobRow[]> {
  const past = filter.state === 'done' || filter.state === 'dropped';
  const order = past ? `coalesce(j.done_at, j.dropped_at) desc, j.id desc` : filter.order === 'walk' ? `coalesce(b.place, stand.place) nulls last, b.tag nulls last, ${DUE}, j.id` : `${DUE}, j.id`;
  const at = past ? 'coalesce(j.done_at, j.dropped_at)' : DUE;
  const conditions = ['j.cellar_id = $cellarId'];
  if (filter.id !== undefined) conditions.push('j.id = $id');
  if (filter.state === 'open') conditions.push('j.done_at is null and j.dropped_at is null');
  if (filter.state === 'done') conditions.push('j.done_at is not null');
  if (filter.state === 'dropped') conditions.push('j.dropped_at is not null and j.done_at is null');
  if (filter.until !== undefined) conditions.push(`${DUE} <= $until`);
  if (filter.batchId !== undefined) conditions.push('j.batch_id = $batchId');
  if (filter.lotId !== undefined) conditions.push('j.lot_id = $lotId');
  if (filter.after) conditions.push(past ? `(${at}, j.id) < ($afterAt::timestamptz, $afterKey::uuid)` : `(${at}, j.id) > ($afterAt::timestamptz, $afterKey::uuid)`);
  return database().query<JobRow>(
    `select j.id, j.kind, j.title, j.note, j.source, j.exact, j.repeat_days as "repeatDays", j.snoozed_until as "snoozedUntil", j.done_at as "doneAt", j.dropped_at as "droppedAt",
       ${DUE} as "dueAt", (${at})::text as "dueAtText",
       case when b.id is not null then json_build_object('id', b.id, 'name', b.name, 'tag', b.tag, 'place', b.place, 'vesselKind', b.vessel_kind, 'drinkColour', b.drink_colour, 'neck', b.neck, 'volumeL', b.volume_l, 'vesselL', b.vessel_l) end as batch,
       case when l.id is not null then json_build_object('id', l.id, 'code', l.code, 'name', l.name, 'place', stand.place) end as lot,
       case when j.source = 'call' then s.assessment #> array['calls', $callOf::jsonb ->> j.kind, 'evidence'] end as evidence,
       ${person('taker')} as "takenBy", ${person('doer')} as "doneBy", ${person('maker')} as "createdBy"
     from jobs j
     left join batches b on b.id = j.batch_id
     left join batch_states s on s.batch_id = j.batch_id
     left join lots l on l.id = j.lot_id
     left join lateral (
       select p.name as place from bottle_stands s join lot_bottles lb on lb.id = s.lot_bottle_id join places p on p.id = s.place_id where lb.lot_id = l.id order by s.count desc limit 1
     ) stand on true
     left join people taker on taker.id = j.taken_by
     left join people doer on doer.id = j.done_by
     left join people maker on maker.id = j.created_by
     where ${conditions.join(' and ')}
     order by ${order} limit $limit`,
    {
      bind: {
        cellarId: filter.cellarId,
        limit: filter.limit,
        callOf: JSON.stringify(CALL_OF_KIND),
        ...(filter.id !== undefined && { id: filter.id }),
        ...(filter.until !== undefined && { until: filter.until }),
        ...(filter.batchId !== undefined && { batchId: filter.batchId }),
        ...(filter.lotId !== undefined && { lotId: filter.lotId }),
        ...(filter.after && { afterAt: filter.after.at, afterKey: filter.after.key }),
      },
      type: QueryTypes.SELECT,
      transaction,
    },
  );
}
