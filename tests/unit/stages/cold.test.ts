import { describe, expect, it } from 'vitest';
import { Watch } from '../../../lib/core/stages/watch';
import type { BatchSetup, Reading } from '../../../lib/core/types';

const PITCH = Date.UTC(2026, 1, 20, 18);
const HOUR = 3_600_000;
const setup: BatchSetup = { kind: 'beer', pitchedAt: PITCH, originalGravity: 1.06, volumeL: 20, vesselL: 25, attenuation: { min: 0.72, max: 0.8 }, alcoholToleranceAbv: null, temperature: { minC: 15, maxC: 25 }, events: [], timeZone: 'UTC' };

type By = (hour: number) => number;
function record(hours: number, points: By, celsius: By): Reading[] {
  return Array.from({ length: hours }, (_, hour) => ({ at: PITCH + hour * HOUR, gravity: 1 + (points(hour) + 0.1 * Math.sin(7 * hour)) / 1000, temperature: celsius(hour) }));
}

describe('a batch that has cooled', () => {
  const at = (hour: number, points: By, celsius: By): Watch => {
    const watch = new Watch(setup, PITCH, []);
    const readings = record(hour + 1, points, celsius);
    for (let h = 3; h <= hour; h += 3) watch.look(h, readings);
    return watch;
  };
  const cooling: By = (hour) => (hour < 60 ? 25 : Math.max(20.5, 25 - (hour - 60) / 8));

  it('is not cold where only the heat of its own work has gone', () => {
    const quick: By = (hour) => 14 + 46 / (1 + Math.exp((hour - 36) / 7));
    expect(at(108, quick, cooling).coldNow()).toBe(false);
  });

  it('is cold where its work was too slow to have warmed it', () => {
    const slow: By = (hour) => 60 - Math.min(hour, 60) / 12;
    expect(at(108, slow, cooling).coldNow()).toBe(true);
  });

  it('is cold below its range whatever it did', () => {
    const quick: By = (hour) => 14 + 46 / (1 + Math.exp((hour - 36) / 7));
    expect(at(108, quick, (hour) => (hour < 60 ? 24 : 12)).coldNow()).toBe(true);
  });
});
