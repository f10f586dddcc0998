import { inTransaction } from '@/db/client';
import { digestWishes, type DigestWish } from '@/db/queries/messages';
import { knownKeys, oweMails, type Owed } from '@/db/queries/outbox';
import { systemClock, type Clock } from '@/lib/clock';
import { nextDigest } from '@/lib/core/alerts/telling';
import { wallTime } from '@/lib/core/units/zone';
import { dedupeKey } from '../alerts/tell';
import { writeDigest } from './write';

/** A digest this late is none of the morning's any more: the house was off, and the next one comes tomorrow. */
const LATE_MS = 3 * 3_600_000;

/** The digest whose hour has come: its instant, or null. */
function dueNow({ digestMin, timeZone }: DigestWish, now: number): number | null {
  const at = nextDigest(digestMin, timeZone, now - LATE_MS);
  return at <= now ? at : null;
}

function keyOf({ personId, cellarId, timeZone }: DigestWish, at: number): string {
  const { year, month, day } = wallTime(Math.floor(at / 1000), timeZone);
  return dedupeKey(`digest:${cellarId}:${year}-${month}-${day}`, personId);
}

/**
 * Owes every person whose hour has come one digest for each cellar they tend,
 * once a day; they go out together as one mail.
 * @returns how many were owed
 */
export async function oweDigests({ clock = systemClock }: { clock?: Clock } = {}): Promise<number> {
  const now = clock.now();
  const due = (await digestWishes()).flatMap((wish) => {
    const at = dueNow(wish, now);
    return at === null ? [] : [{ wish, key: keyOf(wish, at) }];
  });
  if (due.length === 0) return 0;
  const known = await knownKeys(due.map(({ key }) => key));
  const fresh = due.filter(({ key }) => !known.has(key));
  for (const personId of new Set(fresh.map(({ wish }) => wish.personId))) {
    const owed: Owed[] = [];
    for (const { wish, key } of fresh.filter((item) => item.wish.personId === personId)) {
      const payload = await writeDigest(wish.cellarId, wish.timeZone, now);
      owed.push({ cellarId: wish.cellarId, alertId: null, personId, dedupeKey: key, payload, notBefore: new Date(now) });
    }
    await inTransaction((transaction) => oweMails(owed, transaction));
  }
  return fresh.length;
}
