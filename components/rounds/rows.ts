import { clock, duration, instantOf, wallTime, when } from '@/components/charts/zone';
import type { JobBody } from '@/lib/contracts/jobs';

/** A job of the walk as it is shown. Times are seconds since 1970. */
export interface RoundRow {
  job: JobBody;
  late: boolean;
  /** `late`, `now`, `14:00`, `Thu 14:00`, `any day` */
  time: string;
  /** `since 12:00`, `in 22 min` */
  note: string;
  /** Seconds left on a running clock; null where the hour does not matter. */
  left: number | null;
}

export interface Stop {
  place: string;
  rows: RoundRow[];
}

/** What the job is about, with the tag one looks for. */
export const about = (job: JobBody): string | null => (job.batch ? `${job.batch.tag === null ? '' : `tag ${job.batch.tag}, `}${job.batch.name}` : job.lot ? `${job.lot.code}, ${job.lot.name}` : null);

/** The first second of the day that many days from the one of `at`. */
export function dayStart(at: number, timeZone: string, days: number): number {
  const wall = wallTime(at, timeZone);
  return instantOf({ year: wall.year, month: wall.month, day: wall.day + days }, timeZone);
}

/** Late in the evening the hours after midnight still belong to the walk, s: a clock of an hour must not be out of sight. */
const LATE_S = 3 * 3600;

/** What falls due before it is today's. */
export const tonight = (now: number, timeZone: string): number => Math.max(dayStart(now, timeZone, 1), now + LATE_S);

export function rowOf(job: JobBody, now: number, timeZone: string): RoundRow {
  const due = Date.parse(job.due_at) / 1000;
  const left = due - now;
  if (job.exact) {
    const soon = left > -3600 && left < 6 * 3600;
    return left < 0
      ? { job, late: true, time: 'late', note: `since ${when(due, now, timeZone)}`, left: soon ? left : null }
      : { job, late: false, time: when(due, now, timeZone), note: `in ${duration(left)}`, left: soon ? left : null };
  }
  // A finished drink waits: it may be racked or bottled any day from then on.
  if (job.source === 'call' && (job.kind === 'rack' || job.kind === 'bottle') && due <= now) return { job, late: false, time: 'any day', note: `since ${when(due, now, timeZone)}`, left: null };
  if (due < dayStart(now, timeZone, 0)) return { job, late: true, time: 'late', note: `since ${when(due, now, timeZone)}`, left: null };
  if (due <= now) return { job, late: false, time: 'now', note: `since ${clock(due, timeZone)}`, left: null };
  return { job, late: false, time: when(due, now, timeZone), note: due < dayStart(now, timeZone, 1) ? 'any hour today' : `in ${duration(left)}`, left: null };
}

const tagOf = (job: JobBody) => job.batch?.tag ?? Number.MAX_SAFE_INTEGER;
const placeOf = (job: JobBody) => job.batch?.place ?? job.lot?.place ?? null;
const NOWHERE = 'No place told';

/** The walk: place by place, within one by the vessel's tag; jobs about no vessel come last. */
export function walk(jobs: readonly JobBody[], now: number, timeZone: string): Stop[] {
  const sorted = [...jobs].sort((a, b) => Number(placeOf(a) === null) - Number(placeOf(b) === null) || (placeOf(a) ?? '').localeCompare(placeOf(b) ?? '') || tagOf(a) - tagOf(b) || a.due_at.localeCompare(b.due_at) || a.id.localeCompare(b.id));
  const stops: Stop[] = [];
  for (const job of sorted) {
    const place = placeOf(job) ?? NOWHERE;
    if (stops.at(-1)?.place !== place) stops.push({ place, rows: [] });
    stops.at(-1)?.rows.push(rowOf(job, now, timeZone));
  }
  return stops;
}

/** `3 to do, 1 late, 1 in hand` */
export function countWords(rows: readonly RoundRow[]): string {
  const open = rows.filter((row) => row.job.state === 'open');
  const late = open.filter((row) => row.late).length;
  const taken = open.filter((row) => row.job.taken_by !== null).length;
  return [`${open.length} to do`, late > 0 ? `${late} late` : null, taken > 0 ? `${taken} in hand` : null].filter((part) => part !== null).join(', ');
}

/** `42:07`, `1 h 12 min`, `−3:10` once it is over. */
export function countdown(seconds: number): string {
  const whole = Math.abs(Math.trunc(seconds));
  const sign = seconds < 0 ? '−' : '';
  if (whole >= 3600) return `${sign}${duration(whole)}`;
  return `${sign}${Math.floor(whole / 60)}:${String(whole % 60).padStart(2, '0')}`;
}

/** What a job may be put off to. */
export function laterTimes(now: number, timeZone: string): { name: string; at: number }[] {
  const wall = wallTime(now, timeZone);
  const at = (days: number, hour: number) => instantOf({ year: wall.year, month: wall.month, day: wall.day + days, hour }, timeZone);
  return [
    { name: 'in an hour', at: now + 3600 },
    ...(wall.hour < 17 ? [{ name: 'this evening', at: at(0, 18) }] : []),
    { name: 'tomorrow', at: at(1, 9) },
    { name: 'in three days', at: at(3, 9) },
  ];
}
