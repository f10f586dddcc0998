import { spanWords } from '../calls/words';
import type { CallName, EventKind, Neck, Stage, Verdict } from '../types';
import type { Timing } from './machine';

/** `act`: a person acts within the hour. `check`: go and look. `know`: may be done any day. */
export type AlertLevel = 'act' | 'check' | 'know';

export const RULE_NAMES = ['overdue', 'foam', 'neck', 'stalled', 'temperature', 'sensor', 'rack', 'bottle', 'refermentation'] as const;
export type RuleName = (typeof RULE_NAMES)[number];

/** Which call, in which verdict, becomes an alert, and how patiently. */
export interface AlertRule extends Timing {
  name: RuleName;
  call: CallName;
  level: AlertLevel;
  verdicts: readonly Verdict[];
  /** Only with one of these kinds; null: any kind. */
  kinds: readonly string[] | null;
  /** Never with one of these kinds: another rule has them. */
  notKinds: readonly string[];
  /** Only while the neck is closed by one of these; null: whatever closes it. */
  necks: readonly Neck[] | null;
  /** In these stages it is no matter: a finished batch may stand cold, a must waits hot for its pitch. */
  notStages: readonly Stage[];
  /** An entry of this kind is the answer: once it is logged the alert is over; null: only the data tell. */
  doneBy: EventKind | null;
  /** Once this call says yes, it says more: two alerts for one vessel would be one too many. Null: none does. */
  outdoneBy: CallName | null;
  /** Data older than this say nothing about now; null: the call is about the silence itself. */
  freshMs: number | null;
  /** Those who were told that it began are told that it is over. */
  tellsEnd: boolean;
  /** What must be so, as a person reads it after "when"; the spans are added by `ruleWords`. */
  when: string;
  /** What ends it besides the condition being gone; null: nothing. */
  until: string | null;
}

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
const DAY = 24 * HOUR;

const ACT = { level: 'act', restMs: 6 * HOUR, repeatMs: 4 * HOUR, repeats: 3, tellsEnd: true } as const;
const CHECK = { level: 'check', restMs: DAY, repeatMs: DAY, repeats: 3, tellsEnd: true } as const;
const KNOW = { level: 'know', restMs: DAY, repeatMs: null, repeats: 0, tellsEnd: false } as const;
const ANY = { kinds: null, notKinds: [], necks: null, notStages: [], doneBy: null, outdoneBy: null } as const;

/**
 * The rules that hold where nobody chose others. The spans are our own: the
 * calls have their own patience (they hold over several looks), so `forMs` only
 * has to outlast a doubtful hour; one opening a day follows the advice on alarm
 * floods (ANSI/ISA-18.2-2016, from memory).
 */
export const ALERT_RULES: readonly AlertRule[] = [
  {
    ...ANY, ...CHECK, name: 'overdue', call: 'started', verdicts: ['hold'], forMs: HOUR, keepMs: 3 * HOUR, freshMs: 12 * HOUR,
    when: 'a start is overdue', until: null,
  },
  {
    // A blow-off tube is made for foam, and an open vessel cannot be blocked: there foam is no news.
    ...ANY, ...ACT, name: 'foam', call: 'neck', verdicts: ['hold'], necks: ['airlock', 'bung'], forMs: 15 * MINUTE, keepMs: 3 * HOUR, freshMs: 6 * HOUR,
    when: 'foam may reach an airlock, or a bung is on a vessel that works', until: null,
  },
  {
    ...ANY, ...KNOW, name: 'neck', call: 'neck', verdicts: ['yes'], necks: ['blow_off'], forMs: HOUR, keepMs: 3 * HOUR, freshMs: 12 * HOUR,
    when: 'the blow-off tube can make way for an airlock', until: null,
  },
  {
    ...ANY, ...CHECK, name: 'stalled', call: 'stalled', verdicts: ['yes'], forMs: HOUR, keepMs: 6 * HOUR, freshMs: 12 * HOUR,
    when: 'the fall is slow, stuck or stopped by cold', until: null,
  },
  {
    ...ANY, ...CHECK, name: 'temperature', call: 'temperature', verdicts: ['yes', 'hold'], notStages: ['not_started', 'terminal'], forMs: HOUR, keepMs: 2 * HOUR, freshMs: 6 * HOUR,
    when: 'the temperature is outside the batch’s range', until: 'the batch is finished',
  },
  {
    ...ANY, ...CHECK, name: 'sensor', call: 'sensor', verdicts: ['yes', 'hold'], forMs: 30 * MINUTE, keepMs: 30 * MINUTE, freshMs: null,
    when: 'the sensor is silent, frozen or drifting', until: null,
  },
  {
    ...ANY, ...KNOW, name: 'rack', call: 'rack', verdicts: ['yes'], doneBy: 'rack', outdoneBy: 'bottle', forMs: 3 * HOUR, keepMs: HOUR, freshMs: 36 * HOUR,
    when: 'it can be racked', until: 'a racking is logged or it can be bottled',
  },
  {
    // Withdrawn at once and said aloud: somebody told "ready" may be washing bottles.
    ...ANY, ...KNOW, name: 'bottle', call: 'bottle', verdicts: ['yes'], notKinds: ['refermentation'], forMs: 6 * HOUR, keepMs: 0, freshMs: 36 * HOUR, tellsEnd: true,
    when: 'it can be bottled', until: null,
  },
  {
    ...ANY, ...ACT, name: 'refermentation', call: 'bottle', verdicts: ['yes', 'hold', 'no', 'soon'], kinds: ['refermentation'], forMs: 0, keepMs: DAY, freshMs: 36 * HOUR,
    when: 'a batch thought finished falls again', until: null,
  },
];

const BY_NAME = new Map(ALERT_RULES.map((rule) => [rule.name, rule]));

/** The rule of that name. @throws RangeError for a name that is none. */
export function ruleNamed(name: string): AlertRule {
  const rule = BY_NAME.get(name as RuleName);
  if (!rule) throw new RangeError(`There is no alert rule ${name}.`);
  return rule;
}

/** What a keeper set for one rule, of the whole cellar or of one batch. Null spans: the usual. */
export interface RuleSetting {
  rule: RuleName;
  ofBatch: boolean;
  enabled: boolean;
  /** Minutes. */
  forMin: number | null;
  keepMin: number | null;
}

/** The longest pending or keep time that can be set, min: two days. */
export const LONGEST_SPAN_MIN = 2 * 24 * 60;

/**
 * A rule as it holds for a batch: its own setting goes before the cellar's, and
 * what neither says is the usual. What can hurt someone is never told later
 * than usual.
 */
export function ruleAsSet(rule: AlertRule, settings: readonly RuleSetting[]): { rule: AlertRule; enabled: boolean } {
  const mine = settings.filter((item) => item.rule === rule.name);
  const setting = mine.find((item) => item.ofBatch) ?? mine.find((item) => !item.ofBatch);
  if (!setting) return { rule, enabled: true };
  const forMs = setting.forMin === null ? rule.forMs : setting.forMin * MINUTE;
  const keepMs = setting.keepMin === null ? rule.keepMs : setting.keepMin * MINUTE;
  return { rule: { ...rule, forMs: rule.level === 'act' ? Math.min(forMs, rule.forMs) : forMs, keepMs }, enabled: setting.enabled };
}

/** The rule's two spans as sentences: when people are told, and when it is over. */
export function ruleWords(rule: AlertRule): { begins: string; ends: string } {
  const begins = rule.forMs === 0 ? `Told at once when ${rule.when}.` : `Told when ${rule.when} for ${spanWords(rule.forMs / HOUR)}.`;
  const gone = rule.keepMs === 0 ? 'Over as soon as that is no longer so' : `Over when it has not been so for ${spanWords(rule.keepMs / HOUR)}`;
  return { begins, ends: `${gone}${rule.until === null ? '' : `, or once ${rule.until}`}.` };
}
