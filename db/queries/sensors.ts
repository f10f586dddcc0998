import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../client';

export interface SensorRow {
  identifier: string;
  name: string;
  kind: 'float' | 'room' | 'foam' | 'file';
  intervalS: number;
  disabledAt: Date | null;
  place: string | null;
  createdAt: Date;
  createdAtText: string;
  settingsVersion: number;
  wantedIntervalS: number | null;
  settingsAt: Date | null;
  confirmedVersion: number | null;
  confirmedAt: Date | null;
  calibration: { version: number; appliesFrom: string } | null;
  batch: { id: string; name: string; since: string } | null;
  last: { measuredAt: string; receivedAt: string; gravity: number | null; temperature: number | null; battery: number | null; signal: number | null } | null;
  refused24h: number;
}

interface SensorFilter {
  cellarId: string;
  identifier?: string;
  after?: { at: string; key: string } | null;
  limit: number;
}

/** Sensors of one cellar, oldest first, with where they are, what they said last and how much of it was refused. */
export function findSensors(filter: SensorFilter, transaction?: Transaction): Promise<SensorRow[]> {
  const conditions = ['s.cellar_id = $cellarId', 's.removed_at is null', `s.kind <> 'file'`];
  if (filter.identifier !== undefined) conditions.push('s.identifier = $identifier');
  if (filter.after) conditions.push('(s.created_at, s.identifier) > ($afterAt::timestamptz, $afterKey)');
  return database().query<SensorRow>(
    `select s.identifier, s.name, s.kind, s.interval_s as "intervalS", s.disabled_at as "disabledAt", s.place, s.created_at as "createdAt", s.created_at::text as "createdAtText",
       s.settings_version as "settingsVersion", s.wanted_interval_s as "wantedIntervalS", s.settings_at as "settingsAt", s.confirmed_version as "confirmedVersion", s.confirmed_at as "confirmedAt",
       (select json_build_object('version', c.version, 'appliesFrom', c.applies_from) from calibrations c where c.sensor_id = s.id and c.removed_at is null and c.applies_from <= now() order by c.applies_from desc, c.id desc limit 1) as calibration,
       a.batch,
       case when l.sensor_id is not null then json_build_object('measuredAt', l.measured_at, 'receivedAt', l.received_at, 'gravity', l.gravity,
         'temperature', l.temperature, 'battery', l.battery, 'signal', l.signal) end as last,
       (select count(*)::int from refusals r where r.sensor_id = s.id and r.received_at > now() - interval '24 hours') as "refused24h"
     from sensors s
     left join sensor_latest l on l.sensor_id = s.id
     left join lateral (
       select json_build_object('id', b.id, 'name', b.name, 'since', a.from_at) as batch
       from (select batch_id, from_at from assignments where sensor_id = s.id and to_at is null union all select batch_id, from_at from probe_assignments where sensor_id = s.id and to_at is null) a
       join batches b on b.id = a.batch_id limit 1
     ) a on true
     where ${conditions.join(' and ')}
     order by s.created_at, s.identifier limit $limit`,
    {
      bind: {
        cellarId: filter.cellarId,
        limit: filter.limit,
        ...(filter.identifier !== undefined && { identifier: filter.identifier }),
        ...(filter.after && { afterAt: filter.after.at, afterKey: filter.after.key }),
      },
      type: QueryTypes.SELECT,
      transaction,
    },
  );
}

export interface RefusalRow {
  id: number;
  receivedAt: Date;
  road: 'mqtt' | 'http';
  reason: string;
  body: Buffer;
}

export function findRefusals(cellarId: string, identifier: string, limit: number): Promise<RefusalRow[]> {
  return database().query<RefusalRow>(
    `select r.id, r.received_at as "receivedAt", r.road, r.reason, r.body
     from refusals r join sensors s on s.id = r.sensor_id
     where s.cellar_id = $cellarId and s.identifier = $identifier
     order by r.received_at desc, r.id desc limit $limit`,
    { bind: { cellarId, identifier, limit }, type: QueryTypes.SELECT },
  );
}
