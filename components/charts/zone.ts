import { spanWords } from '@/lib/core/calls/words';
import { wallTime, instantOf, MONTHS, WEEKDAYS, type WallTime } from '@/lib/core/units/zone';

export { wallTime, instantOf, MONTHS, WEEKDAYS, type WallTime };

const two = (value: number) => String(value).padStart(2, '0');

/** `14:32` */
export function clock(at: number, timeZone: string): string {
  const wall = wallTime(at, timeZone);
  return `${two(wall.hour)}:${two(wall.minute)}`;
}

/** `Wed 15 Oct` */
export function dayName(at: number, timeZone: string): string {
  const wall = wallTime(at, timeZone);
  return `${wall.weekday} ${wall.day} ${MONTHS[wall.month - 1]}`;
}

/** `20–22 Oct`, `30 Oct–2 Nov`, `20 Oct` */
export function dayRange(from: number, to: number, timeZone: string): string {
  const a = wallTime(from, timeZone);
  const b = wallTime(to, timeZone);
  const end = `${b.day} ${MONTHS[b.month - 1]}`;
  if (a.month === b.month && a.year === b.year) return a.day === b.day ? end : `${a.day}–${end}`;
  return `${a.day} ${MONTHS[a.month - 1]}–${end}`;
}

/** `Wed 14:32`, or `Wed 15 Oct 14:32` more than five days from now. */
export function when(at: number, now: number, timeZone: string): string {
  if (Math.abs(at - now) > 5 * 86_400) return `${dayName(at, timeZone)} ${clock(at, timeZone)}`;
  const wall = wallTime(at, timeZone);
  const today = wallTime(now, timeZone);
  const time = clock(at, timeZone);
  return wall.day === today.day && wall.month === today.month ? time : `${wall.weekday} ${time}`;
}

/** `4 h 10 min`, `31 h`, `3 days`, `40 min`: as the calls say it. */
export const duration = (seconds: number): string => spanWords(Math.max(0, seconds) / 3600);
