import type { z } from 'zod';
import { findRefusals } from '@/db/queries/sensors';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { refusedList } from '@/lib/contracts/sensors';
import { loadSensor } from './place';

/** What one look takes in; a sensor set up wrongly sends the same again and again. */
const SHOWN = 100;

/** What the sensor sent that was not taken, and why, newest first. Bytes that are no text show as �. */
export async function listRefusals(actor: Actor, identifier: string): Promise<z.infer<typeof refusedList>> {
  authorize(actor, 'sensors.read');
  await loadSensor(actor.cellarId, identifier);
  const rows = await findRefusals(actor.cellarId, identifier, SHOWN);
  return { items: rows.map((row) => ({ id: String(row.id), received_at: row.receivedAt.toISOString(), road: row.road, reason: row.reason, body: row.body.toString('utf8') })) };
}
