import type { BatchSetup, Instant, Reading } from './types';
import { assess } from './assess';
import { accept } from './series/bins';
import { CALL_NAMES } from './types';

/** The whole chain of one judgement as text: what was left out and why, the fit, the intervals, each call with its figures. */
export function explain(setup: BatchSetup, readings: readonly Reading[], at: Instant): string {
  const known = readings.filter((reading) => reading.at <= at && (reading.receivedAt ?? reading.at) <= at);
  const { readings: kept, refused } = accept(known);
  const { assessment } = assess(setup, readings, at);
  const lines = [`Judgement at ${new Date(at).toISOString()}`, `Readings known ${known.length}, used ${kept.length}, left out ${refused.length}`];
  for (const name of CALL_NAMES) {
    const call = assessment.calls[name];
    lines.push(`${name}: ${call.verdict}${call.kind ? ` (${call.kind})` : ''} - ${call.headline} ${call.reason}`);
    for (const item of call.evidence) lines.push(`    ${item.name} ${item.value.toFixed(4)} ${item.unit}${item.threshold === null ? '' : `, limit ${item.threshold.toFixed(4)}`}`);
  }
  return lines.join('\n');
}
