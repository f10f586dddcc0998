import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../client';

/** Highest temperature that a batch's sensors measured in a span, °C; null where they measured none. */
export async function warmestSince(batchId: string, from: Date, to: Date, transaction?: Transaction): Promise<number | null> {
  const [row] = await database().query<{ warmest: number | null }>(
    `select max(r.temperature)::float8 as warmest
     from assignments a join readings r on r.sensor_id = a.sensor_id and r.measured_at >= greatest(a.from_at, $from) and r.measured_at < least(coalesce(a.to_at, $to), $to)
     where a.batch_id = $batchId`,
    { bind: { batchId, from, to }, type: QueryTypes.SELECT, transaction },
  );
  return row?.warmest ?? null;
}
