import type { Instant } from '../types';

/** How a condition becomes an alert and stops being one. Spans in milliseconds. */
export interface Timing {
  /** The condition must hold this long before anybody is told. */
  forMs: number;
  /** It must be gone this long before the alert is over; shorter gaps are the same alert. */
  keepMs: number;
  /** From one opening to the next at least this long: the ceiling on mails, whatever the data do. */
  restMs: number;
  /** While nobody has it in hand, it is said again after this long; null: never. */
  repeatMs: number | null;
  /** How many times it is said again at most. */
  repeats: number;
}

/** What is seen of a condition at one look, or what a person did about its alert. */
export type Look =
  /** `since`: from when the data prove it, which may be long before this look; null: not told. */
  | { type: 'true'; since: Instant | null }
  | { type: 'false' }
  /** It cannot be true any more (the tube was swapped): over at once, with no keep-time. */
  | { type: 'gone' }
  /** Nothing can be said: no data, old data, or a call that does not know. */
  | { type: 'silence' }
  /** A person has it in hand; `lookAgainAt` is when they will look again. */
  | { type: 'take'; lookAgainAt: Instant | null }
  /** Whoever had it in hand is gone: it is nobody's again. */
  | { type: 'release' }
  /** A person says that it was no fault, or that it is done. */
  | { type: 'clear' }
  /** The batch is over, and with it everything that could be said of it. */
  | { type: 'end' };

/** Where the machine stands for one condition. Plain data, kept as JSON. */
export type AlertState =
  /** Not true, or not known. `openedAt` is the last opening, for the rest. */
  | { phase: 'inactive'; openedAt: Instant | null }
  /** True, not yet for long enough. `interrupted`: silence came between. */
  | { phase: 'pending'; since: Instant; interrupted: boolean; openedAt: Instant | null }
  | { phase: 'open'; since: Instant; openedAt: Instant; toldAt: Instant; repeats: number; inHand: InHand | null }
  /** Open, and the condition is gone, not yet for long enough. */
  | { phase: 'keeping'; since: Instant; goneSince: Instant; openedAt: Instant; toldAt: Instant; repeats: number; inHand: InHand | null }
  /** Cleared by a person while true: says nothing until the condition has really gone. */
  | { phase: 'dismissed'; goneSince: Instant | null; openedAt: Instant };

export interface InHand {
  /** Null: not told, or already reminded. */
  lookAgainAt: Instant | null;
}

export type AlertEvent =
  | { type: 'opened'; since: Instant }
  | { type: 'repeated'; since: Instant; count: number }
  /** The hour has come at which the person who has it wanted to look again. */
  | { type: 'look_again'; since: Instant }
  | { type: 'taken' }
  /** `by`: the data (gone for long enough), a person, or the batch's end. */
  | { type: 'resolved'; by: 'data' | 'person' | 'end' };

export interface Step {
  state: AlertState;
  events: AlertEvent[];
}

export const INACTIVE: AlertState = { phase: 'inactive', openedAt: null };

/** An alert is up: open or within its keep-time. */
export const isUp = (state: AlertState): state is Extract<AlertState, { phase: 'open' | 'keeping' }> => state.phase === 'open' || state.phase === 'keeping';

/**
 * One step of the alert machine: pure, so that a restart goes on from the kept
 * state and the past can be replayed.
 *
 * - A look that is true counts from `since` where the data prove it: a backlog
 *   that arrives late opens at once if the condition still holds now.
 * - Silence moves nothing: it neither opens nor resolves, since the last value
 *   is not the present one.
 * - A clock that jumps back never makes a span negative; it can only delay.
 * @param now instant of the look, ms
 */
export function step(timing: Timing, state: AlertState, look: Look, now: Instant): Step {
  switch (look.type) {
    case 'true':
      return stepTrue(timing, state, look.since, now);
    case 'false':
      return stepFalse(timing, state, now);
    case 'gone':
      return { state: { phase: 'inactive', openedAt: state.openedAt }, events: isUp(state) ? [{ type: 'resolved', by: 'data' }] : [] };
    case 'silence':
      return stepSilence(state, now);
    case 'take':
      return isUp(state) ? { state: { ...state, inHand: { lookAgainAt: look.lookAgainAt } }, events: [{ type: 'taken' }] } : { state, events: [] };
    case 'release':
      // Told of now by whoever releases it: the next repeat counts from here.
      return { state: isUp(state) && state.inHand ? { ...state, inHand: null, toldAt: now } : state, events: [] };
    case 'clear':
      return isUp(state)
        ? { state: { phase: 'dismissed', goneSince: state.phase === 'keeping' ? state.goneSince : null, openedAt: state.openedAt }, events: [{ type: 'resolved', by: 'person' }] }
        : { state, events: [] };
    case 'end':
      return { state: INACTIVE, events: isUp(state) ? [{ type: 'resolved', by: 'end' }] : [] };
  }
}

function stepTrue(timing: Timing, state: AlertState, proven: Instant | null, now: Instant): Step {
  switch (state.phase) {
    case 'inactive':
      return openIfDue(timing, { phase: 'pending', since: Math.min(proven ?? now, now), interrupted: false, openedAt: state.openedAt }, now);
    case 'pending': {
      const seen = state.interrupted ? now : state.since;
      return openIfDue(timing, { ...state, since: Math.min(proven ?? seen, now), interrupted: false }, now);
    }
    case 'keeping': {
      const { goneSince: _, ...rest } = state;
      return whileOpen(timing, { ...rest, phase: 'open' }, now);
    }
    case 'open':
      return whileOpen(timing, state, now);
    case 'dismissed':
      return { state: { ...state, goneSince: null }, events: [] };
  }
}

function openIfDue(timing: Timing, state: Extract<AlertState, { phase: 'pending' }>, now: Instant): Step {
  const rested = state.openedAt === null || now - state.openedAt >= timing.restMs;
  if (now - state.since < timing.forMs || !rested) return { state, events: [] };
  return { state: { phase: 'open', since: state.since, openedAt: now, toldAt: now, repeats: 0, inHand: null }, events: [{ type: 'opened', since: state.since }] };
}

function whileOpen(timing: Timing, state: Extract<AlertState, { phase: 'open' }>, now: Instant): Step {
  if (state.inHand) return reminded(state, now);
  const due = timing.repeatMs !== null && state.repeats < timing.repeats && now - state.toldAt >= timing.repeatMs;
  if (!due) return { state, events: [] };
  const count = state.repeats + 1;
  return { state: { ...state, toldAt: now, repeats: count }, events: [{ type: 'repeated', since: state.since, count }] };
}

function reminded(state: Extract<AlertState, { phase: 'open' }>, now: Instant): Step {
  const lookAgainAt = state.inHand?.lookAgainAt ?? null;
  if (lookAgainAt === null || now < lookAgainAt) return { state, events: [] };
  return { state: { ...state, inHand: { lookAgainAt: null } }, events: [{ type: 'look_again', since: state.since }] };
}

function stepFalse(timing: Timing, state: AlertState, now: Instant): Step {
  switch (state.phase) {
    case 'inactive':
      return { state, events: [] };
    case 'pending':
      return { state: { phase: 'inactive', openedAt: state.openedAt }, events: [] };
    case 'open':
      return goneIfDue(timing, { ...state, phase: 'keeping', goneSince: now }, now);
    case 'keeping':
      return goneIfDue(timing, { ...state, goneSince: Math.min(state.goneSince, now) }, now);
    case 'dismissed': {
      const goneSince = Math.min(state.goneSince ?? now, now);
      return { state: now - goneSince >= timing.keepMs ? { phase: 'inactive', openedAt: state.openedAt } : { ...state, goneSince }, events: [] };
    }
  }
}

function goneIfDue(timing: Timing, state: Extract<AlertState, { phase: 'keeping' }>, now: Instant): Step {
  if (now - state.goneSince < timing.keepMs) return { state, events: [] };
  return { state: { phase: 'inactive', openedAt: state.openedAt }, events: [{ type: 'resolved', by: 'data' }] };
}

function stepSilence(state: AlertState, now: Instant): Step {
  if (state.phase === 'pending') return { state: { ...state, interrupted: true }, events: [] };
  if (state.phase === 'open' && state.inHand) return reminded(state, now);
  return { state, events: [] };
}
