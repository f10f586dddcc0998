import { describe, expect, it } from 'vitest';
import { robustLine } from '../../../lib/core/series/line';
import { fitTail, usualPace } from '../../../lib/core/series/tail';
import { Random } from '../../evaluation/random';

const hours = (n: number): Float64Array => Float64Array.from({ length: n }, (_, i) => i);

function noisy(n: number, slopePerDay: number, sd: number, seed: number): { t: Float64Array; g: Float64Array } {
  const random = new Random(seed, 'line');
  const t = hours(n);
  return { t, g: t.map((hour) => 40 + (slopePerDay * hour) / 24 + random.normal(0, sd)) };
}

describe('the robust line', () => {
  it('finds a clean slope exactly', () => {
    const { t, g } = noisy(48, -6, 0, 1);
    expect(robustLine(t, g, 0, 48)!.slope).toBeCloseTo(-6, 9);
  });

  it('is not moved by a burst of bubbles over a seventh of its window, where least squares is', () => {
    const { t, g } = noisy(48, -2, 0.3, 2);
    for (let i = 38; i < 45; i += 1) g[i] = g[i]! + 8;
    const line = robustLine(t, g, 0, 48)!;
    expect(Math.abs(line.slope + 2)).toBeLessThan(0.5);
    const mean = (values: Float64Array): number => values.reduce((a, b) => a + b, 0) / values.length;
    const tm = mean(t);
    const gm = mean(g);
    let cross = 0;
    let square = 0;
    t.forEach((hour, i) => {
      cross += (hour - tm) * (g[i]! - gm);
      square += (hour - tm) ** 2;
    });
    expect(Math.abs((24 * cross) / square + 2)).toBeGreaterThan(1);
  });

  it('covers the true slope nine times in ten with noise that hangs together', () => {
    let inside = 0;
    for (let seed = 1; seed <= 300; seed += 1) {
      const random = new Random(seed, 'ar');
      const t = hours(48);
      let wander = 0;
      const g = t.map((hour) => {
        wander = 0.75 * wander + random.normal(0, 0.17);
        return 30 - (3 * hour) / 24 + wander + random.normal(0, 0.3);
      });
      const line = robustLine(t, g, 0, 48)!;
      if (Math.abs(line.slope + 3) < 1.96 * line.se) inside += 1;
    }
    // Nominal 95 %: short autocorrelated records fall a little short of it.
    expect(inside / 300).toBeGreaterThan(0.86);
  });

  it('says nothing of fewer than five points', () => {
    const { t, g } = noisy(4, -2, 0.1, 3);
    expect(robustLine(t, g, 0, 4)).toBeNull();
  });
});

describe('the tail', () => {
  const tailOf = (lambda: number, remaining: number, seed: number, ageDays: number) => {
    const random = new Random(seed, 'tail');
    const n = Math.min(240, Math.max(72, Math.round(6 * ageDays)));
    const t = Float64Array.from({ length: n }, (_, i) => ageDays * 24 - n + i);
    const g = t.map((hour) => 5 + remaining * Math.exp((lambda * (ageDays * 24 - hour)) / 24) + random.normal(0, 0.3));
    return fitTail(t, g, 0, n, ageDays * 24, ageDays)!;
  };

  it('knows what is still to come of an exponential end', () => {
    for (const [lambda, age] of [[0.6, 10], [0.3, 20], [0.15, 40]] as const) {
      const tail = tailOf(lambda, 2, 5, age);
      expect(Math.abs(tail.remaining - 2)).toBeLessThan(2 * tail.sd + 0.3);
      expect(tail.likely).toBeLessThanOrEqual(tail.remaining + 0.5);
    }
  });

  it('says nought of a record that has come to rest, and is sure of it', () => {
    const tail = tailOf(0.3, 0, 6, 20);
    expect(Math.abs(tail.remaining)).toBeLessThan(0.3);
    expect(tail.sd).toBeLessThan(0.4);
  });

  it('lets an old batch slow down slower than a young one of the same record', () => {
    const paces = [3, 10, 25, 30, 40, 60, 120].map((age) => usualPace(age));
    expect(paces[0]).toBe(6);
    expect(paces).toEqual([...paces].sort((a, b) => b - a));
    expect(paces.at(-1)).toBeGreaterThan(3);
    const t = Float64Array.from({ length: 200 }, (_, i) => i);
    const random = new Random(4, 'age');
    const g = t.map((hour) => 6 - (0.08 * hour) / 24 + random.normal(0, 0.3));
    const left = [10, 30, 60].map((age) => fitTail(t, g, 0, 200, 200, age)!.remaining);
    expect(left[0]).toBeLessThan(left[1]!);
    expect(left[1]).toBeLessThan(left[2]!);
  });

  it('knows what is still to come of an end whose pace wanes, where a steady pace promises too little', () => {
    const ageDays = 30;
    const random = new Random(11, 'waning');
    const t = Float64Array.from({ length: 240 }, (_, i) => ageDays * 24 - 240 + i);
    const g = t.map((hour) => 5 + 3 * (hour / (ageDays * 24)) ** -4 + random.normal(0, 0.3));
    const steady = fitTail(t, g, 0, 240, ageDays * 24, ageDays)!;
    const waning = fitTail(t, g, 0, 240, ageDays * 24, ageDays, true)!;
    expect(Math.abs(waning.remaining - 3)).toBeLessThan(1.28 * waning.sd);
    expect(steady.remaining).toBeLessThan(waning.remaining - 0.3);
  });

  it('does not promise an end to a straight fall', () => {
    const random = new Random(9, 'straight');
    const t = Float64Array.from({ length: 168 }, (_, i) => 800 + i);
    const g = t.map((hour) => 20 - (0.3 * hour) / 24 + random.normal(0, 0.3));
    const tail = fitTail(t, g, 0, 168, 968, 40)!;
    expect(tail.remaining + 1.28 * tail.sd).toBeGreaterThan(2);
  });
});
