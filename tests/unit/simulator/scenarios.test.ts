import { describe, expect, test } from 'vitest';
import { generate, type SimulatedBatch } from '@/devices/simulator/generate';
import { scenarioNamed, scenarios } from '@/devices/simulator/scenarios';

const HOUR = 3_600_000;
const start = Date.UTC(2026, 2, 3, 9);
const SEEDS = [1, 2, 3, 4];

const made = new Map<string, SimulatedBatch>();

/** A batch as it stands at the age at which it shows what it is for, with the truth at hours before and after. */
function standing(name: string, seed: number) {
  const scenario = scenarioNamed(name);
  const batch = made.get(`${name}/${seed}`) ?? generate(scenario, { seed, start, end: start + (scenario.ageH + 45 * 24) * HOUR, intervalMin: 60 });
  made.set(`${name}/${seed}`, batch);
  const truthAt = (hours: number) => {
    const found = batch.readings.findLast(({ measuredAt }) => measuredAt <= start + hours * HOUR) ?? batch.readings[0];
    if (!found) throw new Error('no readings');
    return found.truth;
  };
  const pointsAt = (hours: number) => (truthAt(hours).gravity - 1) * 1000;
  /** Points a day over the day before. */
  const fall = (hours: number) => pointsAt(hours - 24) - pointsAt(hours);
  return { scenario, batch, age: scenario.ageH, truthAt, pointsAt, fall, dry: (scenario.must.dryGravity - 1) * 1000 };
}

describe('every scenario', () => {
  test('there are at least fourteen, each named as it is filed', () => {
    expect(Object.keys(scenarios).length).toBeGreaterThanOrEqual(14);
    for (const [name, scenario] of Object.entries(scenarios)) expect(scenario.name).toBe(name);
  });

  test.each(Object.values(scenarios))('$name: leaves room for foam, and all that is done lies before its age', (scenario) => {
    const added = scenario.events.reduce((sum, { volumeL = 0, sugarG = 0 }) => sum + volumeL + sugarG * 0.00062, 0);
    expect(scenario.volumeL + added).toBeLessThanOrEqual(scenario.vessel.litres);
    for (const { atH } of scenario.events) expect(atH).toBeLessThan(scenario.ageH);
  });

  test('the log holds what was done, with hydrometer readings near the truth', () => {
    const { batch, truthAt } = standing('racking', 3);
    expect(batch.events.map(({ kind }) => kind)).toEqual(['reading', 'rack', 'top_up', 'reading']);
    for (const event of batch.events.filter(({ kind }) => kind === 'reading')) {
      expect(Math.abs((event.gravity ?? NaN) - truthAt((event.at - start) / HOUR).gravity)).toBeLessThan(0.0025);
    }
    expect(batch.setup.events).toEqual(batch.events);
    expect(Math.abs((batch.setup.originalGravity ?? NaN) - truthAt(0).gravity)).toBeLessThan(0.003);
  });

  test('a name that is not there is answered with those that are', () => {
    expect(() => scenarioNamed('toString')).toThrow(/healthy-beer/);
  });
});

describe.each(SEEDS)('with seed %i', (seed) => {
  test.each(['healthy-beer', 'healthy-cider', 'healthy-mead', 'healthy-country-wine', 'foaming', 'in-lag', 'late-start'])('%s ferments out in the end', (name) => {
    const { age, pointsAt, dry } = standing(name, seed);
    expect(pointsAt(age + 44 * 24) - dry).toBeLessThan(2.5);
  });

  test.each(['healthy-cider', 'healthy-mead', 'healthy-country-wine', 'late-backlog', 'frozen-float'])('%s still works at its age', (name) => {
    const { age, fall } = standing(name, seed);
    expect(fall(age)).toBeGreaterThan(1);
  });

  test('stuck-cold has stopped for two days or more, far from its end, in the cold', () => {
    const { age, pointsAt, fall, truthAt, dry, scenario } = standing('stuck-cold', seed);
    expect(fall(85)).toBeGreaterThan(5);
    expect(pointsAt(age - 48) - pointsAt(age)).toBeLessThan(0.3);
    expect(pointsAt(age) - dry).toBeGreaterThan(12);
    expect(truthAt(age).temperatureC).toBeLessThan(scenario.packet.temperature.minC);
  });

  test.each(['stuck-hunger', 'stuck-alcohol'])('%s has all but stopped with much sugar left', (name) => {
    const { age, truthAt, fall, scenario } = standing(name, seed);
    expect(fall(age)).toBeLessThan(0.5);
    expect(truthAt(age + 44 * 24).sugarLeft).toBeGreaterThan(25);
    expect(truthAt(age).ethanol / 7.8924).toBeLessThan(scenario.packet.toleranceAbv - 2);
  });

  test('never-started has not fallen by a tenth of a point', () => {
    const { age, pointsAt } = standing('never-started', seed);
    expect(pointsAt(0) - pointsAt(age)).toBeLessThan(0.1);
  });

  test('in-lag has not begun and begins within three days', () => {
    const { age, pointsAt } = standing('in-lag', seed);
    expect(pointsAt(0) - pointsAt(age)).toBeLessThan(0.5);
    expect(pointsAt(0) - pointsAt(age + 60)).toBeGreaterThan(5);
  });

  test('foaming makes more gas than half its headspace can hold as foam', () => {
    const { age, truthAt, scenario, batch } = standing('foaming', seed);
    const swapAt = (0.5 * (scenario.vessel.litres - scenario.volumeL)) / 0.3;
    expect(truthAt(age).gasLPerH).toBeGreaterThan(swapAt);
    expect(Math.max(...batch.readings.map(({ body }) => body.foam ?? 0))).toBeGreaterThan(40);
  });

  test('ready-to-rack is within two and a half points of its end and still falls a little', () => {
    const { age, pointsAt, dry, fall } = standing('ready-to-rack', seed);
    expect(pointsAt(age) - dry).toBeLessThan(2.5);
    expect(fall(age)).toBeGreaterThan(0.05);
    expect(fall(age)).toBeLessThan(0.8);
  });

  test('finished has been still for weeks', () => {
    const { age, pointsAt, dry } = standing('finished', seed);
    expect(pointsAt(age - 30 * 24) - pointsAt(age)).toBeLessThan(0.1);
    expect(pointsAt(age) - dry).toBeLessThan(1);
  });

  test('long-tail falls a little every day in its seventh week', () => {
    const { age, fall, truthAt } = standing('long-tail', seed);
    expect(fall(age)).toBeGreaterThan(0.05);
    expect(fall(age)).toBeLessThan(0.4);
    expect(truthAt(age).sugarLeft).toBeGreaterThan(3);
  });

  test('step-feeding rises at each feed and falls after it', () => {
    const { pointsAt, scenario } = standing('step-feeding', seed);
    for (const { atH } of scenario.events) {
      expect(pointsAt(atH + 1) - pointsAt(atH - 1)).toBeGreaterThan(8);
      expect(pointsAt(atH + 1) - pointsAt(atH + 72)).toBeGreaterThan(8);
    }
  });

  test('slow-release rises for a day or more after the pieces go in, and falls again', () => {
    const { pointsAt, scenario, age } = standing('slow-release', seed);
    const at = scenario.events[0]?.atH ?? NaN;
    expect(pointsAt(at + 6) - pointsAt(at)).toBeGreaterThan(0.5);
    expect(pointsAt(at + 24) - pointsAt(at + 6)).toBeGreaterThan(0.5);
    expect(pointsAt(at + 40) - pointsAt(age + 7 * 24)).toBeGreaterThan(4);
  });

  test('refermentation was at rest before it was sweetened and has fallen since', () => {
    const { pointsAt, scenario, age, fall } = standing('refermentation', seed);
    const sweetened = scenario.events.find(({ kind }) => kind === 'addition')?.atH ?? NaN;
    expect(fall(sweetened - 1)).toBeLessThan(0.1);
    expect(pointsAt(sweetened + 1) - pointsAt(age)).toBeGreaterThan(1.5);
    expect(fall(age)).toBeGreaterThan(0.2);
  });

  test('hot-room ferments above its yeast’s range', () => {
    const { age, truthAt, scenario, fall } = standing('hot-room', seed);
    expect(truthAt(age).temperatureC).toBeGreaterThan(scenario.packet.temperature.maxC + 1);
    expect(fall(age)).toBeGreaterThan(5);
  });

  test('late-start lies still for three days and ferments at its age', () => {
    const { age, pointsAt, fall } = standing('late-start', seed);
    expect(pointsAt(0) - pointsAt(66)).toBeLessThan(1);
    expect(fall(age)).toBeGreaterThan(5);
  });
});
