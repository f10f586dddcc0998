import { sentenceRead, valueRead } from '../core/units/read';
import type { TextKey } from '../texts/catalogue';
import type { Texts } from '../texts/texts';

/** A time zone that this machine knows; a cellar may have been given one that it does not. */
function known(timeZone: string): string {
  try {
    new Intl.DateTimeFormat('en-GB', { timeZone });
    return timeZone;
  } catch {
    return 'UTC';
  }
}

/** The parts of an instant in the reader's language, to be put into the order that it has. */
function partsOf({ usage }: Texts, iso: string, timeZone: string) {
  const parts = new Intl.DateTimeFormat(usage, { timeZone: known(timeZone), weekday: 'short', day: 'numeric', month: 'short', hour: '2-digit', minute: '2-digit', hourCycle: 'h23' }).formatToParts(new Date(iso));
  const part = (type: Intl.DateTimeFormatPartTypes) => parts.find((item) => item.type === type)?.value ?? '';
  return { weekday: part('weekday'), day: part('day'), month: part('month'), hour: part('hour'), minute: part('minute') };
}

/** `Wed 15 Oct` */
export const day = (texts: Texts, iso: string, timeZone: string): string => texts.t('date.day', partsOf(texts, iso, timeZone));

/** `14:31` */
export const time = (texts: Texts, iso: string, timeZone: string): string => texts.t('date.time', partsOf(texts, iso, timeZone));

/** `Wed 15 Oct 14:31`, in the zone given. */
export const when = (texts: Texts, iso: string, timeZone: string): string => texts.t('date.when', { day: day(texts, iso, timeZone), time: time(texts, iso, timeZone) });

/** `10 min`, `4 h 10 min`, `31 h`, `3 days`. */
export function lasting({ t }: Texts, fromIso: string, toIso: string): string {
  const minutes = Math.max(0, Math.round((Date.parse(toIso) - Date.parse(fromIso)) / 60_000));
  if (minutes < 60) return t('span.minutes', { minutes });
  const hours = Math.floor(minutes / 60);
  if (hours >= 72) return t('span.days', { days: Math.round(hours / 24) });
  return hours < 12 && minutes % 60 ? t('span.hours-minutes', { hours, minutes: minutes % 60 }) : t('span.hours', { hours });
}

const DIGITS: Record<string, number> = { SG: 3, '°C': 1, '°F': 1, '°Bx': 1, '°P': 1, 'L/h': 2, '%': 1, 'points/d': 1, points: 1, h: 0, d: 1, L: 1, gal: 2, V: 2 };
/** Units that are words; the others are signs that every language has. */
const UNITS: Record<string, TextKey> = { points: 'unit.points', 'points/d': 'unit.points-a-day', h: 'unit.hours', d: 'unit.days', volumes: 'unit.volumes' };

/** A figure in the reader's unit, as it is written on the screen: `1.041`, `15.4 °C`, `−0.3 points/d`. */
export function figure({ t, usage, units }: Texts, kept: number, keptUnit: string): string {
  if (!Number.isFinite(kept)) return '?';
  const { value, unit } = valueRead(kept, keptUnit, units);
  const digits = DIGITS[unit] ?? 2;
  // Rounded as on the screen, then written as the language does; Number() turns -0.0 into 0.
  const text = new Intl.NumberFormat(usage, { minimumFractionDigits: digits, maximumFractionDigits: digits, useGrouping: false }).format(Number(value.toFixed(digits)) || 0).replace('-', '−');
  const key = UNITS[unit];
  return unit === 'SG' || unit === '' ? text : `${text} ${key ? t(key as 'unit.points') : unit}`;
}

/** A sentence of the watch, with its figures in the reader's units. */
export const said = ({ units }: Texts, sentence: string): string => sentenceRead(sentence, units);

/** `Oat stout, tag 5`. */
export const vesselName = ({ t }: Texts, batch: { name: string; tag: number | null }) => (batch.tag === null ? batch.name : t('vessel.tagged', { name: batch.name, tag: batch.tag }));

/** Those that are there, in one line: `Oat stout, tag 5, back row`. */
export const listed = ({ t }: Texts, parts: readonly (string | null)[]) => parts.filter((part) => part !== null).reduce((first, then) => t('list.two', { first, then }));

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
