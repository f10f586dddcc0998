import { z } from 'zod';
import { findSensors } from '@/db/queries/sensors';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { pageQuery } from '@/lib/contracts/common';
import type { sensorList } from '@/lib/contracts/sensors';
import { decodeCursor, pageOf } from '../paging';
import { presentSensor } from './present';

/** The cellar's sensors, oldest first. */
export async function listSensors(actor: Actor, query: z.infer<typeof pageQuery>): Promise<z.infer<typeof sensorList>> {
  authorize(actor, 'sensors.read');
  const rows = await findSensors({ cellarId: actor.cellarId, after: decodeCursor(query.cursor, z.string()), limit: query.limit + 1 });
  return pageOf(rows, query.limit, (row) => ({ at: row.createdAtText, key: row.identifier }), presentSensor);
}
