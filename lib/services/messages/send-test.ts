import { randomUUID } from 'node:crypto';
import { inTransaction } from '@/db/client';
import { devicesOf } from '@/db/queries/devices';
import { tellable } from '@/db/queries/messages';
import { oweMails, recentTests } from '@/db/queries/outbox';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import { MEANS } from '@/lib/core/alerts/telling';
import { ThrottledError } from '@/lib/errors';
import type { TestPayload } from '@/lib/mail/payload';
import { dedupeKey } from '../alerts/tell';

const MOST_IN_TEN_MINUTES = 6;

/** Owes the asker one message by every means they have, to see whether it arrives. */
export async function sendTestMessage(actor: Actor, { clock = systemClock }: { clock?: Clock } = {}): Promise<void> {
  authorize(actor, 'alerts.read');
  const { personId, cellarId } = actor;
  const [people, devices, recent] = await Promise.all([tellable(cellarId), devicesOf(personId), recentTests(personId)]);
  if (recent >= MOST_IN_TEN_MINUTES) throw new ThrottledError(600, 'That is enough for now. Wait ten minutes.');
  const at = new Date(clock.now());
  const payload: TestPayload = { template: 'test', at: at.toISOString(), time_zone: people.find(({ id }) => id === personId)?.timeZone ?? 'UTC' };
  const key = `test:${randomUUID()}`;
  const ways = MEANS.filter((means) => means !== 'push' || devices.length > 0);
  await inTransaction((transaction) => oweMails(ways.map((means) => ({ cellarId, alertId: null, personId, means, dedupeKey: dedupeKey(key, personId, means), payload, notBefore: at })), transaction));
}
