import { describe, expect, it } from 'vitest';
import { assess } from '../../../lib/core/assess';
import { modelGravity } from '../../../lib/core/fit/models';
import { swapGasLPerH } from '../../../lib/core/gas/gas';
import { whatIf, type WhatIf } from '../../../lib/core/what-if';
import type { BatchSetup, Footing, Judgement, Reading } from '../../../lib/core/types';
import { Random } from '../../evaluation/random';

const PITCH = Date.UTC(2026, 1, 20, 18);
const DAY = 86_400_000;

const setup: BatchSetup = {
  kind: 'cider',
  pitchedAt: PITCH,
  originalGravity: 1.055,
  volumeL: 4.5,
  vesselL: 6,
  attenuation: { min: 0.95, max: 1.05 },
  alcoholToleranceAbv: 14,
  temperature: { minC: 15, maxC: 22 },
  neck: 'blow_off',
  events: [],
  timeZone: 'UTC',
};

function record(days: number, points: (day: number) => number): Reading[] {
  const random = new Random(5, 'what-if');
  return Array.from({ length: Math.floor(days * 48) + 1 }, (_, i) => {
    const day = i / 48;
    return { at: PITCH + Math.round(day * DAY), gravity: 1 + (points(day) + random.normal(0, 0.4)) / 1000, temperature: 19 + random.normal(0, 0.1) };
  });
}

const cider = (day: number): number => modelGravity('kinetic', [55, -1, -1, 0.2, -1.2, -1], day);
const judged = (day: number, extra: Partial<BatchSetup> = {}): Judgement & { footing: Footing } => {
  const judgement = assess({ ...setup, ...extra }, record(day, cider), PITCH + day * DAY);
  expect(judgement.footing).not.toBeNull();
  return judgement as Judgement & { footing: Footing };
};
const asked = (day: number, change: WhatIf, extra: Partial<BatchSetup> = {}) => {
  const outcome = whatIf(judged(day, extra).footing, { ...setup, ...extra }, change);
  expect(outcome).not.toBeNull();
  return outcome!;
};
const lastOf = <T>(items: readonly T[]): T => items[items.length - 1]!;

describe('what if', () => {
  it('nothing were otherwise is the forecast as it is judged', () => {
    const { assessment, footing } = judged(6);
    const same = whatIf(footing, setup)!;
    expect(same.finalGravity).toBeCloseTo(assessment.finalGravity!.value, 5);
    expect(Math.abs(same.end!.value - assessment.terminalAt!.value)).toBeLessThan(60_000);
    expect(same.abvPercent).toBeCloseTo(assessment.expectedAbvPercent!, 3);
    expect(same.curve[0]!.gravity).toBeCloseTo(assessment.gravity!.value, 2);
  });

  it('it stopped elsewhere ends there, and passes through the readings as before', () => {
    const { footing } = judged(6);
    for (const finalGravity of [1.004, 0.994]) {
      const outcome = whatIf(footing, setup, { finalGravity })!;
      expect(outcome.finalGravity).toBeCloseTo(finalGravity, 4);
      expect(outcome.curve[0]!.gravity).toBeCloseTo(1 + footing.level / 1000, 2);
      expect(lastOf(outcome.curve).gravity).toBeGreaterThan(finalGravity - 0.0002);
    }
    const [high, low] = [asked(6, { finalGravity: 1.004 }), asked(6, { finalGravity: 0.994 })];
    expect(high.abvPercent).toBeLessThan(low.abvPercent);
    expect(high.end!.value).toBeLessThan(low.end!.value);
  });

  it('the room were colder comes to the same end later, by the ratio of the pace', () => {
    const same = asked(6, {});
    const cold = asked(6, { temperatureC: 14 });
    const warm = asked(6, { temperatureC: 24 });
    const wait = (outcome: typeof same) => outcome.end!.value - (PITCH + 6 * DAY);
    // Q10 of 2.2, as the judgement has it; the record lies at 19 °C.
    expect(wait(cold) / wait(same)).toBeCloseTo(2.2 ** 0.5, 1);
    expect(wait(warm) / wait(same)).toBeCloseTo(2.2 ** -0.5, 1);
    expect(cold.finalGravity).toBe(same.finalGravity);
    expect(warm.gas.value).toBeGreaterThan(same.gas.value);
  });

  it('sugar went in raises gravity at once, strength at the end, gas and the time with the tube', () => {
    const same = asked(6, {});
    const fed = asked(6, { sugarG: 200 });
    // 200 g in 4.5 L: some 17 points, a little less because it takes room.
    expect(fed.gravity - (1 + judged(6).footing.level / 1000)).toBeGreaterThan(0.014);
    expect(fed.gravity - (1 + judged(6).footing.level / 1000)).toBeLessThan(0.018);
    // 44.4 g/L of sugar give about 2.6 % vol (17 g/L a per cent: common practice) of the larger volume.
    expect(fed.abvPercent - same.abvPercent).toBeGreaterThan(2.0);
    expect(fed.abvPercent - same.abvPercent).toBeLessThan(2.8);
    expect(fed.end!.value).toBeGreaterThan(same.end!.value);
    expect(fed.gas.value).toBeGreaterThan(same.gas.value);
    // Sugar leaves nothing behind, and its alcohol makes the drink lighter.
    expect(fed.finalGravity).toBeLessThan(same.finalGravity);
    expect(lastOf(fed.curve).gravity).toBeLessThan(fed.finalGravity + 0.002);
  });

  it('no sugar went in changes nothing', () => {
    const same = asked(8, {});
    const nothing = asked(8, { sugarG: 0.01 });
    expect(nothing.finalGravity).toBeCloseTo(same.finalGravity, 4);
    expect(nothing.abvPercent).toBeCloseTo(same.abvPercent, 2);
    expect(nothing.volumeL).toBeCloseTo(setup.volumeL, 3);
  });

  it('more sugar went in than the yeast bears leaves some of it', () => {
    const bearable = asked(8, { sugarG: 250 }, { alcoholToleranceAbv: 18 });
    const tooMuch = asked(8, { sugarG: 600 }, { alcoholToleranceAbv: 10 });
    expect(bearable.toleranceReached).toBe(false);
    expect(tooMuch.toleranceReached).toBe(true);
    expect(tooMuch.finalGravity).toBeGreaterThan(bearable.finalGravity + 0.01);
    expect(tooMuch.abvPercent).toBeLessThan(10.8);
  });

  it('a must as strong as the batch was went in gives the same strength in the end', () => {
    const same = asked(8, {});
    const more = asked(8, { liquid: { volumeL: 1, gravity: 1.055 } });
    expect(more.abvPercent).toBeCloseTo(same.abvPercent, 1);
    expect(more.finalGravity).toBeCloseTo(same.finalGravity, 3);
    expect(more.volumeL).toBeCloseTo(5.5, 1);
  });

  it('more went in than the vessel holds is no answer', () => {
    expect(whatIf(judged(8).footing, setup, { liquid: { volumeL: 3, gravity: 1.05 } })).toBeNull();
  });

  it('asks for the tube for as long as the gas is over what the headspace bears', () => {
    const roomy = asked(4, {}, { vesselL: 20 });
    const tight = asked(4, { temperatureC: 26 }, { vesselL: 4.7 });
    expect(roomy.neck.tubeUntil).toBeNull();
    expect(tight.neck.limit).toBeCloseTo(swapGasLPerH('cider', 4.5, 4.7), 6);
    expect(tight.gas.value).toBeGreaterThan(tight.neck.limit);
    expect(tight.neck.tubeUntil).toBeGreaterThan(PITCH + 4 * DAY);
  });

  it('keeps the tube on while the krausen builds, even where the gas would stay low', () => {
    const judgement = judged(2.5);
    expect(judgement.footing.peaked).toBe(false);
    const slow = whatIf(judgement.footing, { ...setup, vesselL: 20 }, { temperatureC: 10 })!;
    expect(slow.gas.value).toBeLessThan(slow.neck.limit);
    expect(slow.neck.tubeUntil).toBeGreaterThan(PITCH + 2.5 * DAY);
  });

  it('it were fed once it is done begins anew, and without food stays where it is', () => {
    const done = judged(40);
    expect(done.footing.state).toBe('terminal');
    const still = whatIf(done.footing, setup, { temperatureC: 24 })!;
    expect(still.end).toBeNull();
    expect(still.gas.value).toBe(0);
    const fed = whatIf(done.footing, setup, { sugarG: 30 })!;
    expect(fed.end!.value).toBeGreaterThan(PITCH + 40 * DAY);
    expect(fed.gas.value).toBeGreaterThan(0.01);
  });

  it('a stalled batch took up again ends at its bed, sooner where it is warm', () => {
    const stalling = (day: number) => Math.max(cider(day), 25);
    const judgement = assess(setup, record(12, stalling), PITCH + 12 * DAY);
    expect(judgement.footing).toMatchObject({ state: 'stuck' });
    const as = whatIf(judgement.footing!, setup)!;
    const warm = whatIf(judgement.footing!, setup, { temperatureC: 24 })!;
    expect(lastOf(as.curve).gravity).toBeLessThan(1.01);
    expect(warm.end!.value).toBeLessThan(as.end!.value);
  });

  it('costs a browser little', () => {
    const { footing } = judged(6);
    const began = performance.now();
    for (let i = 0; i < 20; i += 1) whatIf(footing, setup, { finalGravity: 0.994 + i * 0.0005, temperatureC: 22 });
    // A slow phone is some ten times slower than this machine; a stroke of a key may take 50 ms.
    expect((performance.now() - began) / 20).toBeLessThan(25);
  });
});
