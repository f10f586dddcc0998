import { instantOf, wallTime } from '../units/zone';

/** Which of day and month comes first in `03/04/2026`. */
export type DateOrder = 'day' | 'month';

const ZONED = /^\d{4}-\d{2}-\d{2}[T ]\d{2}:\d{2}(:\d{2}(\.\d+)?)?\s?(Z|[+-]\d{2}:?\d{2})$/i;
const YEAR_FIRST = /^(\d{4})[-/.](\d{1,2})[-/.](\d{1,2})(?:[T ]+(\d{1,2}):(\d{2})(?::(\d{2})(?:\.\d+)?)?)?$/;
const YEAR_LAST = /^(\d{1,2})[-/.](\d{1,2})[-/.](\d{4})(?:[T ,]+(\d{1,2}):(\d{2})(?::(\d{2}))?\s*(am|pm)?)?$/i;
const EPOCH = /^\d{10}(\.\d+)?$|^\d{13}$/;

/** Milliseconds since 1970 of a time as files write it; one without a zone is on the clock of `timeZone`. Null for what is no time, such as 30 February. */
export function timeIn(cell: string, timeZone: string, order: DateOrder): number | null {
  const text = cell.trim();
  if (ZONED.test(text)) return finite(Date.parse(text.replace(' ', 'T').replace(/\s/g, '')));
  if (EPOCH.test(text)) return finite(text.length === 13 ? Number(text) : Number(text) * 1000);
  const first = YEAR_FIRST.exec(text);
  if (first) return onTheWall(Number(first[1]), Number(first[2]), Number(first[3]), Number(first[4] ?? 0), Number(first[5] ?? 0), Number(first[6] ?? 0), timeZone);
  const last = YEAR_LAST.exec(text);
  if (!last) return null;
  const [a, b] = [Number(last[1]), Number(last[2])];
  const half = last[7]?.toLowerCase();
  let hour = Number(last[4] ?? 0);
  if (half && (hour < 1 || hour > 12)) return null;
  if (half) hour = (hour % 12) + (half === 'pm' ? 12 : 0);
  return onTheWall(Number(last[3]), order === 'day' ? b : a, order === 'day' ? a : b, hour, Number(last[5] ?? 0), Number(last[6] ?? 0), timeZone);
}

const finite = (at: number) => (Number.isFinite(at) ? at : null);

function onTheWall(year: number, month: number, day: number, hour: number, minute: number, second: number, timeZone: string): number | null {
  if (month < 1 || month > 12 || day < 1 || hour > 23 || minute > 59 || second > 59) return null;
  if (day > new Date(Date.UTC(year, month, 0)).getUTCDate()) return null;
  return (instantOf({ year, month, day, hour, minute }, timeZone) + second) * 1000;
}

/** Day or month first, from the dates themselves: where one of them can be read one way only. Null: they do not say. */
export function orderOf(cells: readonly string[]): DateOrder | null {
  for (const cell of cells) {
    const match = YEAR_LAST.exec(cell.trim());
    if (!match) continue;
    if (Number(match[1]) > 12) return 'day';
    if (Number(match[2]) > 12) return 'month';
  }
  return null;
}

/** Whether a zone is one that clocks know. */
export function isTimeZone(timeZone: string): boolean {
  try {
    wallTime(0, timeZone);
    return true;
  } catch {
    return false;
  }
}
