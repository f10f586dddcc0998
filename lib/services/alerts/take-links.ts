import { randomUUID } from 'node:crypto';
import { inTransaction } from '@/db/client';
import { findAlerts } from '@/db/queries/alerts';
import { keepTakeLinks, markTakeLinkUsed, takeLinkOf, type TakeLinkRow } from '@/db/queries/take-links';
import { hashLinkToken, linkTokenOf } from '@/lib/auth/link-tokens';
import { may, type Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { TakePage } from '@/lib/contracts/messages';
import { ROLES } from '@/lib/core/roles';
import { ConflictError, NotFoundError } from '@/lib/errors';
import type { Ready } from '../outbox/means';
import { presentGone } from './present';
import { takeAlert } from './take';

/** An alert that nobody took in three days is told again by other roads. */
const GOOD_FOR_MS = 72 * 3_600_000;

/** For each open alert in a message, the address at which its reader takes it in hand without signing in. */
export async function takeUrlsFor(ready: readonly Ready[], publicUrl: string, now: number): Promise<ReadonlyMap<string, string>> {
  const asked = ready.flatMap(({ row, payload }) => {
    if (payload.template !== 'alert' || row.alertId === null || payload.event === 'resolved' || payload.event === 'look_again') return [];
    const id = randomUUID();
    return [{ id, alertId: row.alertId, personId: row.personId, tokenHash: hashLinkToken(linkTokenOf('take', id)) }];
  });
  // One statement may not meet the same row twice.
  const once = [...new Map(asked.map((item) => [item.alertId, item])).values()];
  if (once.length === 0) return new Map();
  const kept = await keepTakeLinks(once, new Date(now + GOOD_FOR_MS));
  return new Map(kept.map(({ id, alertId }) => [alertId, `${publicUrl}/take/${linkTokenOf('take', id)}`]));
}

/** As whom the link acts, now. @throws NotFoundError where they may no longer take alerts here */
function actorOf(link: TakeLinkRow | null, now: number): Actor {
  const role = ROLES.find((name) => name === link?.role);
  if (!link || !role || !may(role, 'alerts.acknowledge') || link.expiresAt.getTime() <= now) throw new NotFoundError('link');
  return { personId: link.personId, cellarId: link.cellarId, role };
}

/** What the page behind a link shows. Looking changes nothing: mail programs look at every link. */
export async function openTakeLink(token: string, { clock = systemClock }: { clock?: Clock } = {}): Promise<TakePage> {
  const link = await takeLinkOf(hashLinkToken(token));
  const actor = actorOf(link, clock.now());
  const [alert] = await findAlerts({ cellarId: actor.cellarId, id: link!.alertId, limit: 1 });
  if (!alert) throw new NotFoundError('link');
  const { batch, evidence } = alert;
  return {
    person: link!.personName,
    batch: { id: batch.id, name: batch.name, tag: batch.tag },
    call: alert.call,
    level: alert.level,
    kind: alert.kind,
    headline: evidence.headline,
    reason: evidence.reason,
    act: evidence.act,
    since: alert.since instanceof Date ? alert.since.toISOString() : new Date(alert.since).toISOString(),
    state: alert.state,
    taken_by: alert.acknowledgedBy?.name ?? null,
    gone: alert.gone && presentGone(alert.gone),
    used: link!.usedAt !== null,
  };
}

/**
 * Takes the alert for the link's person, once.
 * @throws ConflictError where it was used, somebody has it, or it has passed
 */
export async function useTakeLink(token: string, { clock = systemClock }: { clock?: Clock } = {}): Promise<TakePage> {
  await inTransaction(async (transaction) => {
    const now = clock.now();
    const link = await takeLinkOf(hashLinkToken(token), transaction);
    const actor = actorOf(link, now);
    if (link!.usedAt !== null) throw new ConflictError('This link has been used already.');
    await takeAlert(actor, link!.alertId, { note: null, look_again_at: null, onlyOpen: true }, now, transaction);
    await markTakeLinkUsed(link!.id, new Date(now), transaction);
  });
  return openTakeLink(token, { clock });
}
