/** A time zone that this machine knows; a cellar may have been given one that it does not. */
function known(timeZone: string): string {
  try {
    new Intl.DateTimeFormat('en-GB', { timeZone });
    return timeZone;
  } catch {
    return 'UTC';
  }
}

/** `Wed 15 Oct 14:31`, in the zone given. */
export function when(iso: string, timeZone: string): string {
  const parts = new Intl.DateTimeFormat('en-GB', { timeZone: known(timeZone), weekday: 'short', day: 'numeric', month: 'short', hour: '2-digit', minute: '2-digit', hourCycle: 'h23' }).formatToParts(new Date(iso));
  const part = (type: Intl.DateTimeFormatPartTypes) => parts.find((item) => item.type === type)?.value ?? '';
  return `${part('weekday')} ${part('day')} ${part('month')} ${part('hour')}:${part('minute')}`;
}

/** `Wed 15 Oct` */
export const headlineDay = (iso: string, timeZone: string): string => when(iso, timeZone).slice(0, -6);

/** `10 min`, `4 h 10 min`, `31 h`, `3 days`. */
export function lasting(fromIso: string, toIso: string): string {
  const minutes = Math.max(0, Math.round((Date.parse(toIso) - Date.parse(fromIso)) / 60_000));
  if (minutes < 60) return `${minutes} min`;
  const hours = Math.floor(minutes / 60);
  if (hours >= 72) return `${Math.round(hours / 24)} days`;
  return hours < 12 && minutes % 60 ? `${hours} h ${minutes % 60} min` : `${hours} h`;
}

const DIGITS: Record<string, number> = { SG: 3, '°C': 1, 'L/h': 2, '%': 1, 'points/d': 1, points: 1, h: 0, d: 1, L: 1, V: 2 };

/** A figure with its unit, as it is written on the screen: `1.041`, `15.4 °C`, `−0.3 points/d`. */
export function figure(value: number, unit: string): string {
  if (!Number.isFinite(value)) return '?';
  // Number() turns -0.0 into 0.
  const digits = DIGITS[unit] ?? 2;
  const text = (Number(value.toFixed(digits)) || 0).toFixed(digits).replace('-', '−');
  return unit === 'SG' || unit === '' ? text : `${text} ${unit}`;
}

/** `Oat stout, tag 5`. */
export const vesselName = (batch: { name: string; tag: number | null }) => (batch.tag === null ? batch.name : `${batch.name}, tag ${batch.tag}`);

/** Safe in a header: one line, and nothing that turns the reading direction round. */
export const headerLine = (text: string) =>
  text
    .replace(/[\u0000-\u001f\u007f\u0085\u2028\u2029]+/g, ' ')
    .replace(/[\u200b-\u200f\u202a-\u202e\u2060-\u2069\ufeff]/g, '')
    .replace(/\s+/g, ' ')
    .trim()
    .slice(0, 200);

/** Without its full stop, to stand in a subject or a list. */
export const bare = (sentence: string) => sentence.trim().replace(/\.$/, '');
