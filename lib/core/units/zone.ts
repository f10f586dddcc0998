/** Time zones and their days, in seconds since 1970; `timeZone` is an IANA name. */
const formats = new Map<string, Intl.DateTimeFormat>();

function formatOf(timeZone: string): Intl.DateTimeFormat {
  let format = formats.get(timeZone);
  if (!format) {
    format = new Intl.DateTimeFormat('en-GB', { timeZone, hourCycle: 'h23', year: 'numeric', month: '2-digit', day: '2-digit', hour: '2-digit', minute: '2-digit', second: '2-digit', weekday: 'short' });
    formats.set(timeZone, format);
  }
  return format;
}

export const WEEKDAYS = ['Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun'] as const;
export const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'] as const;

/** What a clock and a calendar on the wall of that zone show. */
export interface WallTime {
  year: number;
  /** 1 to 12. */
  month: number;
  day: number;
  hour: number;
  minute: number;
  weekday: (typeof WEEKDAYS)[number];
}

export function wallTime(at: number, timeZone: string): WallTime {
  const parts = new Map(formatOf(timeZone).formatToParts(at * 1000).map((part) => [part.type, part.value]));
  const figure = (type: Intl.DateTimeFormatPartTypes) => Number(parts.get(type));
  return { year: figure('year'), month: figure('month'), day: figure('day'), hour: figure('hour'), minute: figure('minute'), weekday: parts.get('weekday') as WallTime['weekday'] };
}

/**
 * The instant at which a wall clock shows this. In the hour that a change to
 * summer time leaves out, the time after the gap is given.
 */
export function instantOf(wall: Pick<WallTime, 'year' | 'month' | 'day'> & { hour?: number; minute?: number }, timeZone: string): number {
  const asUtc = Date.UTC(wall.year, wall.month - 1, wall.day, wall.hour ?? 0, wall.minute ?? 0) / 1000;
  const offset = (at: number) => {
    const shown = wallTime(at, timeZone);
    return Date.UTC(shown.year, shown.month - 1, shown.day, shown.hour, shown.minute) / 1000 - Math.floor(at / 60) * 60;
  };
  // The offset a day before and a day after bracket any change; the wanted instant fits one of them.
  const before = asUtc - offset(asUtc - 86_400);
  const after = asUtc - offset(asUtc + 86_400);
  if (before + offset(before) === asUtc) return before;
  if (after + offset(after) === asUtc) return after;
  return before;
}
