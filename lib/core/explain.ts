import type { BatchSetup, Instant, Reading } from './types';
import { assess } from './assess';
import { finalGravityHalfWidths, progressBin } from './fit/intervals';
import { namesOf } from './fit/models';
import { accept } from './series/bins';
import { chanceOf, LATE_IN_BOTTLE, logOddsOfLateFall } from './stages/late-fall';
import { Run } from './stages/run';
import type { Watch } from './stages/watch';
import { CALL_NAMES } from './types';

const fixed = (value: number | null | undefined, digits = 2): string => (value == null ? 'not known' : value.toFixed(digits));

/** The whole chain of one judgement as text: what was left out and why, the record, the fit, the intervals, each rule with its numbers. */
export function explain(setup: BatchSetup, readings: readonly Reading[], at: Instant): string {
  const known = readings.filter((reading) => reading.at <= at && (reading.receivedAt ?? reading.at) <= at);
  const { readings: kept, refused } = accept(known);
  const lines = [`Judgement at ${new Date(at).toISOString()}`, '', `Readings: ${known.length} known, ${kept.length} used, ${refused.length} left out`];
  for (const { reading, why } of refused.slice(0, 20)) lines.push(`  left out: ${Number.isFinite(reading.at) ? new Date(reading.at).toISOString() : 'no time'} ${reading.gravity}: ${why}`);
  if (refused.length > 20) lines.push(`  and ${refused.length - 20} more`);
  const moment = new Run(setup, readings).at(at);
  if (moment) lines.push(...recordLines(moment.watch), ...curveLines(moment.watch), ...ruleLines(moment.watch));
  const { assessment } = assess(setup, readings, at);
  lines.push('', `Stage: ${assessment.stage}`, 'Calls:');
  for (const name of CALL_NAMES) {
    const call = assessment.calls[name];
    lines.push(`  ${name}: ${call.verdict}${call.kind ? ` (${call.kind})` : ''}. ${call.headline} ${call.reason}`);
    if (call.since !== null) lines.push(`    since ${new Date(call.since).toISOString()}`);
    if (call.expectedAt !== null) lines.push(`    expected ${new Date(call.expectedAt).toISOString()}`);
    for (const item of call.evidence) lines.push(`    ${item.name}: ${item.value.toFixed(3)} ${item.unit}${item.threshold === null ? '' : `, limit ${item.threshold.toFixed(3)}`}`);
    if (call.changesIt) lines.push(`    ${call.changesIt}`);
  }
  return lines.join('\n');
}

function recordLines(watch: Watch): string[] {
  const { track, segment } = watch;
  let masked = 0;
  for (let i = 0; i < track.bins.n; i += 1) masked += track.bins.masked[i]!;
  const lines = ['', `Record: ${track.bins.n} hourly bins, ${masked} masked (stuck float), a reading every ${fixed(track.spacing)} h`];
  for (const correction of track.corrections) lines.push(`  step at ${fixed(correction.atHour, 0)} h taken out: ${fixed(correction.points)} points (${correction.why})`);
  lines.push(`  float against hydrometer: ${track.isCalibrated ? `0 points shown as ${fixed(-track.calibrate(0))}` : 'not compared'}, level known within ${fixed(track.calibrationSd(watch.levelNow() ?? 0))} points`);
  lines.push(`  stretch since ${fixed(segment.from, 0)} h: original gravity ${fixed(segment.effectiveOg, 1)} ± ${fixed(segment.ogSd, 1)} points${segment.restarted ? ', after an addition' : ''}`);
  lines.push('Robust lines, points a day (standard error):');
  for (const window of [12, 24, 48, 72]) {
    const line = watch.line(window);
    lines.push(`  ${String(window).padStart(3)} h: ${line ? `${line.slope.toFixed(2)} (${line.se.toFixed(2)}), noise ${line.sigma.toFixed(2)} points, ${line.n} bins` : 'too little data'}`);
  }
  return lines;
}

function curveLines(watch: Watch): string[] {
  const prior = watch.fgPrior();
  const lines = ['', `Yeast's range, the must's sugars and the yeast's tolerance: final gravity ${fixed(prior.mean, 1)} ± ${fixed(prior.sd, 1)} points; done at ${fixed(watch.zoneTop(), 1)} or less, stuck above ${fixed(watch.stuckFloor(), 1)}`];
  const fit = watch.fit();
  if (!fit) return [...lines, 'Curve: no fit'];
  const names = namesOf('kinetic');
  const n = names.length;
  lines.push(`Curve (most probable, ${fit.converged ? 'converged' : 'not converged'}): ${names.map((name, j) => `${name} ${fixed(fit.parameters[j])} ± ${fixed(Math.sqrt(Math.max(0, fit.covariance[j * n + j]!)))}`).join(', ')}`);
  const done = watch.progress();
  const { half80, half95 } = finalGravityHalfWidths(fit.fgSd, done);
  lines.push(`Intervals: ${fixed(100 * done, 0)} % done (bin ${progressBin(done)}), final gravity ± ${fixed(half80, 1)} (80 %), ± ${fixed(half95, 1)} (95 %) points; ${fixed(watch.hoursToEnd(), 0)} h to the end`);
  const tail = watch.tail();
  if (tail) lines.push(`Tail: ${fixed(tail.remaining)} ± ${fixed(tail.sd)} points to come, likely ${fixed(tail.likely)}, slowing by ${fixed(tail.pace)} a day`);
  const long = tail && watch.longTail();
  if (long) lines.push(`Longer tail, whose pace wanes: ${fixed(long.remaining)} ± ${fixed(long.sd)} points to come`);
  const left = watch.remainingNow();
  if (left) lines.push(`Still to come, all told: ${fixed(left.value)} ± ${fixed(left.sd)} points`);
  lines.push(...lateFallLines(watch));
  return lines;
}

/** What the chance of a late fall is weighed from, and what of it there is now. */
function lateFallLines(watch: Watch): string[] {
  const chance = watch.chanceOfLateFall();
  const figures = chance === null ? null : watch.restFigures();
  if (chance === null || !figures) return [];
  const { most, likely, spread, belowTop, since2, since8 } = figures;
  return [
    `Chance that more than ${LATE_IN_BOTTLE.points} point is to come: ${fixed(100 * chance, 1)} % as the mean of about a day, ${fixed(100 * chanceOf(logOddsOfLateFall(LATE_IN_BOTTLE, figures)), 1)} % at this look`,
    `  from: at most ${fixed(most)} points to come (9 in 10), ${fixed(likely)} likely by the longer tail, yeast's end known within ${fixed(spread)}, ${fixed(belowTop, 1)} below the top of the end, 2 points higher ${fixed(100 * since2, 0)} % and 8 points higher ${fixed(100 * since8, 0)} % of its age ago`,
  ];
}

function ruleLines(watch: Watch): string[] {
  const lines = ['', 'Rules (on, looks in a row towards it while it is off, since):'];
  for (const name of ['started', 'overdue', 'peaked', 'airlock', 'sluggish', 'stuck', 'terminal', 'ended', 'rack', 'bottle', 'refermenting', 'rising', 'drifting'] as const) {
    const rule = watch[name];
    lines.push(`  ${name.padEnd(13)} ${rule.on ? 'on ' : 'off'} ${String(rule.run).padStart(4)}  ${rule.since === null ? '' : `${fixed(rule.since, 0)} h`}`);
  }
  lines.push(`  level ${fixed(watch.levelNow())} points, fall so far ${fixed(watch.dropSoFar())}, highest pace ${fixed(watch.maxRate)} points a day, airlock under ${fixed(watch.swapGas())} L/h`);
  return lines;
}
