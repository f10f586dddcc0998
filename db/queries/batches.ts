import { QueryTypes, type Transaction } from 'sequelize';
import type { DrinkKind, Neck } from '@/lib/core/types';
import { database } from '../client';

/** A batch with what is shown beside it. Times inside JSON columns come as PostgreSQL writes them. */
export interface BatchRow {
  id: string;
  name: string;
  kind: DrinkKind;
  drinkColour: string;
  vesselKind: 'demijohn' | 'carboy' | 'flask';
  tag: number | null;
  place: string | null;
  volumeL: number;
  vesselL: number;
  neck: Neck;
  pitchedAt: Date | null;
  originalGravity: number | null;
  yeast: string | null;
  attenuationMinPercent: number | null;
  attenuationMaxPercent: number | null;
  alcoholToleranceAbv: number | null;
  temperatureMinC: number | null;
  temperatureMaxC: number | null;
  state: 'working' | 'ended';
  endedAt: Date | null;
  createdAt: Date;
  createdAtText: string;
  must: { id: string; versionId: string; name: string; version: number } | null;
  sensor: { id: string; name: string; lastHeardAt: string | null } | null;
  /** The wire form, as it was written. */
  assessment: unknown;
  curve: unknown;
  expected: unknown;
  overruled: Array<{ id: string; call: string; instead: string | null; at: string; by: string | null; reason: string }>;
  alerts: Array<{ id: string; call: string; state: string; openedAt: string; takenBy: string | null }>;
}

interface BatchFilter {
  cellarId: string;
  id?: string;
  state?: 'working' | 'ended';
  /** Working, or ended since then. */
  workingSince?: Date;
  after?: { at: string; key: string } | null;
  limit: number;
  /** Of the shelf: so many of those that stand first are left out. */
  skip?: number;
  /** The picture of the last judgement too. */
  withCurve?: boolean;
}

const ON_SHELF = `(b.state = 'working' or b.ended_at >= $workingSince)`;

/** How many stand on the shelf: at work, or ended since then. */
export async function countShelf(cellarId: string, workingSince: Date): Promise<number> {
  const [row] = await database().query<{ n: number }>(`select count(*)::int as n from batches b where b.cellar_id = $cellarId and ${ON_SHELF}`, { bind: { cellarId, workingSince }, type: QueryTypes.SELECT });
  return row?.n ?? 0;
}

/** Batches of one cellar, newest first, with sensor, last judgement and open alerts, in one statement. The page is cut first: what hangs on a batch is looked up for those that are shown. */
export function findBatches(filter: BatchFilter, transaction?: Transaction): Promise<BatchRow[]> {
  const conditions = ['b.cellar_id = $cellarId'];
  if (filter.id !== undefined) conditions.push('b.id = $id');
  if (filter.state !== undefined) conditions.push('b.state = $state');
  if (filter.workingSince !== undefined) conditions.push(ON_SHELF);
  // On the shelf what wants a person stands first, wherever it is cut.
  const order = filter.workingSince === undefined ? '' : `exists (select 1 from alerts x where x.batch_id = b.id and x.state <> 'resolved') desc, b.state = 'working' desc, `;
  if (filter.after) conditions.push('(b.created_at, b.id) < ($afterAt::timestamptz, $afterKey::uuid)');
  return database().query<BatchRow>(
    `select b.id, b.name, b.kind, b.drink_colour as "drinkColour", b.vessel_kind as "vesselKind", b.tag, b.place,
       b.volume_l as "volumeL", b.vessel_l as "vesselL", b.neck, b.pitched_at as "pitchedAt", b.original_gravity as "originalGravity", b.yeast,
       b.attenuation_min_percent as "attenuationMinPercent", b.attenuation_max_percent as "attenuationMaxPercent",
       b.alcohol_tolerance_abv as "alcoholToleranceAbv", b.temperature_min_c as "temperatureMinC", b.temperature_max_c as "temperatureMaxC",
       b.state, b.ended_at as "endedAt", b.created_at as "createdAt", b.created_at::text as "createdAtText",
       case when mv.id is not null then json_build_object('id', mv.must_id, 'versionId', mv.id, 'name', mv.body->>'name', 'version', mv.version) end as must,
       s.sensor, st.assessment, ${filter.withCurve ? 'st.curve, st.expected' : 'null as curve, null as expected'}, coalesce(ov.overruled, '[]') as overruled, coalesce(al.alerts, '[]') as alerts
     from (select b.* from batches b where ${conditions.join(' and ')} order by ${order}b.created_at desc, b.id desc limit $limit offset $skip) b
     left join batch_states st on st.batch_id = b.id
     left join must_versions mv on mv.id = b.must_version_id
     left join lateral (
       select json_build_object('id', s.identifier, 'name', s.name, 'lastHeardAt', l.received_at) as sensor
       from assignments a join sensors s on s.id = a.sensor_id left join sensor_latest l on l.sensor_id = s.id
       where a.batch_id = b.id and a.to_at is null order by a.from_at desc limit 1
     ) s on true
     left join lateral (
       select json_agg(json_build_object('id', x.id, 'call', x.call, 'state', x.state, 'openedAt', x.opened_at, 'takenBy', p.name)
         order by array_position(array['act', 'check', 'know'], x.level), x.state = 'acknowledged', x.opened_at) as alerts
       from alerts x left join people p on p.id = x.acknowledged_by
       where x.batch_id = b.id and x.state <> 'resolved'
     ) al on true
     left join lateral (
       select json_agg(json_build_object('id', o.id, 'call', o.call, 'instead', o.instead, 'at', o.at, 'by', p.name, 'reason', o.text)) as overruled
       from (
         select distinct on (e.detail->>'call') e.id, e.detail->>'call' as call, e.detail->>'instead' as instead, e.detail->'said' as said, e.at, e.text, e.person_id
         from entries e where e.batch_id = b.id and e.kind = 'overrule' and e.removed_at is null order by e.detail->>'call', e.at desc
       ) o left join people p on p.id = o.person_id
       where o.said->>'verdict' = st.assessment->'calls'->o.call->>'verdict' and o.said->>'kind' is not distinct from st.assessment->'calls'->o.call->>'kind'
     ) ov on true
     order by ${order}b.created_at desc, b.id desc`,
    {
      bind: {
        cellarId: filter.cellarId,
        limit: filter.limit,
        skip: filter.skip ?? 0,
        ...(filter.id !== undefined && { id: filter.id }),
        ...(filter.state !== undefined && { state: filter.state }),
        ...(filter.workingSince !== undefined && { workingSince: filter.workingSince }),
        ...(filter.after && { afterAt: filter.after.at, afterKey: filter.after.key }),
      },
      type: QueryTypes.SELECT,
      transaction,
    },
  );
}
