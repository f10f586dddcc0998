import type { Reading } from '@/lib/core/types';
import type { Random } from './random';
import type { Truth } from './ferment';

/** How a float lies. Points, °C, hours. */
export interface SensorFaults {
  intervalMin: number;
  white: number;
  correlated: number;
  correlationH: number;
  outlierShare: number;
  /** Bursts of bubbles under the float, per 10 days. */
  bursts: number;
  perDegree: number;
  gain: number;
  offset: number;
  driftPerDay: number;
  /** When someone moved it, and by how much. */
  steps: { hour: number; points: number }[];
  frozen: { from: number; to: number } | null;
  /** Spans with no data; `late` ones are delivered when they end. */
  gaps: { from: number; to: number; late: boolean }[];
  clockErrorH: number;
  decimals: number;
}

export function usualSensor(random: Random): SensorFaults {
  return {
    intervalMin: random.pick([5, 10, 15, 15, 15, 30, 60, 60, 120]),
    white: random.between(0.3, 1.0),
    correlated: random.between(0.1, 0.35),
    correlationH: random.between(2, 6),
    outlierShare: random.between(0.002, 0.015),
    bursts: random.between(0, 1.2),
    perDegree: random.normal(0, 0.05),
    gain: random.normal(0, 0.006),
    offset: random.normal(0, 0.5),
    driftPerDay: random.between(-0.01, 0.04),
    steps: [],
    frozen: null,
    gaps: [],
    clockErrorH: 0,
    decimals: random.pick([4, 4, 4, 5]),
  };
}

/** What the float sends of a ferment from `startH` on, as the server gets it. `origin` is the pitch. */
export function sense(truth: Truth, faults: SensorFaults, random: Random, origin: number, startH: number, endH: number): Reading[] {
  const readings: Reading[] = [];
  const step = faults.intervalMin / 60;
  const most = Math.max(...truth.rate, 1);
  const keep = Math.exp(-step / faults.correlationH);
  let wander = random.normal(0, faults.correlated);
  let burstLeft = 0;
  let burstSize = 0;
  let stuckAt: number | null = null;
  const calibrationC = truth.temperature[0]!;
  for (let hour = startH + random.between(0, step); hour <= endH; hour += step) {
    const at = Math.min(truth.gravity.length - 1, Math.max(0, hour / truth.step));
    const lo = Math.floor(at);
    const hi = Math.min(truth.gravity.length - 1, lo + 1);
    const share = at - lo;
    const true_ = truth.gravity[lo]! + (truth.gravity[hi]! - truth.gravity[lo]!) * share;
    const celsius = truth.temperature[lo]! + (truth.temperature[hi]! - truth.temperature[lo]!) * share;
    const busy = Math.min(1, truth.rate[lo]! / most) * Math.min(1, most / 8);
    wander = keep * wander + random.normal(0, faults.correlated * Math.sqrt(1 - keep * keep));
    let value = true_ * (1 + faults.gain) + faults.offset + faults.perDegree * (celsius - calibrationC) + faults.driftPerDay * (hour / 24);
    for (const move of faults.steps) if (hour >= move.hour) value += move.points;
    value += wander + random.normal(0, faults.white * (1 + 0.6 * busy));
    if (burstLeft > 0) burstLeft -= step;
    else if (random.chance((faults.bursts * step) / 240) && busy > 0.02) {
      burstLeft = random.between(1, 7);
      burstSize = random.between(2, 10);
    }
    if (burstLeft > 0) value += burstSize * random.between(0.4, 1);
    if (random.chance(faults.outlierShare)) value += random.between(3, 20);
    if (faults.frozen && hour >= faults.frozen.from && hour < faults.frozen.to) {
      stuckAt ??= value;
      value = stuckAt + random.normal(0, 0.03);
    } else stuckAt = null;
    const gap = faults.gaps.find((one) => hour >= one.from && hour < one.to);
    if (gap && !gap.late) continue;
    const scale = 10 ** faults.decimals;
    const measured = Math.round(origin + (hour + faults.clockErrorH) * 3_600_000);
    const received = gap ? Math.round(origin + gap.to * 3_600_000) : Math.round(origin + hour * 3_600_000) + 2000;
    readings.push({
      at: measured,
      gravity: Math.round((1 + value / 1000) * scale) / scale,
      temperature: Math.round((celsius + random.normal(0, 0.1)) * 10) / 10,
      receivedAt: received,
    });
  }
  return readings;
}
