import { describe, expect, test } from 'vitest';
import { Ferment, unfermentable, warmthFactor, YEAST } from '@/devices/simulator/ferment';
import { gravityOf, sugarOf } from '@/devices/simulator/density';

const must = { gravity: 1.08, dryGravity: 0.996, nitrogen: 0.15 };
const steady = (celsius: number) => () => celsius;
const at20 = () => new Ferment(must, YEAST, 4.5, steady(20));

describe('a ferment', () => {
  test('starts at the must’s gravity and ends where no sugar is left', () => {
    const ferment = at20();
    expect(ferment.at(0).gravity).toBeCloseTo(1.08, 5);
    expect(ferment.at(40 * 24).gravity).toBeCloseTo(0.996, 3);
  });

  test('gives off the gas that the alcohol made came with', () => {
    const ferment = at20();
    let litres = 0;
    for (let hour = 0.05; hour < 900; hour += 0.1) litres += ferment.at(hour).gasLPerH * 0.1;
    const grams = ferment.at(900).ethanol * 4.5 * (44.0095 / 46.0684);
    expect(litres / ((grams / 44.0095) * 24.37)).toBeCloseTo(1, 2);
  });

  test('is the same however often it is asked', () => {
    const often = at20();
    for (let hour = 0; hour < 100; hour += 0.013) often.at(hour);
    expect(often.at(100)).toEqual(at20().at(100));
  });

  test('does not run backwards', () => {
    const ferment = at20();
    ferment.at(10);
    expect(() => ferment.at(5)).toThrow(RangeError);
  });

  test('warms itself while it works, by less than the heat of its sugar', () => {
    const ferment = at20();
    let warmest = 0;
    for (let hour = 0; hour < 200; hour += 1) warmest = Math.max(warmest, ferment.at(hour).temperatureC);
    expect(warmest).toBeGreaterThan(20.5);
    expect(warmest).toBeLessThan(20 + 0.31 * 84);
  });

  test('rests below its yeast’s lower limit and goes on when it is warm again', () => {
    const cold = new Ferment(must, { ...YEAST, dormantC: 12 }, 4.5, (hours) => (hours > 60 && hours < 400 ? 8 : 20));
    const halted = cold.at(120).gravity;
    expect(cold.at(390).gravity).toBeCloseTo(halted, 3);
    expect(cold.at(600).gravity).toBeLessThan(halted - 0.01);
  });

  test('ends at the alcohol that its yeast can bear', () => {
    const sweet = new Ferment({ ...must, gravity: 1.13 }, { ...YEAST, ethanolLimit: 80 }, 4.5, steady(20));
    const end = sweet.at(60 * 24);
    expect(end.ethanol).toBeLessThanOrEqual(80);
    expect(end.sugarLeft).toBeGreaterThan(40);
  });

  test('sugar raises the gravity by its mass over the volume, water lowers it', () => {
    const fed = new Ferment(must, YEAST, 4.5, steady(20), [{ atH: 0, sugarG: 90 }]);
    const kept = unfermentable(must.gravity, must.dryGravity, YEAST.yieldEthanol);
    const volume = 4.5 + 0.09 * 0.62;
    expect(fed.at(0.1).sugarLeft).toBeCloseTo(((sugarOf(1.08) - kept) * 4.5 + 90) / volume, 1);
    const thinned = new Ferment(must, YEAST, 4.5, steady(20), [{ atH: 0, volumeL: 0.5, gravity: 1 }]);
    expect(thinned.at(0.1).gravity).toBeCloseTo(gravityOf((sugarOf(1.08) * 4.5) / 5, 0), 4);
  });

  test('pieces give up their sugar slowly: the gravity rises for hours', () => {
    const asleep = { ...YEAST, cells: 0 };
    const pieces = new Ferment(must, asleep, 4, steady(20), [{ atH: 10, fruitG: 400, sugarShare: 0.5, releaseH: 24 }]);
    const before = pieces.at(9).gravity;
    const day = pieces.at(34).gravity;
    const end = pieces.at(300).gravity;
    expect((day - before) / (end - before)).toBeCloseTo(1 - Math.exp(-1), 1);
    expect(end - before).toBeCloseTo((gravityOf(50, 0) - 1) * 0.98, 2);
  });

  test('rates double in ten kelvin and end with the heat', () => {
    expect(warmthFactor(20)).toBe(1);
    expect(warmthFactor(30) / warmthFactor(20)).toBeCloseTo(2, 10);
    expect(warmthFactor(42)).toBe(0);
  });
});
