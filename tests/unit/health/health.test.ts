import { describe, expect, it } from 'vitest';
import { batteryForecast } from '@/lib/core/health/battery';
import { countGaps } from '@/lib/core/health/gaps';

const DAY = 86_400_000;
const NOW = Date.UTC(2026, 2, 30);
const cell = (days: number, volts: (daysAgo: number) => number) =>
  Array.from({ length: days * 24 }, (_, index) => {
    const daysAgo = index / 24;
    return { at: NOW - daysAgo * DAY, volts: volts(daysAgo) };
  });
/** Repeatable flicker of ± 10 mV. */
const flicker = (daysAgo: number) => 0.01 * Math.sin(daysAgo * 977);

describe('days left of a cell', () => {
  it('is where the line of its voltage meets the empty voltage, inside its interval', () => {
    // 3.9 V now, falling 10 mV a day: 3.3 V in 60 days.
    const forecast = batteryForecast(cell(20, (daysAgo) => 3.9 + 0.01 * daysAgo + flicker(daysAgo)), 3.3, NOW)!;
    expect(forecast.days).toBeGreaterThan(55);
    expect(forecast.days).toBeLessThan(65);
    expect(forecast.lo!).toBeLessThanOrEqual(forecast.days!);
    expect(forecast.hi!).toBeGreaterThanOrEqual(forecast.days!);
    expect(forecast.perDay).toBeCloseTo(-0.01, 3);
  });

  it('is not told before five days, nor for a cell that does not fall', () => {
    expect(batteryForecast(cell(4, () => 3.9), 3.3, NOW)).toBeNull();
    expect(batteryForecast(cell(20, (daysAgo) => 3.9 - 0.001 * daysAgo), 3.3, NOW)).toMatchObject({ days: null });
  });

  it('is zero for a cell that is empty', () => {
    expect(batteryForecast(cell(10, (daysAgo) => 3.2 + 0.01 * daysAgo), 3.3, NOW)).toMatchObject({ days: 0, lo: 0, hi: 0 });
  });

  it('is zero for one that dropped at its end, which a line through a month does not see, and with few days too', () => {
    const dropped = (daysAgo: number) => (daysAgo < 0.2 ? 2.9 : 3.9 + 0.005 * daysAgo);
    expect(batteryForecast(cell(25, dropped), 3.3, NOW)).toMatchObject({ days: 0, lo: 0, hi: 0 });
    expect(batteryForecast(cell(2, dropped), 3.3, NOW)).toEqual({ perDay: null, days: 0, lo: 0, hi: 0 });
    const once = cell(25, (daysAgo) => 3.9 + 0.005 * daysAgo);
    once[0]!.volts = 2.9;
    expect(batteryForecast(once, 3.3, NOW)!.days).toBeGreaterThan(100);
  });

  it('does not trip over one wild voltage', () => {
    const readings = cell(20, (daysAgo) => 3.9 + 0.01 * daysAgo);
    readings[30]!.volts = 0;
    expect(batteryForecast(readings, 3.3, NOW)!.days).toBeCloseTo(60, 0);
  });
});

describe('running numbers', () => {
  it('show what never came', () => {
    expect(countGaps([1, 2, 3, 7, 8])).toEqual({ heard: 5, missed: 3, restarts: 0 });
  });
  it('begin anew when the sensor starts again, and then nothing is missing', () => {
    expect(countGaps([40, 41, 0, 1, 3])).toEqual({ heard: 5, missed: 1, restarts: 1 });
  });
  it('say nothing where there are none, or the same number twice', () => {
    expect(countGaps([])).toEqual({ heard: 0, missed: 0, restarts: 0 });
    expect(countGaps([5, 5, 6])).toEqual({ heard: 3, missed: 0, restarts: 0 });
  });
});
