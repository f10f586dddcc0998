import type { Call, Evidence, Instant, Verdict } from '../types';

/** How figures and times stand in a sentence: three decimals for gravity, clock times in the reader's zone, a real minus. */

const minus = (text: string): string => text.replace('-', '−');

export const gravityWords = (points: number): string => (1 + points / 1000).toFixed(3);
export const pointsWords = (points: number): string => {
  const text = Math.abs(points) >= 9.95 ? Math.round(points).toString() : points.toFixed(1).replace(/\.0$/, '');
  return `${minus(text)} ${text === '1' ? 'point' : 'points'}`;
};
/** `5.9 points a day`; noise may make the fall of a still drink negative, which is no fall. */
export const rateWords = (rate: number): string => (rate < 0.05 ? 'no fall' : `${rate.toFixed(1)} points a day`);
export const fallingWords = (rate: number): string => (rate < 0.05 ? 'no fall' : `falling ${rateWords(rate)}`);
export const gasWords = (gas: number): string => `${gas.toFixed(2)} L/h`;
export const temperatureWords = (celsius: number): string => `${minus(celsius.toFixed(1))} °C`;
export const strengthWords = (abv: number): string => `${abv.toFixed(1)} %`;

/** A span of time: `40 min`, `4 h 10 min`, `31 h`, `3 days`. */
export function spanWords(hours: number): string {
  const minutes = Math.round(hours * 60);
  if (minutes < 60) return `${Math.max(0, minutes)} min`;
  if (minutes < 600) {
    const rest = minutes % 60;
    return rest === 0 ? `${Math.floor(minutes / 60)} h` : `${Math.floor(minutes / 60)} h ${rest} min`;
  }
  if (hours < 48) return `${Math.round(hours)} h`;
  return `${Math.round(hours / 24)} days`;
}

const formats = new Map<string, { clock: Intl.DateTimeFormat; day: Intl.DateTimeFormat }>();

function formatsOf(timeZone: string): { clock: Intl.DateTimeFormat; day: Intl.DateTimeFormat } {
  const known = formats.get(timeZone);
  if (known) return known;
  const make = (zone: string) => ({
    clock: new Intl.DateTimeFormat('en-GB', { weekday: 'short', hour: '2-digit', minute: '2-digit', hourCycle: 'h23', timeZone: zone }),
    day: new Intl.DateTimeFormat('en-GB', { weekday: 'short', day: 'numeric', month: 'short', timeZone: zone }),
  });
  let made;
  try {
    made = make(timeZone);
  } catch {
    made = make('UTC');
  }
  formats.set(timeZone, made);
  return made;
}

/** Three letters a month, as on every screen: the locale writes `Sept`. */
const shortDay = (day: Intl.DateTimeFormat, at: Instant): string => day.format(at).replace(',', '').replace('Sept', 'Sep');

/** `Thu 14:00` within six days of `now`, else `Wed 15 Oct`. */
export function whenWords(at: Instant, now: Instant, timeZone: string): string {
  const { clock, day } = formatsOf(timeZone);
  if (Math.abs(at - now) < 6 * 86_400_000) return clock.format(at).replace(',', '');
  return shortDay(day, at);
}

/** `Wed 15 Oct`. */
export const dayWords = (at: Instant, timeZone: string): string => shortDay(formatsOf(timeZone).day, at);

export function evidence(name: string, value: number, threshold: number | null, unit: string): Evidence {
  return { name, value, threshold, unit };
}

/** A call with its quiet parts filled in. */
export function call(verdict: Verdict, headline: string, reason: string, rest: Partial<Call> = {}): Call {
  return { verdict, kind: null, since: null, expectedAt: null, headline, reason, act: null, changesIt: null, evidence: [], ...rest };
}
