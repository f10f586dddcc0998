import type { z } from 'zod';
import { latestRaw, staysOf } from '@/db/queries/sensor-health';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { rawReadingList, stayList } from '@/lib/contracts/sensors';
import { iso, isoOrNull } from '../iso';
import { loadSensor } from './place';

/** Which batches a sensor was in, newest first. */
export async function listStays(actor: Actor, identifier: string): Promise<z.infer<typeof stayList>> {
  authorize(actor, 'sensors.read');
  const sensor = await loadSensor(actor.cellarId, identifier);
  const rows = await staysOf(sensor.id);
  return { items: rows.map((row) => ({ batch: { id: row.batchId, name: row.batchName }, from: iso(row.from), to: isoOrNull(row.to), readings: row.readings })) };
}

/** What a sensor sent last, newest first. */
export async function listRawReadings(actor: Actor, identifier: string, limit: number): Promise<z.infer<typeof rawReadingList>> {
  authorize(actor, 'sensors.read');
  const sensor = await loadSensor(actor.cellarId, identifier);
  const rows = await latestRaw(sensor.id, limit);
  return {
    items: rows.map((row) => ({
      measured_at: iso(row.measuredAt),
      received_at: iso(row.receivedAt),
      gravity: row.gravity,
      gravity_sent: row.gravitySent,
      inclination: row.inclination,
      temperature: row.temperature,
      battery: row.battery,
      signal: row.signal,
      foam: row.foam,
      sequence: row.sequence,
    })),
  };
}
