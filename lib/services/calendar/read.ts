import ical, { ICalAlarmType, ICalCalendarMethod } from 'ical-generator';
import { CalendarFeed, Cellar, Membership } from '@/db/models';
import { findJobs, type JobRow } from '@/db/queries/jobs';
import { hashLinkToken } from '@/lib/auth/link-tokens';
import { may } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import { env } from '@/lib/config/env';
import { NotFoundError } from '@/lib/errors';

const MOST_JOBS = 500;
const MINUTE_MS = 60_000;
const HOUR_MS = 60 * MINUTE_MS;
/** A job to the minute takes this long in a calendar. */
const EXACT_MS = 15 * MINUTE_MS;

/** The day of an instant in a zone, as the midnight that a calendar's whole day begins with. */
export function dayIn(at: Date, timeZone: string): Date {
  const [year, month, day] = new Intl.DateTimeFormat('en-CA', { timeZone, year: 'numeric', month: '2-digit', day: '2-digit' }).format(at).split('-').map(Number) as [number, number, number];
  return new Date(Date.UTC(year, month - 1, day));
}

/**
 * The rounds of a cellar as iCalendar, by a private address.
 * @throws NotFoundError for an address that was taken back, as for one that never was, or whose person has left.
 */
export async function readCalendar(token: string, clock: Clock = systemClock): Promise<string> {
  const feed = await CalendarFeed.findOne({ where: { tokenHash: hashLinkToken(token), revokedAt: null } });
  if (!feed) throw new NotFoundError('calendar');
  const member = await Membership.findOne({ where: { cellarId: feed.cellarId, personId: feed.personId } });
  if (!member || !may(member.role, 'jobs.read')) throw new NotFoundError('calendar');
  const cellar = await Cellar.findByPk(feed.cellarId, { rejectOnEmpty: true });
  const now = clock.now();
  if (!feed.lastReadAt || now - feed.lastReadAt.getTime() > HOUR_MS) await feed.update({ lastReadAt: new Date(now) });
  return calendarOf(cellar, await findJobs({ cellarId: cellar.id, state: 'open', limit: MOST_JOBS }), new Date(now));
}

/** A job on a day is a whole day; one to the minute is a quarter of an hour with an alarm. */
export function calendarOf(cellar: { name: string; timeZone: string }, jobs: readonly JobRow[], now: Date): string {
  const calendar = ical({ name: `${cellar.name}: rounds`, prodId: { company: 'Fallbright', product: 'rounds', language: 'EN' }, method: ICalCalendarMethod.PUBLISH, ttl: 900 });
  for (const job of jobs) {
    // A late job stands on today, where somebody sees it.
    const due = job.dueAt < now ? now : job.dueAt;
    const place = job.batch ? [job.batch.place, job.batch.tag === null ? null : `tag ${job.batch.tag}`].filter(Boolean).join(', ') : (job.lot?.place ?? '');
    const event = calendar.createEvent({
      id: `${job.id}@fallbright`,
      summary: job.title,
      description: job.note ?? undefined,
      location: place || undefined,
      url: `${env().PUBLIC_URL}/rounds`,
      stamp: now,
      ...(job.exact ? { start: due, end: new Date(due.getTime() + EXACT_MS) } : { start: dayIn(due, cellar.timeZone), allDay: true, timezone: 'UTC' }),
    });
    if (job.exact) event.createAlarm({ type: ICalAlarmType.display, trigger: 0, description: job.title });
  }
  return calendar.toString();
}
