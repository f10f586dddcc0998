import type { Assessment, Instant, Neck } from '../types';
import type { Look } from './machine';
import type { AlertRule } from './rules';

/** What a look needs besides the judgement. */
export interface LookContext {
  /** What closes the neck now. */
  neck: Neck;
  /** False while the house's own ingest is or was just down: then no word from a sensor proves nothing. */
  silenceCounts: boolean;
}

/** What one judgement says about one rule at `now`. */
export function lookAt(rule: AlertRule, assessment: Assessment, context: LookContext, now: Instant): Look {
  const call = assessment.calls[rule.call];
  if (call.kind === 'silent' && !context.silenceCounts) return { type: 'silence' };
  if (rule.necks && !rule.necks.includes(context.neck)) return { type: 'gone' };
  const applies =
    rule.verdicts.includes(call.verdict) && (rule.kinds === null || (call.kind !== null && rule.kinds.includes(call.kind))) && (call.kind === null || !rule.notKinds.includes(call.kind));
  if (call.verdict === 'unknown' && !applies) return { type: 'silence' };
  if (rule.freshMs !== null && (assessment.lastReadingAt === null || now - assessment.lastReadingAt > rule.freshMs)) return { type: 'silence' };
  return applies ? { type: 'true', since: call.since } : { type: 'false' };
}
