import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../client';

export interface CandidateRow {
  entryId: string;
  at: Date;
  batch: string;
  gravity: number;
  inclination: number;
  temperature: number;
}

/** Readings by hand with the inclination of the float in the same batch within two hours of them, newest first; those already used as points are left out. */
export function pairCandidates(sensorId: number, entryId: string | null = null, transaction?: Transaction): Promise<CandidateRow[]> {
  return database().query<CandidateRow>(
    `select e.id as "entryId", e.at, b.name as batch, e.gravity, n.inclination, n.temperature
     from assignments a
     join batches b on b.id = a.batch_id
     join entries e on e.batch_id = a.batch_id and e.at >= a.from_at - interval '2 hours' and e.at < coalesce(a.to_at, 'infinity') and e.gravity is not null and e.removed_at is null and e.kind in ('reading', 'pitch')
     join lateral (
       select percentile_cont(0.5) within group (order by r.inclination) as inclination, percentile_cont(0.5) within group (order by r.temperature) as temperature
       from readings r where r.sensor_id = $sensorId and r.inclination is not null and r.measured_at >= greatest(a.from_at, e.at - interval '2 hours') and r.measured_at < least(coalesce(a.to_at, 'infinity'), e.at + interval '2 hours')
     ) n on n.inclination is not null
     where a.sensor_id = $sensorId and ($entryId::uuid is null or e.id = $entryId::uuid)
       and not exists (select 1 from calibration_points p where p.sensor_id = $sensorId and p.entry_id = e.id and p.removed_at is null)
     order by e.at desc limit 50`,
    { bind: { sensorId, entryId }, type: QueryTypes.SELECT, transaction },
  );
}

export interface CalibrationState {
  waiting: number;
  waitingSince: Date | null;
  turning: boolean;
  last: { at: string; inclination: number; temperature: number | null } | null;
}

/** Readings that wait for a calibration, whether any are being turned, and the last inclination. */
export async function calibrationState(sensorId: number): Promise<CalibrationState> {
  const [row] = await database().query<CalibrationState>(
    `select (select count(*)::int from (select 1 from readings where sensor_id = $sensorId and gravity is null and inclination is not null and calibration_id is null limit 100000) w) as waiting,
       (select measured_at from readings where sensor_id = $sensorId and gravity is null and inclination is not null and calibration_id is null order by measured_at limit 1) as "waitingSince",
       exists (select 1 from recalculations r where r.sensor_id = $sensorId and r.done_at is null and r.asked_at > now() - interval '20 seconds') as turning,
       (select json_build_object('at', measured_at, 'inclination', inclination, 'temperature', temperature) from readings where sensor_id = $sensorId and inclination is not null order by measured_at desc limit 1) as last`,
    { bind: { sensorId }, type: QueryTypes.SELECT },
  );
  return row!;
}
