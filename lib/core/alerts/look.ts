import type { Assessment, BatchEvent, Call, Instant, Neck } from '../types';
import type { Look } from './machine';
import type { AlertRule } from './rules';

/** What a look needs besides the judgement. */
export interface LookContext {
  /** What closes the neck now. */
  neck: Neck;
  /** What was logged of the batch. */
  events: readonly BatchEvent[];
  /** False while the house's own ingest is or was just down: then no word from a sensor proves nothing. */
  silenceCounts: boolean;
}

/** A call is seen some days after it is true: what was done this long before counts as its answer. */
const DONE_BEFORE_MS = 3 * 86_400_000;

function isDone(rule: AlertRule, call: Call, events: readonly BatchEvent[]): boolean {
  return rule.doneBy !== null && call.since !== null && events.some((event) => event.kind === rule.doneBy && event.at >= call.since! - DONE_BEFORE_MS);
}

/** What one judgement says about one rule at `now`. */
export function lookAt(rule: AlertRule, assessment: Assessment, context: LookContext, now: Instant): Look {
  const call = assessment.calls[rule.call];
  if (call.kind === 'silent' && !context.silenceCounts) return { type: 'silence' };
  const outdone = rule.outdoneBy !== null && assessment.calls[rule.outdoneBy].verdict === 'yes';
  const moot = outdone || (rule.necks !== null && !rule.necks.includes(context.neck)) || rule.notStages.includes(assessment.stage) || isDone(rule, call, context.events);
  if (moot) return { type: 'gone' };
  const applies =
    rule.verdicts.includes(call.verdict) && (rule.kinds === null || (call.kind !== null && rule.kinds.includes(call.kind))) && (call.kind === null || !rule.notKinds.includes(call.kind));
  if (call.verdict === 'unknown' && !applies) return { type: 'silence' };
  if (rule.freshMs !== null && (assessment.lastReadingAt === null || now - assessment.lastReadingAt > rule.freshMs)) return { type: 'silence' };
  return applies ? { type: 'true', since: call.since } : { type: 'false' };
}
