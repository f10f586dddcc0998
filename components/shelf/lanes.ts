import { dayOf } from '@/components/batch/words';
import { clock, dayName, MONTHS, wallTime, when } from '@/components/charts/zone';
import { gravityText, volumeText } from '@/components/ui/units';
import { goneSentence, keptWords, type Going } from '@/components/alerts/rows';
import type { AlertBody } from '@/lib/contracts/alerts';
import type { CallBody } from '@/lib/contracts/assessment';
import type { LaneBody } from '@/lib/contracts/batches';
import { attentionOf, compareAttention, type Attention, type OpenAlert, type ShelfGroup } from '@/lib/core/calls/attention';
import { CALL_NAMES, type CallName } from '@/lib/core/types';

/** What a lane needs to know of an alert; the shelf's own answer has less than the list of alerts. */
export type LaneAlert = Pick<AlertBody, 'id' | 'call' | 'level' | 'state' | 'since'> & Going & { takenBy: string | null; lookAgainAt: string | null };

/** One lane, judged and worded; times are seconds since 1970. */
export interface LaneView {
  lane: LaneBody;
  attention: Attention;
  headline: string;
  reason: string;
  /** At the right of the state: `since Tue 07:30`, `any day`, `Bram has it`. */
  when: string;
  /** The alert that speaks, if nobody has it yet. */
  openAlert: LaneAlert | null;
}

const ms = (iso: string | null) => (iso === null ? null : Date.parse(iso));
const isCallName = (name: string): name is CallName => (CALL_NAMES as readonly string[]).includes(name);

/** Alerts of a lane: from the list where the person may read it, else as far as the shelf itself tells. */
export function alertsOf(lane: LaneBody, listed: readonly AlertBody[] | undefined): LaneAlert[] {
  return lane.alerts.flatMap((alert) => {
    const full = listed?.find((item) => item.id === alert.id);
    const call = full?.call ?? alert.call;
    if (!isCallName(call)) return [];
    return [
      {
        id: alert.id,
        call,
        kind: full?.kind ?? null,
        gone: full?.gone ?? null,
        level: full?.level ?? (call === 'rack' || call === 'bottle' ? ('know' as const) : ('check' as const)),
        state: full?.state ?? (alert.taken_by === null ? ('open' as const) : ('acknowledged' as const)),
        since: full?.since ?? alert.opened_at,
        takenBy: full?.acknowledged_by?.name ?? alert.taken_by,
        lookAgainAt: full?.look_again_at ?? null,
      },
    ];
  });
}

const sketch = (call: CallBody) => ({ verdict: call.verdict, kind: call.kind, since: ms(call.since), expectedAt: ms(call.expected_at) });

/** What a person has overruled asks nothing. */
const QUIET = { verdict: 'no', kind: null, since: null, expectedAt: null } as const;

function attentionOfLane(lane: LaneBody, alerts: readonly LaneAlert[]): Attention {
  const { assessment } = lane;
  const overruled = new Set(lane.overruled.map((one) => one.call));
  if (!assessment) return { state: lane.state === 'ended' ? 'Done' : 'Leave be', group: 'leave', call: 'started', at: null };
  return attentionOf({
    calls: Object.fromEntries(CALL_NAMES.map((name) => [name, overruled.has(name) ? QUIET : sketch(assessment.calls[name])])) as Record<CallName, ReturnType<typeof sketch>>,
    alerts: alerts.map((alert): OpenAlert => ({ call: alert.call, level: alert.level, taken: alert.state === 'acknowledged', since: Date.parse(alert.since) })),
    stage: assessment.stage,
    neck: lane.neck,
    ended: lane.state === 'ended',
  });
}

/** `today 19:30`, `Thu 14:00`, `22 Oct` */
function timeAhead(at: number, now: number, timeZone: string): string {
  if (at - now > 6 * 86_400) {
    const wall = wallTime(at, timeZone);
    return `${wall.day} ${MONTHS[wall.month - 1]}`;
  }
  const words = when(at, now, timeZone);
  return words.includes(' ') ? words : `today ${words}`;
}

function whenWords(attention: Attention, taken: LaneAlert | undefined, now: number, timeZone: string): string {
  const at = attention.at === null ? null : attention.at / 1000;
  switch (attention.state) {
    case 'Stop':
    case 'Now':
    case 'Check':
    case 'Silent':
      return at === null ? 'now' : `since ${when(at, now, timeZone)}`;
    case 'In hand':
      return taken?.takenBy ? `${taken.takenBy.split(' ')[0]} has it` : 'somebody has it';
    case 'Due':
      if (at === null) return 'now';
      return at <= now ? `since ${when(at, now, timeZone)}` : timeAhead(at, now, timeZone);
    case 'Ready':
      return 'any day';
    case 'Leave be':
      return at === null || at <= now ? '' : `until ${timeAhead(at, now, timeZone)}`;
    case 'Done':
      return at === null ? '' : dayName(at, timeZone);
  }
}

const withoutStop = (sentence: string) => sentence.replace(/\.$/, '');

/** What a lane says before the first judgement. */
function firstWords(lane: LaneBody): { headline: string; reason: string } {
  if (lane.pitched_at === null) return { headline: 'Not pitched yet.', reason: 'Log the pitch when the yeast is in.' };
  return lane.sensor
    ? { headline: 'Not judged yet.', reason: 'The first judgement comes with the first readings.' }
    : { headline: 'No readings yet.', reason: 'Read by hand, or put a sensor in.' };
}

/** What a lane says that has ended: the watch is over, and its last call with it. */
function lastWords(lane: LaneBody, timeZone: string): { headline: string; reason: string } {
  const day = lane.ended_at === null ? '' : dayName(Date.parse(lane.ended_at) / 1000, timeZone);
  const bottled = lane.entries.some((entry) => entry.kind === 'bottling');
  const gravity = lane.assessment?.gravity?.value;
  const reason = [gravity === undefined ? null : `Last at ${gravityText(gravity)}.`, bottled ? 'Its bottles are in the book.' : null].filter((part) => part !== null).join(' ');
  return { headline: `${bottled ? 'Bottled' : 'Ended'}${day && ` ${day}`}.`, reason };
}

/** Judges and words one lane. `now` in seconds since 1970. */
export function laneView(lane: LaneBody, listed: readonly AlertBody[] | undefined, now: number, timeZone: string): LaneView {
  const alerts = alertsOf(lane, listed);
  const attention = attentionOfLane(lane, alerts);
  const call = lane.assessment?.calls[attention.call];
  const speaking = alerts.find((alert) => alert.call === attention.call);
  const words = lane.state === 'ended' ? lastWords(lane, timeZone) : call ? { headline: call.headline, reason: call.reason } : firstWords(lane);
  return {
    lane,
    attention,
    headline: attention.group === 'leave' ? words.headline : withoutStop(words.headline),
    reason: (speaking && goneSentence(speaking, now, timeZone)) ?? words.reason,
    when: (attention.state !== 'In hand' && speaking && keptWords(speaking, now, timeZone)) || whenWords(attention, speaking, now, timeZone),
    openAlert: speaking?.state === 'open' ? speaking : null,
  };
}

export const GROUPS: readonly { group: ShelfGroup; word: string; note: string }[] = [
  { group: 'now', word: 'Now', note: 'wants a person' },
  { group: 'next', word: 'Next', note: 'has a time or is ready' },
  { group: 'leave', word: 'Leave be', note: 'nothing to do' },
];

/** Lanes in the shelf's order: what wants a person first, then by time, then by tag and name. */
export function inOrder(views: readonly LaneView[]): LaneView[] {
  return [...views].sort(
    (a, b) => compareAttention(a.attention, b.attention) || (a.lane.tag ?? Infinity) - (b.lane.tag ?? Infinity) || a.lane.name.localeCompare(b.lane.name),
  );
}

/** `day 6`, `not pitched` */
export function dayWords(pitchedAt: string | null, now: number, timeZone: string): string {
  const day = dayOf(pitchedAt, now, timeZone);
  return day === null ? 'not pitched' : `day ${day}`;
}

export const litres = (volume: number) => volumeText(volume, 1);

export interface LaneFigures {
  gravity: string;
  /** `3.5 % so far`, or the time of the figure where it is old. */
  under: string;
}

interface Known {
  gravity: number;
  /** s since 1970. */
  at: number;
  byHand: boolean;
}

/** Where it last was known to stand by the judge or by hand, or the newest reading of either kind, where no judgement gives the gravity now. */
function lastKnown({ assessment, series, entries }: LaneBody): Known | null {
  const judged = assessment?.last_gravity;
  const index = series.gravity.findLastIndex((value) => value !== null);
  const known = entries.flatMap((entry): Known[] => (entry.kind === 'reading' && entry.gravity !== null ? [{ gravity: entry.gravity, at: Date.parse(entry.at) / 1000, byHand: true }] : []));
  if (judged) known.push({ gravity: judged.value, at: Date.parse(judged.at) / 1000, byHand: false });
  else if (index >= 0) known.push({ gravity: series.gravity[index]!, at: series.at[index]!, byHand: false });
  return known.sort((a, b) => b.at - a.at)[0] ?? null;
}

/** The gravity now, as far as it is known. `staleAt` (s): when the page was last in touch, if it is not. */
export function laneFigures(lane: LaneBody, staleAt: number | null, now: number, timeZone: string): LaneFigures {
  const judged = lane.assessment?.gravity?.value;
  const abv = lane.assessment?.abv_percent?.value;
  if (judged !== undefined) {
    return { gravity: gravityText(judged), under: staleAt !== null ? `at ${clock(staleAt, timeZone)}` : typeof abv === 'number' ? `${Math.max(0, abv).toFixed(1)} % so far` : '' };
  }
  const known = lastKnown(lane);
  if (known) return { gravity: gravityText(known.gravity), under: `${known.byHand ? 'by hand' : 'at'} ${when(known.at, now, timeZone)}` };
  return lane.original_gravity === null ? { gravity: '–', under: '' } : { gravity: gravityText(lane.original_gravity), under: 'at pitch' };
}
