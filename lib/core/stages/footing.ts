import type { Footing, Instant, WideEstimate } from '../types';
import type { CurveFit } from '../fit/map';
import { pointsOf } from '../units/convert';
import { hoursToWithin } from './byhand';
import type { Watch } from './watch';

interface Standing {
  watch: Watch;
  at: Instant;
  hour: number;
  level: number | null;
  rate: { value: number; sd: number } | null;
  fit: CurveFit | null;
  byHand: boolean;
  finalGravity: WideEstimate | null;
}

const short = (value: number): number => Number(value.toPrecision(8));
const list = (values: Float64Array): number[] => Array.from(values, short);

/** What the forecast of this moment stands on; null where there is no curve, no level, or the fall has not begun. */
export function footingOf({ watch, at, hour, level, rate, fit, byHand, finalGravity }: Standing): Footing | null {
  if (!fit || level === null || finalGravity === null || !(watch.started.on || byHand)) return null;
  const { track, segment } = watch;
  const value = pointsOf(finalGravity.value);
  const settled = watch.stuck.on || watch.terminal.on;
  return {
    at,
    hour: short(hour),
    from: short(segment.from),
    effectiveOg: short(segment.effectiveOg),
    level: short(level),
    finalGravity: { value: short(value), half80: short(Math.max(value - pointsOf(finalGravity.lo), pointsOf(finalGravity.hi) - value)) },
    tau: short(track.tauAt(hour) - track.tauAt(segment.from)),
    warmth: short(track.warmthAt(hour)),
    temperatureC: track.temperature(hour - 24, hour),
    done: short(watch.progress(level)),
    hoursToEnd: settled ? null : byHand ? hoursToWithin(watch, fit, hour, 1) : watch.hoursToEnd(),
    ratePointsPerDay: rate === null ? null : short(rate.value),
    state: watch.terminal.on ? 'terminal' : watch.stuck.on ? 'stuck' : 'falling',
    maxRate: short(watch.maxRate),
    peaked: watch.peaked.on,
    neck: watch.neck,
    parameters: list(fit.parameters),
    prior: fit.prior.normals.map(({ mean, sd }) => ({ mean: short(mean), sd: short(sd) })),
    data: { hours: list(fit.data.hours), tau: list(fit.data.tau), points: list(fit.data.g), sd: list(fit.data.sd) },
  };
}
