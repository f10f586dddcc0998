import type { Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { keepersOfWorkingCellars } from '@/db/queries/outbox';
import { lockSystemState, saveSystemState } from '@/db/queries/system-states';
import { systemClock, type Clock } from '@/lib/clock';
import { lookAtIngest, type IngestState } from '@/lib/core/alerts/ingest';
import type { AlertEvent } from '@/lib/core/alerts/machine';
import type { Instant } from '@/lib/core/types';
import { logFor } from '@/lib/log';
import { beatAge } from '@/lib/services/heartbeat';
import { tell } from './tell';

const log = logFor('watch');
const RULE = 'ingest';

/**
 * Looks whether readings can come in at all, and tells the keepers once when
 * they cannot.
 * @returns whether a sensor's silence may be blamed on the sensor
 */
export async function watchIngest({ clock = systemClock }: { clock?: Clock } = {}): Promise<{ silenceCounts: boolean }> {
  const age = await beatAge('broker');
  return inTransaction(async (transaction) => {
    const now = clock.now();
    const kept = await lockSystemState<IngestState>(RULE, transaction);
    const look = lookAtIngest(kept, age === null ? null : now - age, now);
    await saveSystemState(RULE, look.state, transaction);
    for (const event of look.events) await tellKeepers(event, kept, look.state, now, transaction);
    return { silenceCounts: look.silenceCounts };
  });
}

async function tellKeepers(event: AlertEvent, before: IngestState | null, after: IngestState, now: Instant, transaction: Transaction): Promise<void> {
  if (event.type !== 'opened' && event.type !== 'repeated' && event.type !== 'resolved') return;
  const open = 'toldAt' in after.alert ? after.alert : before && 'toldAt' in before.alert ? before.alert : null;
  if (!open) return;
  const since = new Date(open.since).toISOString();
  log[event.type === 'resolved' ? 'info' : 'error']({ since }, event.type === 'resolved' ? 'readings come in again' : 'no readings come in: the broker gives no sign of life');
  const count = event.type === 'repeated' ? `-${event.count}` : '';
  for (const { personId, timeZone } of await keepersOfWorkingCellars(transaction)) {
    const payload = { template: 'ingest', event: event.type, at: new Date(now).toISOString(), since, time_zone: timeZone } as const;
    await tell({ cellarId: null, alertId: null, key: `ingest:${open.openedAt}:${event.type}${count}`, payload, level: 'check', at: now }, [{ personId, means: 'mail' }], transaction);
  }
}
