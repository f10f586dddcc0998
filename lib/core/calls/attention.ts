import type { AlertLevel } from '../alerts/rules';
import { CALL_NAMES, type Call, type CallName, type Instant, type Neck, type Stage } from '../types';

/** The words of the shelf, in its order: the earlier, the more it wants a person. */
export const STATE_WORDS = ['Stop', 'Now', 'Check', 'Silent', 'In hand', 'Due', 'Ready', 'Leave be', 'Done'] as const;
export type StateWord = (typeof STATE_WORDS)[number];

/** `now` wants a person; `next` has a time, is ready or somebody has it; `leave` has nothing to do. */
export type ShelfGroup = 'now' | 'next' | 'leave';

const GROUP: Record<StateWord, ShelfGroup> = {
  Stop: 'now',
  Now: 'now',
  Check: 'now',
  Silent: 'now',
  'In hand': 'next',
  Due: 'next',
  Ready: 'next',
  'Leave be': 'leave',
  Done: 'leave',
};

/** The part of a call that decides how much it wants a person. */
export type CallSketch = Pick<Call, 'verdict' | 'kind' | 'since' | 'expectedAt'>;

/** An alert that is not resolved. */
export interface OpenAlert {
  call: CallName;
  level: AlertLevel;
  /** Somebody said that they have it. */
  taken: boolean;
  since: Instant;
}

export interface AttentionInput {
  calls: Readonly<Record<CallName, CallSketch>>;
  alerts: readonly OpenAlert[];
  stage: Stage;
  neck: Neck;
  /** The batch was closed by a person. */
  ended: boolean;
}

export interface Attention {
  state: StateWord;
  group: ShelfGroup;
  /** The call that says why. */
  call: CallName;
  /** Since when it is so (Stop, Now, Check, Silent, In hand), or when it is due (Due, Leave be); null where no time is known. */
  at: Instant | null;
}

/** Where two calls want a person equally, the one whose neglect costs more speaks. */
const WEIGHT: readonly CallName[] = ['neck', 'bottle', 'stalled', 'temperature', 'sensor', 'started', 'rack'];

/**
 * What one call asks of a person, apart from any alert.
 *
 * Foam under an airlock is a matter of the hour; under a bung it can break the
 * glass; a blow-off tube is made for it. `rack: soon` is no job yet: the vessel
 * is left be until then.
 */
export function stateOfCall(name: CallName, call: CallSketch, neck: Neck): StateWord {
  const { verdict, kind } = call;
  switch (name) {
    case 'started':
      return verdict === 'hold' ? 'Check' : verdict === 'yes' ? 'Done' : 'Leave be';
    case 'neck':
      if (verdict === 'hold') return neck === 'bung' ? 'Stop' : neck === 'blow_off' ? 'Leave be' : 'Now';
      if (neck !== 'blow_off') return 'Leave be';
      return verdict === 'yes' || (verdict === 'soon' && call.expectedAt !== null) ? 'Due' : 'Leave be';
    case 'stalled':
    case 'temperature':
      return verdict === 'yes' || verdict === 'hold' ? 'Check' : 'Leave be';
    case 'rack':
      return verdict === 'yes' ? 'Ready' : 'Leave be';
    case 'bottle':
      if (kind === 'refermentation') return 'Now';
      return verdict === 'yes' ? 'Ready' : 'Leave be';
    case 'sensor':
      if (verdict !== 'yes' && verdict !== 'hold') return 'Leave be';
      return kind === 'silent' ? 'Silent' : 'Check';
  }
}

/** An alert outlives its call by a while (it is kept open so that it does not flap); until then it speaks by its level. */
function stateOfAlert(alert: OpenAlert): StateWord {
  if (alert.level === 'act') return 'Now';
  return alert.level === 'check' ? 'Check' : 'Ready';
}

const rank = (state: StateWord) => STATE_WORDS.indexOf(state);

/** The call that has most to tell while there is nothing to do. */
function quietCall({ calls, stage, neck }: AttentionInput): CallName {
  if (stage === 'not_started' || stage === 'lag') return 'started';
  if (calls.started.verdict === 'yes' && calls.stalled.verdict === 'unknown') return 'stalled';
  // Where nobody reads it with a float, that there is none is no news.
  if (stage === 'unknown' && calls.started.verdict !== 'yes') return 'started';
  if (neck === 'blow_off' && stage !== 'terminal') return 'neck';
  if (stage === 'unknown') return 'stalled';
  const racked = calls.rack.verdict === 'no' && calls.rack.since !== null;
  return racked || calls.rack.verdict === 'yes' ? 'bottle' : 'rack';
}

function nextTime(calls: AttentionInput['calls']): Instant | null {
  const times = CALL_NAMES.map((name) => calls[name].expectedAt).filter((at): at is Instant => at !== null);
  return times.length > 0 ? Math.min(...times) : null;
}

/**
 * How much a batch wants a person, and which call says so. Pure: the same
 * judgement and alerts always give the same lane.
 */
export function attentionOf(input: AttentionInput): Attention {
  if (input.ended) return { state: 'Done', group: 'leave', call: 'bottle', at: null };

  const candidates = CALL_NAMES.map((name) => {
    const call = input.calls[name];
    const alert = input.alerts.find((item) => item.call === name);
    const own = stateOfCall(name, call, input.neck);
    const wanted = alert && GROUP[own] === 'leave' ? stateOfAlert(alert) : own;
    const state: StateWord = alert?.taken && GROUP[wanted] !== 'leave' ? 'In hand' : wanted;
    const at = state === 'Due' ? (call.expectedAt ?? call.since) : (call.since ?? alert?.since ?? null);
    return { state, call: name, at };
  });

  const [first] = candidates
    .filter((item) => GROUP[item.state] !== 'leave')
    .sort((a, b) => rank(a.state) - rank(b.state) || WEIGHT.indexOf(a.call) - WEIGHT.indexOf(b.call));
  if (first) return { ...first, group: GROUP[first.state] };

  const call = quietCall(input);
  return { state: 'Leave be', group: 'leave', call, at: input.calls[call].expectedAt ?? nextTime(input.calls) };
}

/** Order of two lanes: by state; then the longest waiting, the first due; those with no time last. */
export function compareAttention(a: Attention, b: Attention): number {
  return rank(a.state) - rank(b.state) || (a.at ?? Infinity) - (b.at ?? Infinity) || 0;
}
