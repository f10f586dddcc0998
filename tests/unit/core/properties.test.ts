import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { assess, assessEvery } from '../../../lib/core/assess';
import { CALL_NAMES, DRINK_KINDS, EVENT_KINDS, NECKS, type Assessment, type BatchEvent, type BatchSetup, type Judgement, type Reading } from '../../../lib/core/types';
import { Random } from '../../evaluation/random';

const PITCH = Date.UTC(2026, 1, 20, 18);
const HOUR = 3_600_000;

const setups: fc.Arbitrary<BatchSetup> = fc.record({
  kind: fc.constantFrom(...DRINK_KINDS),
  pitchedAt: fc.oneof({ weight: 9, arbitrary: fc.constant(PITCH) }, fc.constant(null)),
  originalGravity: fc.option(fc.double({ min: 1.0, max: 1.15, noNaN: true })),
  volumeL: fc.double({ min: 0.5, max: 60, noNaN: true }),
  vesselL: fc.double({ min: 0.5, max: 70, noNaN: true }),
  attenuation: fc.option(fc.constantFrom({ min: 0.7, max: 0.8 }, { min: 0.95, max: 1.1 }, { min: 1, max: 1 })),
  alcoholToleranceAbv: fc.option(fc.double({ min: 2, max: 20, noNaN: true })),
  temperature: fc.option(fc.constant({ minC: 15, maxC: 22 })),
  neck: fc.option(fc.constantFrom(...NECKS)),
  events: fc.array(
    fc.record<BatchEvent>({
      at: fc.integer({ min: -48, max: 900 }).map((h) => PITCH + h * HOUR),
      kind: fc.constantFrom(...EVENT_KINDS),
      sugarG: fc.option(fc.double({ min: 0, max: 2000, noNaN: true })),
      fruitG: fc.option(fc.double({ min: 0, max: 5000, noNaN: true })),
      volumeL: fc.option(fc.double({ min: 0, max: 5, noNaN: true })),
      gravity: fc.option(fc.double({ min: 0.98, max: 1.12, noNaN: true })),
    }),
    { maxLength: 6 },
  ),
});

/** Readings of every kind, sane and absurd. */
const wild: fc.Arbitrary<Reading[]> = fc.array(
  fc.record({
    at: fc.oneof(fc.integer({ min: -100, max: 900 * 60 }).map((m) => PITCH + m * 60_000), fc.constantFrom(Number.NaN, 0, Number.POSITIVE_INFINITY)),
    gravity: fc.oneof({ weight: 6, arbitrary: fc.double({ min: 0.97, max: 1.13, noNaN: true }) }, fc.double()),
    temperature: fc.option(fc.oneof({ weight: 6, arbitrary: fc.double({ min: 0, max: 40, noNaN: true }) }, fc.double())),
    receivedAt: fc.option(fc.integer({ min: 0, max: 1000 * 60 }).map((m) => PITCH + m * 60_000)),
  }),
  { maxLength: 400 },
);

/** A plain ferment with noise, as a float would send it. */
function ferment(seed: number, days: number, noise = 0.5, everyMin = 60): Reading[] {
  const random = new Random(seed, 'property');
  const og = random.between(45, 80);
  const fg = random.between(0, 12);
  const middle = random.between(2, 5);
  const pace = random.between(0.5, 1.5);
  const readings: Reading[] = [];
  for (let m = 0; m < days * 1440; m += everyMin) {
    const day = m / 1440;
    const points = fg + (og - fg) / (1 + Math.exp(pace * (day - middle)));
    readings.push({ at: PITCH + m * 60_000, gravity: 1 + (points + random.normal(0, noise)) / 1000, temperature: 19 + random.normal(0, 0.2) });
  }
  return readings;
}

const plain: BatchSetup = {
  kind: 'beer',
  pitchedAt: PITCH,
  originalGravity: 1.06,
  volumeL: 10,
  vesselL: 12,
  attenuation: { min: 0.8, max: 1 },
  alcoholToleranceAbv: 14,
  temperature: { minC: 16, maxC: 22 },
  events: [],
};

function numbersOf(value: unknown, path = ''): [string, number][] {
  if (typeof value === 'number') return [[path, value]];
  if (value === null || typeof value !== 'object') return [];
  return Object.entries(value).flatMap(([key, inner]) => numbersOf(inner, `${path}.${key}`));
}

/** An assessment with every instant moved back by `by`. */
function moved(assessment: Assessment, by: number): unknown {
  return JSON.parse(
    JSON.stringify(assessment, (key, value: unknown) => {
      if ((key === 'at' || key === 'since' || key === 'expectedAt' || key === 'lastReadingAt') && typeof value === 'number') return value - by;
      if (key === 'terminalAt' && value !== null) return Object.fromEntries(Object.entries(value as Record<string, number>).map(([k, v]) => [k, Math.round(v - by)]));
      // Sentences name days and hours.
      if (key === 'headline' || key === 'reason' || key === 'act' || key === 'changesIt') return undefined;
      return typeof value === 'number' ? Number(value.toPrecision(9)) : value;
    }),
  );
}

describe('an assessment', () => {
  it('is free of NaN and of errors whatever the readings and events', () => {
    fc.assert(
      fc.property(setups, wild, fc.integer({ min: -10, max: 900 }), (setup, readings, hour) => {
        const judgement = assess(setup, readings, PITCH + hour * HOUR);
        for (const [path, value] of numbersOf(judgement)) expect(Number.isFinite(value), path).toBe(true);
      }),
      { numRuns: 150 },
    );
  });

  it('does not depend on the order in which readings are given', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 1e6 }), fc.integer({ min: 1, max: 14 }), (seed, day) => {
        const readings = ferment(seed, 14);
        const random = new Random(seed, 'order');
        const mixed = readings.map((reading) => ({ reading, key: random.next() })).sort((a, b) => a.key - b.key).map((one) => one.reading);
        const at = PITCH + day * 24 * HOUR;
        expect(assess(plain, mixed, at)).toEqual(assess(plain, readings, at));
      }),
      { numRuns: 25 },
    );
  });

  it('does not change when a reading comes twice', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 1e6 }), fc.integer({ min: 0, max: 300 }), (seed, index) => {
        const readings = ferment(seed, 14);
        const twice = [...readings, { ...readings[index % readings.length]! }];
        const at = PITCH + 14 * 24 * HOUR;
        expect(assess(plain, twice, at)).toEqual(assess(plain, readings, at));
      }),
      { numRuns: 25 },
    );
  });

  it('moves with the clock: shifting all times shifts all answers', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 1e6 }), fc.integer({ min: -5000, max: 5000 }), fc.integer({ min: 1, max: 14 }), (seed, minutes, day) => {
        const by = minutes * 60_000;
        const readings = ferment(seed, 14);
        const at = PITCH + day * 24 * HOUR;
        const later = readings.map((reading) => ({ ...reading, at: reading.at + by }));
        const shifted = assess({ ...plain, pitchedAt: PITCH + by }, later, at + by).assessment;
        expect(moved(shifted, by)).toEqual(moved(assess(plain, readings, at).assessment, 0));
      }),
      { numRuns: 25 },
    );
  });

  it('nests its intervals, and no call begins after the moment it is made for', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 1e6 }), fc.integer({ min: 1, max: 330 }), fc.double({ min: 0.1, max: 2, noNaN: true }), (seed, hour, noise) => {
        const at = PITCH + hour * HOUR;
        const { assessment } = assess(plain, ferment(seed, 14, noise), at);
        const fg = assessment.finalGravity;
        if (fg) {
          expect(fg.lo95).toBeLessThanOrEqual(fg.lo);
          expect(fg.lo).toBeLessThanOrEqual(fg.value);
          expect(fg.value).toBeLessThanOrEqual(fg.hi);
          expect(fg.hi).toBeLessThanOrEqual(fg.hi95);
        }
        for (const estimate of [assessment.gravity, assessment.ratePointsPerDay, assessment.gasLPerH, assessment.terminalAt]) {
          if (!estimate) continue;
          expect(estimate.lo).toBeLessThanOrEqual(estimate.value);
          expect(estimate.value).toBeLessThanOrEqual(estimate.hi);
        }
        for (const name of CALL_NAMES) expect(assessment.calls[name].since ?? at, name).toBeLessThanOrEqual(at);
      }),
      { numRuns: 60 },
    );
  });

  it('is the same alone as among others of its batch', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 1e6 }), (seed) => {
        const readings = ferment(seed, 10).map((reading, i) => ({ ...reading, receivedAt: i % 50 < 10 ? reading.at + 9 * HOUR : reading.at }));
        const times = Array.from({ length: 20 }, (_, i) => PITCH + (i + 1) * 12 * HOUR);
        const together: Judgement[] = [...assessEvery(plain, readings, times)];
        for (const i of [3, 9, 19]) expect(together[i]).toEqual(assess(plain, readings, times[i]!));
      }),
      { numRuns: 15 },
    );
  });

  it('does not look ahead: what is received later changes nothing now', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 1e6 }), fc.integer({ min: 2, max: 10 }), (seed, day) => {
        const readings = ferment(seed, 14);
        const at = PITCH + day * 24 * HOUR;
        expect(assess(plain, readings.filter((reading) => reading.at <= at), at)).toEqual(assess(plain, readings, at));
      }),
      { numRuns: 25 },
    );
  });

  it('is no surer of the pace with more noise, on average', () => {
    const width = (noise: number): number => {
      let sum = 0;
      let n = 0;
      for (let seed = 1; seed <= 30; seed += 1) {
        for (const hour of [60, 120, 200]) {
          const rate = assess(plain, ferment(seed, 10, noise), PITCH + hour * HOUR).assessment.ratePointsPerDay;
          if (rate) {
            sum += rate.hi - rate.lo;
            n += 1;
          }
        }
      }
      return sum / n;
    };
    expect(width(2)).toBeGreaterThan(width(0.5));
  });
});
