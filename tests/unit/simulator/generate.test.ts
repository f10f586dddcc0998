import { describe, expect, test } from 'vitest';
import { byArrival, generate } from '@/devices/simulator/generate';
import { scenarioNamed, scenarios } from '@/devices/simulator/scenarios';
import { reading as wireReading } from '@/lib/contracts/telemetry';

const HOUR = 3_600_000;
const start = Date.UTC(2026, 1, 20, 18);
const batch = (name: string, days: number, options: { seed?: number; intervalMin?: number } = {}) =>
  generate(scenarioNamed(name), { seed: 1, start, end: start + days * 24 * HOUR, ...options });

const median = (values: readonly number[]) => [...values].sort((one, other) => one - other)[Math.floor(values.length / 2)] ?? NaN;

/** Mean of the readings between two hours, points. */
function level(name: string, fromH: number, toH: number, seed = 1): number {
  const { readings } = batch(name, toH / 24, { seed });
  const inside = readings.filter(({ measuredAt }) => measuredAt >= start + fromH * HOUR);
  return inside.reduce((sum, { body }) => sum + ((body.gravity ?? NaN) - 1) * 1000, 0) / inside.length;
}

describe('a simulated series', () => {
  test('is the same again for the same scenario, seed, start and interval', () => {
    expect(batch('late-backlog', 12)).toEqual(batch('late-backlog', 12));
  });

  test('goes on where a shorter one ended', () => {
    const long = batch('healthy-cider', 12).readings;
    const short = batch('healthy-cider', 7).readings;
    expect(long.slice(0, short.length)).toEqual(short);
    expect(long.length).toBeGreaterThan(short.length);
  });

  test('differs from seed to seed', () => {
    const gravities = (seed: number) => batch('healthy-beer', 2, { seed }).readings.map(({ body }) => body.gravity);
    expect(gravities(1)).not.toEqual(gravities(2));
  });

  test('has the same truth whatever the interval', () => {
    const truthNear = (intervalMin: number) => batch('healthy-mead', 5, { intervalMin }).readings.at(-1)?.truth.gravity ?? NaN;
    expect(truthNear(5)).toBeCloseTo(truthNear(60), 3);
  });

  test('keeps its interval, in whole seconds, with a number for each reading', () => {
    const { readings } = batch('healthy-beer', 3);
    for (const { at, body } of readings) {
      expect(body.at).toBe(new Date(at).toISOString().replace('.000Z', 'Z'));
      expect(Math.abs(at - start - (body.sequence ?? NaN) * 15 * 60_000)).toBeLessThan(10_000);
    }
    expect(new Set(readings.map(({ at }) => at)).size).toBe(readings.length);
  });

  test('arrives in order, except for what a broken link held back', () => {
    const scenario = scenarioNamed('late-backlog');
    const all = batch('late-backlog', 12).readings;
    const arrived = [...byArrival(all)];
    expect(arrived).toHaveLength(all.length);
    expect(arrived.map(({ arrivesAt }) => arrivesAt)).toEqual(all.map(({ arrivesAt }) => arrivesAt).sort((one, other) => one - other));
    const [first] = scenario.sensor.gaps ?? [];
    const held = all.filter(({ measuredAt, arrivesAt }) => arrivesAt - measuredAt > 60_000 && measuredAt < start + (first?.toH ?? 0) * HOUR);
    expect(held.length).toBeGreaterThan(40);
    for (const { arrivesAt } of held) expect(arrivesAt).toBeGreaterThanOrEqual(start + (first?.toH ?? NaN) * HOUR);
  });

  test('loses some of its readings for good where the link is bad', () => {
    const { readings } = batch('late-backlog', 12);
    const lastSequence = readings.at(-1)?.body.sequence ?? 0;
    const lost = 1 - readings.length / (lastSequence + 1);
    expect(lost).toBeGreaterThan(0.03);
    expect(lost).toBeLessThan(0.12);
  });
});

describe('a simulated sensor', () => {
  test('reads the truth but for a few points of noise when nothing is wrong with it', () => {
    for (const seed of [1, 2, 3]) {
      const off = batch('healthy-country-wine', 12, { seed }).readings.map(({ body, truth }) => ((body.gravity ?? NaN) - truth.gravity) * 1000);
      const mean = off.reduce((sum, value) => sum + value, 0) / off.length;
      const spread = Math.sqrt(off.reduce((sum, value) => sum + (value - mean) ** 2, 0) / off.length);
      expect(Math.abs(mean)).toBeLessThan(2.5);
      expect(spread).toBeGreaterThan(0.3);
      expect(spread).toBeLessThan(2.5);
    }
  });

  test('falls silent when its cell is flat, and says so before', () => {
    const scenario = scenarioNamed('silent');
    const { readings } = batch('silent', 30);
    const flatAt = start + (scenario.sensor.flatAtH ?? NaN) * HOUR;
    expect(readings.at(-1)?.at).toBeLessThan(flatAt);
    expect(readings.at(-1)?.at).toBeGreaterThan(flatAt - HOUR);
    expect(readings.at(-1)?.body.battery).toBeLessThan(3.1);
    expect(readings[0]?.body.battery).toBeGreaterThan(4);
  });

  test('shows one number while its float hangs on the glass, though the drink ferments', () => {
    const { readings } = batch('frozen-float', 7);
    const hung = readings.filter(({ measuredAt }) => measuredAt > start + 131 * HOUR);
    const shown = hung.map(({ body }) => body.gravity ?? NaN);
    expect(Math.max(...shown) - Math.min(...shown)).toBeLessThan(0.0003);
    expect((hung[0]?.truth.gravity ?? NaN) - (hung.at(-1)?.truth.gravity ?? NaN)).toBeGreaterThan(0.008);
  });

  test('reads higher every day while deposit grows on it', () => {
    const { readings } = batch('drifting-float', 32);
    const off = (day: number) => {
      const found = readings.filter(({ measuredAt }) => Math.abs(measuredAt - start - day * 24 * HOUR) < 12 * HOUR);
      return median(found.map(({ body, truth }) => ((body.gravity ?? NaN) - truth.gravity) * 1000));
    };
    expect(off(30) - off(20)).toBeCloseTo(3.5, 0);
  });

  test('stamps its readings with its own clock, which may be behind', () => {
    for (const { at, measuredAt, arrivesAt } of batch('slow-clock', 2).readings) {
      expect(at).toBe(measuredAt - 5 * HOUR);
      expect(arrivesAt - measuredAt).toBeLessThan(10_000);
    }
  });

  test('is lifted by bubbles, never pushed down by them', () => {
    const off = batch('bubbles', 7).readings.map(({ body, truth }) => ((body.gravity ?? NaN) - truth.gravity) * 1000);
    const middle = median(off);
    expect(off.filter((value) => value - middle > 6).length).toBeGreaterThan(15);
    expect(off.filter((value) => value - middle < -6)).toHaveLength(0);
  });

  test('reads a step when it is moved at racking', () => {
    const rackedH = 26 * 24;
    expect(level('racking', rackedH + 1, rackedH + 24) - level('racking', rackedH - 24, rackedH - 1)).toBeLessThan(-2);
  });
});

describe.each(Object.keys(scenarios))('the readings of "%s"', (name) => {
  test('are such as the server takes', () => {
    for (const { body } of batch(name, Math.min(30, scenarioNamed(name).ageH / 24 + 2), { intervalMin: 60 }).readings) {
      const parsed = wireReading.safeParse(body);
      expect(parsed.error?.issues ?? []).toEqual([]);
    }
  });
});
