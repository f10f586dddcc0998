import type { z } from 'zod';
import { countAlerts, findAlerts } from '@/db/queries/alerts';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { alertList, alertQuery } from '@/lib/contracts/alerts';
import { decodeCursor, pageOf } from '../paging';
import { presentAlert } from './present';

/** The cellar's alerts, newest first, with how many are in each state. */
export async function listAlerts(actor: Actor, query: z.infer<typeof alertQuery>): Promise<z.infer<typeof alertList>> {
  authorize(actor, 'alerts.read');
  const { state, batch, cursor, limit } = query;
  const [rows, counts] = await Promise.all([
    findAlerts({ cellarId: actor.cellarId, state, batchId: batch, after: decodeCursor(cursor), limit: limit + 1 }),
    countAlerts(actor.cellarId, batch ?? null),
  ]);
  return { ...pageOf(rows, limit, (row) => ({ at: row.openedAtText, key: row.id }), presentAlert), counts };
}
