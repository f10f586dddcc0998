import { QueryTypes } from 'sequelize';
import { database } from '../client';

export interface CalibrationLine {
  id: number;
  /** ms since 1970. */
  appliesFrom: number;
  coefficients: number[] | null;
  low: number | null;
  high: number | null;
  offset: number;
  correctsTemperature: boolean;
}

export interface SensorNotes {
  id: number;
  kind: 'float' | 'room' | 'foam' | 'file';
  settingsVersion: number;
  wantedIntervalS: number | null;
  confirmedVersion: number | null;
  /** Newest first. */
  calibrations: CalibrationLine[];
}

/** What the ingest has to know of sensors besides who they are. */
export function sensorNotes(ids: readonly number[]): Promise<SensorNotes[]> {
  return database().query<SensorNotes>(
    `select s.id, s.kind, s.settings_version as "settingsVersion", s.wanted_interval_s as "wantedIntervalS", s.confirmed_version as "confirmedVersion", coalesce(c.calibrations, '[]') as calibrations
     from sensors s
     left join lateral (
       select json_agg(json_build_object('id', c.id, 'appliesFrom', extract(epoch from c.applies_from)::float8 * 1000, 'coefficients', c.coefficients,
         'low', c.low_deg, 'high', c.high_deg, 'offset', c.offset_sg, 'correctsTemperature', c.corrects_temperature) order by c.applies_from desc, c.id desc) as calibrations
       from calibrations c where c.sensor_id = s.id and c.removed_at is null
     ) c on true
     where s.id = any($ids::int[])`,
    { bind: { ids: `{${ids.join(',')}}` }, type: QueryTypes.SELECT },
  );
}

export interface Confirmation {
  sensorId: number;
  version: number;
  /** ms since 1970. */
  at: number;
}

/** Keeps what sensors say of their own settings. An older word than the last does not count, nor one of settings that were never sent. */
export async function confirmSettings(confirmations: readonly Confirmation[]): Promise<void> {
  await database().query(
    `with confirmed as (
       update sensors s set confirmed_version = c.version, confirmed_at = to_timestamp(c.at / 1000),
         interval_s = case when c.version = s.settings_version and s.wanted_interval_s is not null then s.wanted_interval_s else s.interval_s end
       from jsonb_to_recordset($confirmations::jsonb) as c ("sensorId" int, version int, at float8)
       where s.id = c."sensorId" and c.version <= s.settings_version and c.version > coalesce(s.confirmed_version, -1)
       returning s.cellar_id
     )
     select pg_notify('fallbright_changes', json_build_object('cellar', cellar_id, 'kind', 'sensor', 'batch', null)::text) from (select distinct cellar_id from confirmed) x`,
    { bind: { confirmations: JSON.stringify(confirmations) }, type: QueryTypes.SELECT },
  );
}
