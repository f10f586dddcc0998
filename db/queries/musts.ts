import { QueryTypes, type Transaction } from 'sequelize';
import type { DrinkKind } from '@/lib/core/types';
import { database } from '../client';

export interface MustRow {
  id: string;
  versionId: string;
  version: number;
  name: string;
  kind: DrinkKind;
  changedAt: Date;
  /** The order's time as PostgreSQL writes it: whole microseconds, which a Date would cut. */
  changedAtText: string;
  archivedAt: Date | null;
  changeNote: string | null;
  body: unknown;
  sketch: unknown;
  copiedFrom: { id: string; name: string; version: number } | null;
  batches: number;
}

/** Must sheets of a cellar in their latest version, last changed first. */
export function findMusts(filter: { cellarId: string; q?: string; archived: boolean; after?: { at: string; key: string } | null; limit: number }): Promise<MustRow[]> {
  return database().query<MustRow>(
    `select m.id, v.id as "versionId", v.version, m.name, m.kind, m.changed_at as "changedAt", m.changed_at::text as "changedAtText", m.archived_at as "archivedAt",
       v.change_note as "changeNote", v.body, v.sketch,
       (select json_build_object('id', s.id, 'name', s.name, 'version', f.version) from must_versions f join must_sheets s on s.id = f.must_id
         where f.id = (select copied_from from must_versions where must_id = m.id and version = 1)) as "copiedFrom",
       (select count(*)::int from batches b join must_versions bv on bv.id = b.must_version_id where bv.must_id = m.id) as batches
     from must_sheets m join must_versions v on v.must_id = m.id and v.version = m.latest
     where m.cellar_id = $cellarId and (m.archived_at is not null) = $archived
       and ($q::text is null or m.name ilike '%' || $q || '%')
       and ($afterAt::timestamptz is null or (m.changed_at, m.id) < ($afterAt, $afterKey::uuid))
     order by m.changed_at desc, m.id desc limit $limit`,
    {
      bind: { cellarId: filter.cellarId, archived: filter.archived, q: filter.q ? filter.q.replace(/[\\%_]/g, '\\$&') : null, afterAt: filter.after?.at ?? null, afterKey: filter.after?.key ?? null, limit: filter.limit },
      type: QueryTypes.SELECT,
    },
  );
}

export interface NextTimeRow {
  note: string;
  lotId: string;
  code: string;
  by: string | null;
  at: Date;
}

/** Notes for the next time on what these must sheets made: of the lots themselves and of their tastings, newest first. */
export function nextTimeOfMusts(mustIds: readonly string[], transaction?: Transaction): Promise<NextTimeRow[]> {
  return database().query<NextTimeRow>(
    `with made as (select l.id, l.code, l.next_time, l.next_time_by, l.next_time_at from lots l join batches b on b.id = l.batch_id join must_versions v on v.id = b.must_version_id where v.must_id = any($mustIds::uuid[]))
     select * from (
       select made.next_time as note, made.id as "lotId", made.code, p.name as by, made.next_time_at as at from made left join people p on p.id = made.next_time_by where made.next_time is not null
       union all
       select t.next_time, made.id, made.code, coalesce(p.name, t.guest_name), t.at from tastings t join made on made.id = t.lot_id left join people p on p.id = t.person_id where t.next_time is not null and t.removed_at is null
     ) notes order by at desc limit 50`,
    { bind: { mustIds }, type: QueryTypes.SELECT, transaction },
  );
}

/** Batches made from any version of a must sheet, newest first. */
export function batchesOfMust(mustId: string, transaction?: Transaction): Promise<Array<{ id: string; name: string; version: number; pitchedAt: Date | null }>> {
  return database().query(
    `select b.id, b.name, v.version, b.pitched_at as "pitchedAt" from batches b join must_versions v on v.id = b.must_version_id where v.must_id = $mustId order by b.created_at desc limit 100`,
    { bind: { mustId }, type: QueryTypes.SELECT, transaction },
  );
}
