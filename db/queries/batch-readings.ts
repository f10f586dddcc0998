import { QueryTypes, type Transaction } from 'sequelize';
import type { Instant, Reading } from '../../lib/core/types';
import { database } from '../client';

interface Row {
  at: number;
  received: number;
  gravity: number;
  temperature: number | null;
  battery: number | null;
}

/**
 * Readings of a batch in time: those of each sensor for as long as it was in it,
 * answered by the covering index alone.
 * @param upTo readings received later are left out; null: all
 */
export async function readingsOfBatch(batchId: string, upTo: Instant | null = null, transaction?: Transaction): Promise<Reading[]> {
  const rows = await database().query<Row>(
    `select extract(epoch from r.measured_at)::float8 * 1000 as at, extract(epoch from r.received_at)::float8 * 1000 as received, r.gravity, r.temperature, r.battery
     from assignments a
     join readings r on r.sensor_id = a.sensor_id and r.measured_at >= a.from_at and r.measured_at < coalesce(a.to_at, 'infinity')
     where a.batch_id = $batchId and r.gravity is not null and r.received_at <= coalesce(to_timestamp($upTo::float8 / 1000), 'infinity')
     order by r.measured_at`,
    { bind: { batchId, upTo }, type: QueryTypes.SELECT, transaction },
  );
  return rows.map((row) => ({ at: Math.round(row.at), gravity: row.gravity, temperature: row.temperature, battery: row.battery, receivedAt: Math.round(row.received) }));
}
