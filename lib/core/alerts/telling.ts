import { instantOf, wallTime } from '../units/zone';
import type { Instant } from '../types';
import type { AlertLevel, RuleName } from './rules';

/** The ways out of the house to a person. */
export const MEANS = ['mail', 'push'] as const;
export type MeansName = (typeof MEANS)[number];

/** A person's choice for one rule and means, where it differs from the usual. */
export interface MessageChoice {
  rule: RuleName;
  means: MeansName;
  wanted: boolean;
}

/** Everything goes by mail; to a device only what wants somebody to go and look. */
export const wantedUsually = (level: AlertLevel, means: MeansName): boolean => means === 'mail' || level !== 'know';

export function isWanted(rule: { name: RuleName; level: AlertLevel }, means: MeansName, choices: readonly MessageChoice[]): boolean {
  return choices.find((choice) => choice.rule === rule.name && choice.means === means)?.wanted ?? wantedUsually(rule.level, means);
}

/** From and to in minutes after midnight on the person's own clock; over midnight where `fromMin` is the later. */
export interface QuietHours {
  fromMin: number;
  toMin: number;
}

const MINUTE = 60_000;
const DAY_MIN = 1440;

/** When the quiet hours that hold at `at` end, ms; null: they do not hold. Days with a change of the clock are as long as they are. */
export function quietUntil(quiet: QuietHours | null, timeZone: string, at: Instant): Instant | null {
  if (quiet === null || quiet.fromMin === quiet.toMin) return null;
  const wall = wallTime(Math.floor(at / 1000), timeZone);
  const minute = wall.hour * 60 + wall.minute;
  const overnight = quiet.fromMin > quiet.toMin;
  const inside = overnight ? minute >= quiet.fromMin || minute < quiet.toMin : minute >= quiet.fromMin && minute < quiet.toMin;
  if (!inside) return null;
  const next = new Date(Date.UTC(wall.year, wall.month - 1, wall.day + (overnight && minute >= quiet.fromMin ? 1 : 0)));
  const date = { year: next.getUTCFullYear(), month: next.getUTCMonth() + 1, day: next.getUTCDate() };
  const end = instantOf({ ...date, hour: Math.floor(quiet.toMin / 60), minute: quiet.toMin % 60 }, timeZone) * 1000;
  // An hour that comes twice: its first end lies behind, the second is meant.
  return end > at ? end : at + ((quiet.toMin - minute + DAY_MIN) % DAY_MIN) * MINUTE;
}

/** Who waits for whom: the people named are told one after another, everybody else at once. */
export interface Escalation {
  afterMin: number;
  order: readonly string[];
}

/**
 * How long after the opening each person's turn comes, ms. Somebody is always
 * told at once: where all are in the order, its first.
 * @param people all who want to hear of it
 */
export function turnsOf(people: readonly string[], level: AlertLevel, escalation: Escalation | null): Map<string, number> {
  const turns = new Map(people.map((person) => [person, 0]));
  if (escalation === null || level === 'know') return turns;
  const waiting = escalation.order.filter((person) => turns.has(person));
  const first = waiting.length === turns.size ? 0 : 1;
  waiting.forEach((person, index) => turns.set(person, (index + first) * escalation.afterMin * MINUTE));
  return turns;
}

export type HeldBy = 'quiet' | 'mute';

/** What decides whether a message goes now. */
export interface Held {
  level: AlertLevel;
  /** The person named the hour themselves. */
  asked: boolean;
  quiet: QuietHours | null;
  timeZone: string;
  /** The vessel is muted until then; null: it is not. */
  mutedUntil: Instant | null;
}

/** Until when a message waits and why; null: it goes. What can hurt someone goes through quiet hours and mutes. */
export function holdOf({ level, asked, quiet, timeZone, mutedUntil }: Held, now: Instant): { until: Instant; by: HeldBy } | null {
  if (level === 'act' || asked) return null;
  const afterMute = mutedUntil !== null && mutedUntil > now ? mutedUntil : null;
  // A mute that ends in the quiet hours goes over into them.
  const afterQuiet = quietUntil(quiet, timeZone, afterMute ?? now);
  if (afterQuiet !== null) return { until: afterQuiet, by: afterMute === null ? 'quiet' : 'mute' };
  return afterMute === null ? null : { until: afterMute, by: 'mute' };
}

/** The instant of the person's next morning digest after `after`, ms. */
export function nextDigest(atMin: number, timeZone: string, after: Instant): Instant {
  const wall = wallTime(Math.floor(after / 1000), timeZone);
  const on = (days: number) => {
    const date = new Date(Date.UTC(wall.year, wall.month - 1, wall.day + days));
    return instantOf({ year: date.getUTCFullYear(), month: date.getUTCMonth() + 1, day: date.getUTCDate(), hour: Math.floor(atMin / 60), minute: atMin % 60 }, timeZone) * 1000;
  };
  return [on(0), on(1), on(2)].find((at) => at > after)!;
}
