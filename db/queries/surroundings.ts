import { QueryTypes, type Transaction } from 'sequelize';
import type { Instant } from '../../lib/core/types';
import { database } from '../client';

/** A probe that tells of a batch: beside it, or hanging in its place; or the float itself, where that sees foam. */
export interface ProbeRow {
  identifier: string;
  name: string;
  kind: 'float' | 'room' | 'foam';
  stands: 'vessel' | 'place';
  /** Last measured and last received by then, ms since 1970; null: nothing lately. */
  at: number | null;
  receivedAt: number | null;
  /** Medians of what it said in the last three hours, or in two of its intervals where those are longer. */
  temperatureC: number | null;
  foamMm: number | null;
}

/** The probes of a batch as they were known at a time; in the order of their names. */
export function probesOf(batchId: string, at: Instant, transaction?: Transaction): Promise<ProbeRow[]> {
  return database().query<ProbeRow>(
    `with b as (select id, cellar_id, lower(btrim(place)) as place from batches where id = $batchId),
     stays as (
       select sensor_id, from_at, to_at from probe_assignments where batch_id = $batchId
       union all select sensor_id, from_at, to_at from assignments where batch_id = $batchId
     ), probes as (
       select s.id, s.identifier, s.name, s.kind, s.interval_s, 'vessel' as stands, a.from_at
       from stays a join sensors s on s.id = a.sensor_id
       where s.kind <> 'file' and a.from_at <= to_timestamp($at::float8 / 1000) and coalesce(a.to_at, 'infinity') > to_timestamp($at::float8 / 1000)
       union all
       select s.id, s.identifier, s.name, s.kind, s.interval_s, 'place', '-infinity'
       from b join sensors s on s.cellar_id = b.cellar_id and lower(btrim(s.place)) = b.place
       where s.kind = 'room' and s.removed_at is null and not exists (select 1 from stays a where a.sensor_id = s.id and a.to_at is null)
     )
     select p.identifier, p.name, p.kind, p.stands, m.at, m."receivedAt", m."temperatureC", m."foamMm"
     from probes p cross join lateral (
       select extract(epoch from max(r.measured_at))::float8 * 1000 as at, extract(epoch from max(r.received_at))::float8 * 1000 as "receivedAt",
         percentile_cont(0.5) within group (order by r.temperature)::float8 as "temperatureC", percentile_cont(0.5) within group (order by r.foam)::float8 as "foamMm"
       from readings r
       where r.sensor_id = p.id and r.measured_at >= p.from_at
         and r.measured_at > to_timestamp($at::float8 / 1000) - greatest(interval '3 hours', p.interval_s * interval '2 seconds')
         and r.measured_at <= to_timestamp($at::float8 / 1000) and r.received_at <= to_timestamp($at::float8 / 1000)
         and (p.kind <> 'float' or r.foam is not null)
     ) m
     where p.kind <> 'float' or m."foamMm" is not null
     order by p.stands desc, p.name`,
    { bind: { batchId, at }, type: QueryTypes.SELECT, transaction },
  );
}
