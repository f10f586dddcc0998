import { assessEvery } from '@/lib/core/assess';
import type { Assessment } from '@/lib/core/types';
import type { Case } from './catalogue';
import { DECISIONS, type Decision } from './truths';

/** What was said of one batch at one look, by hours since its true pitch. */
export interface Look {
  hour: number;
  said: Record<Decision, boolean>;
  rate: number | null;
  finalGravity: { value: number; lo: number; hi: number; lo95: number; hi95: number } | null;
  terminalHour: { value: number; lo: number; hi: number } | null;
  rackHour: number | null;
}

export function said(assessment: Assessment): Record<Decision, boolean> {
  const { calls, stage } = assessment;
  return {
    started: calls.started.verdict === 'yes',
    'overdue start': calls.started.verdict === 'hold',
    'past peak': stage === 'slowing' || stage === 'terminal',
    'airlock ok': calls.neck.verdict === 'yes',
    sluggish: calls.stalled.verdict === 'yes' && calls.stalled.kind === 'sluggish',
    stuck: calls.stalled.verdict === 'yes' && (calls.stalled.kind === 'stuck' || calls.stalled.kind === 'cold'),
    terminal: stage === 'terminal',
    'ready to rack': calls.rack.verdict === 'yes',
    'ready to bottle': calls.bottle.verdict === 'yes',
    'sensor frozen': calls.sensor.verdict === 'yes' && calls.sensor.kind === 'frozen',
    'sensor drifting': calls.sensor.verdict === 'yes' && calls.sensor.kind === 'drifting',
    'working again': calls.bottle.kind === 'refermentation',
    temperature: calls.temperature.verdict === 'yes',
  };
}

const HOUR = 3_600_000;

/** Every look of one batch, three hours apart, with only what was known by then. */
export function lookAt(batch: Case, truePitch: number): Look[] {
  const told = batch.setup.pitchedAt!;
  const times: number[] = [];
  for (let at = told + 3 * HOUR; at <= truePitch + batch.endH * HOUR; at += 3 * HOUR) times.push(at);
  const looks: Look[] = [];
  for (const { assessment } of assessEvery(batch.setup, batch.readings, times, { picture: false })) {
    const { finalGravity, terminalAt } = assessment;
    const points = (sg: number): number => (sg - 1) * 1000;
    const hours = (at: number): number => (at - truePitch) / HOUR;
    looks.push({
      hour: hours(assessment.at),
      said: said(assessment),
      rate: assessment.ratePointsPerDay?.value ?? null,
      finalGravity: finalGravity && {
        value: points(finalGravity.value),
        lo: points(finalGravity.lo),
        hi: points(finalGravity.hi),
        lo95: points(finalGravity.lo95),
        hi95: points(finalGravity.hi95),
      },
      terminalHour: terminalAt && { value: hours(terminalAt.value), lo: hours(terminalAt.lo), hi: hours(terminalAt.hi) },
      rackHour: assessment.calls.rack.expectedAt === null ? null : hours(assessment.calls.rack.expectedAt),
    });
  }
  return looks;
}

export const nothingSaid = (): Record<Decision, boolean> => Object.fromEntries(DECISIONS.map((one) => [one, false])) as Record<Decision, boolean>;
