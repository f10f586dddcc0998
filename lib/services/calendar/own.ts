import { randomUUID } from 'node:crypto';
import { inTransaction } from '@/db/client';
import { CalendarFeed, Person } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import { hashLinkToken, linkTokenOf } from '@/lib/auth/link-tokens';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import { env } from '@/lib/config/env';
import type { CalendarBody } from '@/lib/contracts/jobs';
import { auditBy } from '../audit/write';
import { iso, isoOrNull } from '../iso';

const NONE: CalendarBody = { url: null, made_at: null, last_read_at: null };

const present = (feed: CalendarFeed): CalendarBody => ({ url: `${env().PUBLIC_URL}/api/v1/calendars/${linkTokenOf('calendar', feed.id)}/rounds.ics`, made_at: iso(feed.createdAt), last_read_at: isoOrNull(feed.lastReadAt) });

const open = (actor: Actor) => ({ cellarId: actor.cellarId, personId: actor.personId, revokedAt: null });

/** The person's own calendar address, where they made one. */
export async function getCalendar(actor: Actor): Promise<CalendarBody> {
  authorize(actor, 'jobs.read');
  const feed = await CalendarFeed.findOne({ where: open(actor) });
  return feed ? present(feed) : NONE;
}

/** Makes a new address; the old one opens nothing from now on. */
export async function makeCalendar(actor: Actor, clock: Clock = systemClock): Promise<CalendarBody> {
  authorize(actor, 'jobs.read');
  const now = new Date(clock.now());
  return inTransaction(async (transaction) => {
    // Two that are asked for at once follow one another.
    await Person.findByPk(actor.personId, { attributes: ['id'], transaction, lock: transaction.LOCK.NO_KEY_UPDATE });
    await CalendarFeed.update({ revokedAt: now }, { where: open(actor), transaction });
    const id = randomUUID();
    const feed = await CalendarFeed.create({ id, cellarId: actor.cellarId, personId: actor.personId, tokenHash: hashLinkToken(linkTokenOf('calendar', id)), createdAt: now }, { transaction });
    await auditBy(actor, 'calendar.made', id, {}, transaction);
    await feed.reload({ transaction });
    return present(feed);
  });
}

export async function endCalendar(actor: Actor, clock: Clock = systemClock): Promise<void> {
  authorize(actor, 'jobs.read');
  await inTransaction(async (transaction) => {
    const [count] = await CalendarFeed.update({ revokedAt: new Date(clock.now()) }, { where: open(actor), transaction });
    if (count > 0) await auditBy(actor, 'calendar.ended', actor.personId, {}, transaction);
  });
}
