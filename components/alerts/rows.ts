import type { AlertBody } from '@/lib/contracts/alerts';
import { STATE_WORDS, type StateWord } from '@/lib/core/calls/attention';
import { quietUntil, type QuietHours } from '@/lib/core/alerts/telling';
import { clock, dayName, duration, instantOf, wallTime, when } from '@/components/charts/zone';
import type { VesselState } from '@/components/vessel/describe';

const seconds = (iso: string): number => Date.parse(iso) / 1000;

/** Shape and word of an alert. */
export function alertState(alert: Pick<AlertBody, 'state' | 'level' | 'call' | 'kind'>): { state: StateWord; word: string } {
  if (alert.state === 'resolved') return { state: 'Done', word: 'Cleared' };
  if (alert.state === 'acknowledged') return { state: 'In hand', word: 'In hand' };
  if (alert.call === 'sensor' && alert.kind === 'silent') return { state: 'Silent', word: 'Silent' };
  if (alert.level === 'act') return { state: 'Now', word: 'Now' };
  if (alert.level === 'check') return { state: 'Check', word: 'Check' };
  return alert.call === 'neck' ? { state: 'Due', word: 'Due' } : { state: 'Ready', word: 'Ready' };
}

/** What wants a person most first; of equals the one that has waited longest. */
export function byNeed(alerts: readonly AlertBody[]): AlertBody[] {
  const rank = (alert: AlertBody) => STATE_WORDS.indexOf(alertState(alert).state);
  return [...alerts].sort((a, b) => rank(a) - rank(b) || seconds(a.since) - seconds(b.since));
}

export function alertVessel({ batch, call, kind }: AlertBody): VesselState {
  return {
    kind: batch.vessel_kind as VesselState['kind'],
    neck: batch.neck as VesselState['neck'],
    level: Math.min(1, batch.volume_l / batch.vessel_l),
    drink: batch.drink_colour,
    clearness: 'hazy',
    krausen: batch.neck === 'blow_off',
    lees: 'none',
    tag: null,
    silent: call === 'sensor' && kind === 'silent',
  };
}

/** That what an alert is about has gone, while it is kept in case it comes back. */
const GONE_WORDS: Partial<Record<AlertBody['call'], string>> = { temperature: 'back in its range', stalled: 'not stalled any more' };

export type Going = Pick<AlertBody, 'call' | 'kind' | 'gone'>;

export const goneWord = ({ call, kind }: Pick<Going, 'call' | 'kind'>): string => (call === 'sensor' && kind === 'silent' ? 'heard again' : (GONE_WORDS[call] ?? 'no longer so'));

/** `back in its range since 14:20`; null: it is so. */
export const goneWords = (alert: Going, now: number, timeZone: string): string | null => alert.gone && `${goneWord(alert)} since ${when(seconds(alert.gone.since), now, timeZone)}`;

/** `kept until 16:20`; null: it is so. No time ends it without a reading. */
export function keptWords({ gone }: Pick<Going, 'gone'>, now: number, timeZone: string): string | null {
  if (gone === null) return null;
  const until = seconds(gone.kept_until);
  return `kept until ${until <= now ? 'the next reading' : when(until, now, timeZone)}`;
}

/** `Back in its range since 14:20: the alert is kept until 16:20, in case it comes back.` */
export function goneSentence(alert: Going, now: number, timeZone: string): string | null {
  const words = goneWords(alert, now, timeZone);
  return words && `${words.charAt(0).toUpperCase()}${words.slice(1)}: the alert is ${keptWords(alert, now, timeZone)}, in case it comes back.`;
}

/** `Oat stout, tag 5, since Tue 07:30` */
export function alertMeta(alert: AlertBody, now: number, timeZone: string): string {
  const note = alert.note === null ? null : `“${alert.note}”`;
  const gone = alert.state === 'resolved' ? null : goneWords(alert, now, timeZone);
  const parts = [alert.batch.name, alert.batch.tag === null ? null : `tag ${alert.batch.tag}`, gone ? `${gone}, ${keptWords(alert, now, timeZone)}` : (note ?? `since ${when(seconds(alert.since), now, timeZone)}`)];
  return parts.filter((part) => part !== null).join(', ');
}

/** What became of it, in at most two lines: who was told, who has it, who cleared it. */
export function alertFate(alert: AlertBody, now: number, timeZone: string): { text: string; strong: boolean }[] {
  const at = (iso: string) => when(seconds(iso), now, timeZone);
  if (alert.state === 'resolved') {
    return [{ text: alert.resolved_by ? `by ${alert.resolved_by.name}, ${alert.resolved_at ? at(alert.resolved_at) : ''}`.replace(/, $/, '') : `passed by itself${alert.resolved_at ? `, ${at(alert.resolved_at)}` : ''}`, strong: false }];
  }
  if (alert.state === 'acknowledged') {
    const look = alert.look_again_at;
    return [
      { text: `${alert.acknowledged_by?.name ?? 'Somebody'} has it`, strong: true },
      ...(look ? [{ text: `${seconds(look) <= now ? 'was to look' : 'looks'} again ${at(look)}`, strong: false }] : []),
    ];
  }
  const muted = alert.muted_until === null || alert.level === 'act' ? [] : [{ text: `muted until ${at(alert.muted_until)}`, strong: false }];
  if (alert.told.length === 0) return [...muted, { text: 'nobody told yet', strong: false }];
  const told = [...muted, ...toldLines(alert, now, timeZone).map((line) => ({ text: line.text, strong: false }))];
  return told.length > 2 ? [told[0]!, { text: `and ${told.length - 1} more`, strong: false }] : told;
}

export interface ToldLine {
  time: string;
  text: string;
  state: AlertBody['told'][number]['state'];
}

type Told = AlertBody['told'][number];

const HELD_WORDS: Record<NonNullable<Told['held_by']>, string> = { quiet: 'quiet hours', mute: 'muted', turn: 'if nobody answers' };

function toldLine(one: Told, now: number, timeZone: string): ToldLine {
  const time = one.at ? when(seconds(one.at), now, timeZone) : '';
  const device = one.means === 'push' ? ' on the device' : '';
  switch (one.state) {
    case 'sent':
      return { time, text: `told ${one.person}${device} ${time}`.trim(), state: 'sent' };
    case 'failed':
      return { time, text: one.means === 'push' ? `device of ${one.person} not reached` : `mail to ${one.person} failed`, state: 'failed' };
    case 'held':
      return { time, text: `${one.person}${device} from ${one.due ? when(seconds(one.due), now, timeZone) : 'later'}: ${one.held_by ? HELD_WORDS[one.held_by] : 'waits'}`, state: 'held' };
    case 'dropped':
      return { time, text: `${one.person}${device} not told: ${one.error ?? 'no need any more'}`, state: 'dropped' };
    case 'waiting':
      return { time, text: `telling ${one.person}${device}`, state: 'waiting' };
  }
}

/** Who was told, by mail unless it says otherwise, and whether it went; in time's order; then who is being told, who waits, who need not be told any more. */
export function toldLines(alert: Pick<AlertBody, 'told'>, now: number, timeZone: string): ToldLine[] {
  const rank = ({ state }: Told) => (state === 'held' ? 2 : state === 'dropped' ? 3 : state === 'waiting' ? 1 : 0);
  const time = ({ at, due }: Told) => seconds(at ?? due ?? '2100-01-01T00:00:00Z');
  return [...alert.told].sort((a, b) => rank(a) - rank(b) || time(a) - time(b)).map((one) => toldLine(one, now, timeZone));
}

/** When a person is not to be woken. */
export interface Rest {
  quiet: QuietHours;
  /** The clock the hours are meant by, their own. */
  timeZone: string;
}

export interface LookAgain {
  /** Seconds since 1970. */
  at: number;
  /** `18:00`, `tomorrow 09:00` */
  words: string;
}

/**
 * Times worth offering for the next look: in two hours, this morning or
 * evening, tomorrow. It rings at the hour that was chosen, so none lies in the
 * reader's quiet hours; what would comes when they are over.
 * @param rest the quiet hours and the clock they go by; null: none hold
 * @param chosen stays on offer until it has passed, though time has moved the others on
 */
export function lookAgainTimes(now: number, timeZone: string, rest: Rest | null, chosen: number | null = null): LookAgain[] {
  const today = wallTime(now, timeZone);
  const on = (days: number, hour: number) => {
    const date = new Date(Date.UTC(today.year, today.month - 1, today.day + days));
    return instantOf({ year: date.getUTCFullYear(), month: date.getUTCMonth() + 1, day: date.getUTCDate(), hour }, timeZone);
  };
  const half = 1800;
  const awake = (at: number) => {
    const until = rest && quietUntil(rest.quiet, rest.timeZone, at * 1000);
    return until === null ? at : until / 1000;
  };
  const soon = awake(Math.ceil((now + 2 * 3600) / half) * half);
  const fixed = [on(0, 9), on(0, 18), on(0, 21), on(1, 9), on(1, 18)].filter((at) => at > now + 3600 && Math.abs(at - soon) > half && awake(at) === at);
  const tomorrow = on(1, 0);
  const offered = [soon, ...fixed].sort((a, b) => a - b).slice(0, 4);
  return (chosen === null || chosen <= now || offered.includes(chosen) ? offered : [...offered, chosen])
    .sort((a, b) => a - b)
    .map((at) => ({ at, words: `${at >= tomorrow ? 'tomorrow ' : ''}${clock(at, timeZone)}` }));
}

/** How long it has been so, for the detail's head; of a silence the headline has said how long. */
export function standsSince(alert: AlertBody, now: number, timeZone: string): string {
  const since = `since ${dayName(seconds(alert.since), timeZone)} ${clock(seconds(alert.since), timeZone)}`;
  return alert.kind === 'silent' ? since : `${since}, ${duration(now - seconds(alert.since))}`;
}
