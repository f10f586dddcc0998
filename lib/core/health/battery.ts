import { robustLine } from '../series/line';
import { median } from '../series/order';
import type { Instant } from '../types';

export interface BatteryForecast {
  /** Volts a day; negative while it empties. Null: too few days to say. */
  perDay: number | null;
  /** Days until the empty voltage: likely, and the 80 % interval. Null: it does not fall, or further off than a forecast reaches. */
  days: number | null;
  lo: number | null;
  hi: number | null;
}

const DAY_MS = 86_400_000;
/** A cell's curve bends: what it did longer ago says little about the end. */
const LOOK_BACK_DAYS = 30;
const LEAST_DAYS = 5;
/** One reading below can be a cold hour or a loud radio. */
const LAST_READINGS = 3;
const Z80 = 1.2816;
/** A year on one charge is as good as for ever, and a straight line does not reach further. */
const FURTHEST_DAYS = 365;

/**
 * Days left of a cell from its voltage: a robust line through the daily medians of
 * the last 30 days. Null with fewer than five days of readings, unless what was
 * heard last says that it is flat. A lithium cell
 * holds its voltage and drops at the end, so that the likely day errs on the late
 * side there: the low end of the interval is the one to act on.
 */
export function batteryForecast(readings: readonly { at: Instant; volts: number }[], emptyV: number, now: Instant): BatteryForecast | null {
  const byDay = new Map<number, number[]>();
  for (const { at, volts } of readings) {
    const age = Math.floor((now - at) / DAY_MS);
    if (age < 0 || age >= LOOK_BACK_DAYS) continue;
    const day = byDay.get(age);
    if (day) day.push(volts);
    else byDay.set(age, [volts]);
  }
  // A robust line does not follow the drop at a cell's end: the last readings say that by themselves.
  const last = readings.filter(({ at }) => at <= now).sort((a, b) => b.at - a.at).slice(0, LAST_READINGS);
  const flatNow = last.length > 0 && median(last.map(({ volts }) => volts)) <= emptyV;
  if (byDay.size < LEAST_DAYS) return flatNow ? { perDay: null, days: 0, lo: 0, hi: 0 } : null;
  const days = [...byDay].sort(([a], [b]) => b - a);
  // In hours and millivolts, the scale that the line's own floors are made for.
  const hours = Float64Array.from(days, ([age]) => -(age + 0.5) * 24);
  const millivolts = Float64Array.from(days, ([, volts]) => median(volts) * 1000);
  const line = robustLine(hours, millivolts, 0, days.length);
  if (!line) return null;
  const level = line.level - (line.slope * line.middle) / 24;
  const left = level - emptyV * 1000;
  if (left <= 0 || flatNow) return { perDay: line.slope / 1000, days: 0, lo: 0, hi: 0 };
  const daysAt = (slope: number) => {
    const result = slope < 0 ? left / -slope : Infinity;
    return result <= FURTHEST_DAYS ? result : null;
  };
  return { perDay: line.slope / 1000, days: daysAt(line.slope), lo: daysAt(line.slope - Z80 * line.se), hi: daysAt(line.slope + Z80 * line.se) };
}
