import { describe, expect, it } from 'vitest';
import type { BatchSetup, Reading } from '../../../lib/core/types';
import { Track } from '../../../lib/core/series/track';
import { Random } from '../../evaluation/random';

const PITCHED = Date.UTC(2026, 1, 1);
const HOUR = 3_600_000;
const setup: BatchSetup = { kind: 'cider', pitchedAt: PITCHED, originalGravity: 1.05, volumeL: 9, vesselL: 11, attenuation: null, alcoholToleranceAbv: null, temperature: null, events: [] };

/** Ten days of a falling float, every quarter of an hour. */
function track(): Track {
  const random = new Random(3, 'track');
  const readings: Reading[] = Array.from({ length: 960 }, (_, i) => ({
    at: PITCHED + i * 900_000,
    gravity: 1.05 - i / 40_000 + random.normal(0, 0.0005),
    temperature: 18 + random.normal(0, 1),
  }));
  const made = new Track(setup, PITCHED);
  made.extend(readings, PITCHED + 240 * HOUR);
  return made;
}

describe('the record of a batch', () => {
  it('gives the same line where it lies as when its sound bins are gathered', () => {
    const whole = track();
    const masked = track();
    masked.mask(0, 2);
    for (const hours of [8, 12, 24, 48, 168]) expect(masked.line(240 - hours, 240)).toEqual(whole.line(240 - hours, 240));
  });

  it('draws no line through a stretch that is mostly missing', () => {
    const one = track();
    expect(one.line(220, 260)).toBeNull();
    one.mask(200, 230);
    expect(one.line(200, 240)).toBeNull();
  });

  it('has its coldest and its warmest hour about the median', () => {
    const one = track();
    const median = one.temperature(100, 148)!;
    expect(one.coldest(100, 148)).toBeLessThan(median);
    expect(one.warmest(100, 148)).toBeGreaterThan(median);
    expect(one.coldest(300, 310)).toBe(Number.POSITIVE_INFINITY);
    expect(one.warmest(300, 310)).toBe(Number.NEGATIVE_INFINITY);
  });
});
