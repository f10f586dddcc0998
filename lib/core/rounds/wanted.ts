/** Which jobs a batch wants: from the calls, and from how long ago somebody last looked. */
import type { Feed } from './feed';
import { CALL_NAMES, type Call, type CallName, type Instant, type Neck, type Stage } from '../types';

const HOUR = 3_600_000;
const DAY = 24 * HOUR;

/** A batch that no sensor follows is read by hand this often, while it works and once it has stopped. Our own rule. */
export const READ_EVERY_DAYS = { working: 3, terminal: 7 } as const;
/** A float heard within this stands for a reading. */
const FLOAT_COUNTS_MS = DAY;
/** Water in an airlock dries up in two or three weeks: common practice. */
export const AIRLOCK_EVERY_DAYS = 14;
const AIRLOCK_EVERY_MS = AIRLOCK_EVERY_DAYS * DAY;
/** A job that falls due by the clock is put down this long before. */
const AHEAD_MS = DAY;

export type WantedKind = 'reading' | 'start' | 'neck' | 'stalled' | 'temperature' | 'sensor' | 'rack' | 'bottle' | 'airlock' | 'feed';

/** The call that a job of the program comes from. */
export const CALL_OF_KIND: Partial<Record<string, CallName>> = { start: 'started', neck: 'neck', stalled: 'stalled', temperature: 'temperature', sensor: 'sensor', rack: 'rack', bottle: 'bottle' };

export interface Wanted {
  kind: WantedKind;
  source: 'call' | 'schedule';
  title: string;
  note: string | null;
  /** Null: from when it was first wanted. */
  dueAt: Instant | null;
  /** Told apart from another of its kind, where one may follow the other without a break. */
  occasion?: string;
  /** The hour matters. */
  exact: boolean;
}

export interface RoundsInput {
  name: string;
  neck: Neck;
  stage: Stage;
  calls: Readonly<Record<CallName, Pick<Call, 'verdict' | 'kind' | 'since' | 'expectedAt' | 'headline' | 'reason' | 'act'>>>;
  pitchedAt: Instant | null;
  /** When it came out of other batches, by splitting or blending. */
  parted: Instant | null;
  /** Last reading of the sensor that was taken. */
  floatAt: Instant | null;
  /** Last reading by hand, or the last time somebody ticked that job. */
  readAt: Instant | null;
  /** Last time somebody saw to the airlock: put it on, or topped it up. */
  airlockAt: Instant | null;
  /** What is to be fed now. */
  feed: Feed | null;
  /** A fining waits for its second dose, or has not settled yet. */
  clearing: boolean;
  at: Instant;
}

type Sketch = RoundsInput['calls'][CallName];

const JOB_OF_CALL: Record<CallName, (call: Sketch, input: RoundsInput) => Pick<Wanted, 'kind' | 'title' | 'exact'> | null> = {
  started: (call, { name }) => (call.verdict === 'hold' ? { kind: 'start', title: `Look at ${name}: it should work by now`, exact: false } : null),
  neck: (call, { name, neck }) => {
    if (call.verdict === 'hold' && neck === 'bung') return { kind: 'neck', title: `Take the bung out of ${name}`, exact: true };
    if (call.verdict === 'hold') return neck === 'airlock' ? { kind: 'neck', title: `Put the tube on ${name}`, exact: true } : null;
    if (neck !== 'blow_off') return null;
    return call.verdict === 'yes' || (call.verdict === 'soon' && call.expectedAt !== null) ? { kind: 'neck', title: `Swap the tube on ${name} for an airlock`, exact: false } : null;
  },
  stalled: (call, { name }) => (call.verdict === 'yes' || call.verdict === 'hold' ? { kind: 'stalled', title: `See to the stall of ${name}`, exact: false } : null),
  temperature: (call, { name, stage }) => {
    if ((call.verdict !== 'yes' && call.verdict !== 'hold') || stage === 'terminal' || stage === 'not_started') return null;
    return { kind: 'temperature', title: call.kind === 'low' ? `Warm ${name}` : call.kind === 'high' ? `Cool ${name}` : `Look at the temperature of ${name}`, exact: false };
  },
  sensor: (call, { name }) => {
    if (call.verdict !== 'yes' && call.verdict !== 'hold') return null;
    return { kind: 'sensor', title: call.kind === 'silent' ? `See to the sensor in ${name}` : `Check the sensor in ${name} against a hydrometer`, exact: false };
  },
  // What may be bottled is not racked once more first, and finings are left to fall before either.
  rack: (call, { name, calls, clearing }) => (call.verdict === 'yes' && calls.bottle.verdict !== 'yes' && !clearing ? { kind: 'rack', title: `Rack ${name}`, exact: false } : null),
  bottle: (call, { name, clearing }) => {
    if (call.kind === 'refermentation') return { kind: 'bottle', title: `${name} works again: keep it under an airlock`, exact: true };
    return call.verdict === 'yes' && !clearing ? { kind: 'bottle', title: `Bottle ${name}`, exact: false } : null;
  },
};

function fromCalls(input: RoundsInput): Wanted[] {
  return CALL_NAMES.flatMap((name) => {
    const call = input.calls[name];
    const job = JOB_OF_CALL[name](call, input);
    if (!job) return [];
    const dueAt = call.verdict === 'soon' ? (call.expectedAt ?? input.at) : (call.since ?? input.at);
    return [{ ...job, source: 'call' as const, note: [call.reason, call.act].filter(Boolean).join(' ') || null, dueAt }];
  });
}

function readingDue(input: RoundsInput): Wanted[] {
  const { pitchedAt, parted, floatAt, readAt, at, stage, name } = input;
  if (pitchedAt === null || (floatAt !== null && at - floatAt < FLOAT_COUNTS_MS)) return [];
  const last = Math.max(pitchedAt, readAt ?? 0, floatAt ?? 0);
  // What was split off or blended keeps its pitch of old, and is read anew within a day of it.
  const dueAt = parted !== null && parted > last ? parted + DAY : last + READ_EVERY_DAYS[stage === 'terminal' ? 'terminal' : 'working'] * DAY;
  if (at < dueAt - AHEAD_MS) return [];
  return [{ kind: 'reading', source: 'schedule', title: `Read ${name} by hand`, note: 'No sensor tells how it goes.', dueAt, exact: false }];
}

function airlockDue(input: RoundsInput): Wanted[] {
  const { pitchedAt, airlockAt, neck, at, name } = input;
  if (neck !== 'airlock' || pitchedAt === null) return [];
  const from = Math.max(pitchedAt, airlockAt ?? 0);
  // Rounds that nobody made are not owed one by one: it is as late as the last of them.
  const dueAt = from + Math.max(1, Math.floor((at - from) / AIRLOCK_EVERY_MS)) * AIRLOCK_EVERY_MS;
  return at < dueAt - AHEAD_MS ? [] : [{ kind: 'airlock', source: 'schedule', title: `Look at the water in ${name}’s airlock`, note: null, dueAt, exact: false }];
}

function fed({ feed, name }: RoundsInput): Wanted[] {
  return feed ? [{ kind: 'feed', source: 'schedule', title: `Feed ${name}: ${feed.grams} g of ${feed.of}`, note: feed.note, dueAt: null, occasion: String(feed.portion), exact: false }] : [];
}

/** The jobs that a batch wants at `at`, at most one of a kind. Pure: the same judgement and log always give the same jobs. */
export function wantedJobs(input: RoundsInput): Wanted[] {
  return [...fromCalls(input), ...readingDue(input), ...airlockDue(input), ...fed(input)];
}
