import type { MessagesBody } from '@/lib/contracts/messages';
import { instantOf, wallTime } from '@/components/charts/zone';
import type { StateWord } from '@/lib/core/calls/attention';

type Rule = MessagesBody['rules'][number];

/** What each rule watches, as its row is named. */
export const RULE_TITLES: Record<Rule['rule'], string> = {
  refermentation: 'Falls again after it was finished',
  foam: 'Foam at an airlock, a bung on what works',
  overdue: 'A start that is overdue',
  stalled: 'A fall that is slow or stopped',
  temperature: 'Too warm or too cold',
  sensor: 'Sensor silent, frozen or drifting',
  neck: 'Tube may make way for an airlock',
  rack: 'Ready to rack',
  bottle: 'Ready to bottle',
};

/** How the alert stands on the shelf. */
export function stateOfRule({ rule, level }: Pick<Rule, 'rule' | 'level'>): StateWord {
  if (level === 'act') return 'Now';
  if (level === 'check') return 'Check';
  return rule === 'neck' ? 'Due' : 'Ready';
}

const LEVELS = ['act', 'check', 'know'] as const;

/** What can hurt someone first. */
export const byLevel = <T extends Pick<Rule, 'level'>>(rules: readonly T[]): T[] => [...rules].sort((a, b) => LEVELS.indexOf(a.level) - LEVELS.indexOf(b.level));

const two = (value: number) => String(value).padStart(2, '0');

/** Minutes after midnight as a time field has them: `22:00`. */
export const clockOf = (minutes: number): string => `${two(Math.floor(minutes / 60))}:${two(minutes % 60)}`;

/** A time field to minutes after midnight; null where it is none. */
export function minutesOf(clock: string): number | null {
  const match = /^([01]\d|2[0-3]):([0-5]\d)/.exec(clock);
  return match ? Number(match[1]) * 60 + Number(match[2]) : null;
}

/** `15 min`, `3 h`, `1 h 30 min`, `2 days`; `at once` for none. */
export function spanOf(minutes: number): string {
  if (minutes === 0) return 'at once';
  if (minutes % 1440 === 0) return minutes === 1440 ? '1 day' : `${minutes / 1440} days`;
  if (minutes < 60) return `${minutes} min`;
  return minutes % 60 === 0 ? `${minutes / 60} h` : `${Math.floor(minutes / 60)} h ${minutes % 60} min`;
}

const SPANS = [0, 15, 30, 60, 120, 180, 360, 720, 1440];

/** Spans to choose from, the one that holds among them. */
export const spansFor = (now: number): number[] => [...new Set([...SPANS, now])].sort((a, b) => a - b);

export interface MuteTime {
  /** Seconds since 1970. */
  at: number;
  words: string;
}

/** Mutes worth offering: two hours, this afternoon, the evening, a day. */
export function muteTimes(now: number, timeZone: string): MuteTime[] {
  const today = wallTime(now, timeZone);
  const on = (hour: number) => instantOf({ year: today.year, month: today.month, day: today.day, hour }, timeZone);
  const hours = [18, 22].map((hour) => ({ at: on(hour), words: `until ${hour}:00` })).filter(({ at }) => at > now + 5400);
  return [{ at: now + 2 * 3600, words: '2 h' }, ...hours, { at: now + 86_400, words: 'a day' }];
}
