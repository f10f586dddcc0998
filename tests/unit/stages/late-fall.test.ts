import { describe, expect, it } from 'vitest';
import { chanceOf, LATE_IN_BOTTLE, LATE_WHEN_FINISHED, logOddsOfLateFall, type RestFigures } from '../../../lib/core/stages/late-fall';

/** Rests a little below the top of its end, and has for a third of its age. */
const rests: RestFigures = { most: 1, likely: 0.4, spread: 2, belowTop: 3, since2: 0.3, since8: 0.5 };

it('of two points is smaller than that of one', () => {
  expect(logOddsOfLateFall(LATE_WHEN_FINISHED, rests)).toBeLessThan(logOddsOfLateFall(LATE_IN_BOTTLE, rests));
});

describe.each([LATE_IN_BOTTLE, LATE_WHEN_FINISHED])('the chance that more than $points point(s) are still to come', (fall) => {
  const chance = (other: Partial<RestFigures> = {}): number => chanceOf(logOddsOfLateFall(fall, { ...rests, ...other }));

  it('is even at even odds, and nothing or all at the ends', () => {
    expect(chanceOf(0)).toBe(0.5);
    expect(chanceOf(-40)).toBeCloseTo(0, 12);
    expect(chanceOf(40)).toBeCloseTo(1, 12);
    expect(chanceOf(Math.log(0.1 / 0.9))).toBeCloseTo(0.1, 12);
  });

  it('rises with what may still come, with the doubt about the yeast, and where the last eight points took long', () => {
    expect(chance({ most: 2 })).toBeGreaterThan(chance());
    expect(chance({ likely: 0.8 })).toBeGreaterThan(chance());
    expect(chance({ spread: 3 })).toBeGreaterThan(chance());
    expect(chance({ since8: 0.9 })).toBeGreaterThan(chance());
  });

  it('sinks with the points below the top of the end and with the time at rest', () => {
    expect(chance({ belowTop: 6 })).toBeLessThan(chance());
    expect(chance({ since2: 0.45 })).toBeLessThan(chance());
  });

  it('goes by proportions: twice the points change the odds by the same factor, from wherever they stood', () => {
    const by = (a: Partial<RestFigures>, b: Partial<RestFigures>) => logOddsOfLateFall(fall, { ...rests, ...b }) - logOddsOfLateFall(fall, { ...rests, ...a });
    expect(by({ most: 1 }, { most: 2 })).toBeCloseTo(by({ most: 0.5 }, { most: 1 }), 12);
    expect(by({ since2: 0.2 }, { since2: 0.4 })).toBeCloseTo(by({ since2: 0.4 }, { since2: 0.8 }), 12);
    expect(by({ belowTop: 1 }, { belowTop: 2 })).toBeCloseTo(by({ belowTop: 7 }, { belowTop: 8 }), 12);
  });

  it('stays where it is beyond the figures that were ever weighed, and is a number for any of them', () => {
    expect(chance({ most: -3 })).toBe(chance({ most: 0.1 }));
    expect(chance({ likely: 0 })).toBe(chance({ likely: 0.02 }));
    expect(chance({ since2: 0, since8: 0 })).toBe(chance({ since2: 0.02, since8: 0.02 }));
    expect(chance({ belowTop: 300 })).toBe(chance({ belowTop: 20 }));
    expect(chance({ belowTop: -300 })).toBe(chance({ belowTop: -4 }));
  });
});
