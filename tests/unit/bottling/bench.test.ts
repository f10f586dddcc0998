import fc from 'fast-check';
import { describe, expect, expectTypeOf, test } from 'vitest';
import type { BenchOverridden, BenchRequest, BenchSafe, BenchStop } from '@/lib/core/bottling/bench';
import { BOTTLES, holds, howOfHolds } from '@/lib/core/bottling/bottles';
import { drinkPressure } from '@/lib/core/bottling/co2';
import { pressureByDay } from '@/lib/core/bottling/conditioning';
import { DROPS, gasFromSugar, primingSugar, USUAL_DROP_G, usualDrops } from '@/lib/core/bottling/priming';
import { judgeBench, overrideStop } from '@/lib/core/bottling/verdict';
import { benchRequest, bottle, DAY, NOW } from '../../support/bench';

const stopped = (request: BenchRequest): BenchStop => {
  const verdict = judgeBench(request);
  if (verdict.verdict !== 'stop') throw new Error(`expected a stop, got ${verdict.verdict}`);
  return verdict;
};
const safe = (request: BenchRequest): BenchSafe => {
  const verdict = judgeBench(request);
  if (verdict.verdict !== 'safe') throw new Error(`expected safe, got: ${verdict.problems.map((p) => p.sentence).join(' ')}`);
  return verdict;
};
const kinds = (stop: BenchStop) => stop.problems.map((p) => p.kind);
const twice = (gravity: number) => ({ hydrometer: [{ at: NOW - 8 * DAY, gravity }, { at: NOW, gravity }] });

/** Every property name anywhere in a value. */
function names(value: unknown): string[] {
  if (value === null || typeof value !== 'object') return [];
  return Object.entries(value).flatMap(([key, inner]) => [key, ...names(inner)]);
}

describe('a finished batch in sound bottles', () => {
  test('gets its dose, rounded down, and the pressure three ways, rounded up', () => {
    const verdict = safe(benchRequest());
    expect(verdict.plan).toMatchObject({ bottles: 8, bottledL: 4, lostL: 0.2 });
    if (verdict.dose.way !== 'weighed') throw new Error('weighed sugar expected');
    const [picture] = verdict.bottles;
    expect(picture?.volumes.value.hi).toBeLessThanOrEqual(2.4);
    expect(picture?.volumes.value.hi).toBeGreaterThan(2.35);
    // (2.4 − 0.92) × 3.844 = 5.7 g/L.
    expect(verdict.dose.gPerL).toBeGreaterThan(5.4);
    expect(verdict.dose.gPerL).toBeLessThan(5.9);
    expect(verdict.dose.totalG).toBe(Math.floor(verdict.dose.gPerL * 4));
    expect(picture?.cellar.bar).toBeLessThan(picture?.warm.bar ?? 0);
    expect(picture?.warm.bar).toBeLessThan(picture?.worst.bar ?? 0);
    expect(verdict.sentence).toContain('rated for 4.0');
  });

  test('every figure of the picture answers how', () => {
    const { bottles, residual, remaining } = safe(benchRequest());
    for (const origin of [residual.how, remaining.how, ...bottles.flatMap((b) => [b.volumes.how, b.worstVolumes.how, b.cellar.how, b.warm.how, b.worst.how, howOfHolds(b.choice)])]) {
      expect(origin.formula.length).toBeGreaterThan(5);
      expect(origin.source.length).toBeGreaterThan(5);
      expect(origin.inputs.length).toBeGreaterThan(0);
    }
  });

  test('the weeks end at the worst case of the table, with what the sugar adds to the strength', () => {
    const request = benchRequest();
    const { bottles, residual, remaining } = safe(request);
    const [picture] = bottles;
    if (!picture) throw new Error('a bottle expected');
    expect(picture.asBottled.abvPercent).toBeGreaterThan(request.drink.abvPercent);
    const weeks = pressureByDay({ residualVolumes: residual.value.hi, addedVolumes: picture.volumes.value.hi - residual.value.hi, remainingPoints: remaining.value.hi, drink: picture.asBottled }, NOW, request.warmestStoreC, 3000);
    expect(weeks.at(-1)?.worstBar).toBeLessThanOrEqual(picture.worst.bar + 1e-9);
    expect(weeks.at(-1)?.worstBar).toBeGreaterThan(picture.worst.bar - 0.1 - 1e-6);
  });

  test('the worst case is the sugar left at 0.51 volumes a point on top of what was asked', () => {
    const [picture] = safe(benchRequest()).bottles;
    const remaining = 0.5;
    expect(picture?.worstVolumes.value).toBeCloseTo(Math.ceil(10 * ((picture?.volumes.value.hi ?? 0) + 0.51 * remaining)) / 10, 9);
  });
});

describe('stops', () => {
  test('no stop has a dose: not in its type, not anywhere in its value', () => {
    expectTypeOf<BenchStop>().not.toHaveProperty('dose');
    expectTypeOf<BenchSafe>().toHaveProperty('dose');
    expectTypeOf<BenchOverridden>().toHaveProperty('dose');
    const stop = stopped(benchRequest({}, twice(1.012)));
    expect(names(stop)).not.toEqual(expect.arrayContaining(['dose']));
    for (const name of ['gPerL', 'totalG', 'totalDrops', 'abvAddedPercent']) expect(names(stop)).not.toContain(name);
  });

  test('a batch that stopped high without a reason is not primed', () => {
    const stop = stopped(benchRequest({}, twice(1.012)));
    expect(kinds(stop)).toContain('stopped_high');
    expect(stop.headline).toContain('stopped high');
  });

  test('nor one nobody has read twice, nor one never read', () => {
    expect(kinds(stopped(benchRequest({}, { hydrometer: [{ at: NOW, gravity: 1 }] })))).toContain('not_done');
    const unread = stopped(benchRequest({}, { hydrometer: [] }));
    expect(kinds(unread)).toEqual(expect.arrayContaining(['not_done', 'over_rating_at_worst']));
  });

  test('bottles that hold it as asked but not at worst are stopped', () => {
    const stop = stopped(benchRequest({}, { ...twice(1.003), expectedFinal: { lo: 0.998, value: 1.0, hi: 1.003 } }));
    expect(kinds(stop)).toEqual(['over_rating_at_worst']);
    expect(stop.sentence).toContain('If the last sugar ferments');
  });

  test('still-wine glass never stands under pressure, and nobody can override it', () => {
    const request = benchRequest({ bottles: [bottle('still_wine', 'plain_cork', 750, null)] });
    expect(stopped(request).problems).toMatchObject([{ kind: 'never_under_pressure', overridable: false }]);
    expect(overrideStop(request, { reason: 'I have always done it like this and it went well', by: 'Oriel', at: NOW })).toMatchObject({ verdict: 'refused', why: 'never' });
  });

  test('a maker’s figure does not turn still-wine glass into pressure glass, nor lift a closure’s limit', () => {
    expect(holds(bottle('still_wine', 'plain_cork', 750, 8).choice).rating).toBe('never');
    expect(holds(bottle('sparkling_wine', 'wired_stopper', 750, 12).choice).rating).toBe(8);
    expect(holds(bottle('beer', 'screw_cap', 500, 4).choice).rating).toBe('never');
  });

  test('a rating nobody confirmed is not relied on', () => {
    const stop = stopped(benchRequest({ bottles: [bottle('sparkling_wine', 'wired_stopper', 750, null)] }));
    expect(kinds(stop)).toEqual(['rating_not_confirmed']);
    expect(stop.ways.map((w) => w.kind)).toContain('confirm_rating');
  });

  test('sugar does not go into a stabilised drink', () => {
    expect(kinds(stopped(benchRequest({}, { stabilised: true })))).toContain('stabilised_and_primed');
  });

  test('a sweet mead at its tolerance is done, and still no glass takes it primed', () => {
    const stop = stopped(
      benchRequest({ bottles: [bottle('sparkling_wine', 'wired_stopper', 750, 8)] }, { kind: 'mead', originalGravity: 1.11, toleranceAbv: 12, expectedFinal: { lo: 1.018, value: 1.022, hi: 1.026 }, ...twice(1.02) }),
    );
    expect(kinds(stop)).toContain('over_rating_at_worst');
    expect(stop.ways.map((w) => w.kind)).toContain('stabilise_still');
  });

  test('a bottle is stopped by the pressure as shown: rounded up, against the rating rounded down', () => {
    const { bottles } = safe(benchRequest());
    const worst = bottles[0]?.worst.bar ?? 0;
    expect(judgeBench(benchRequest({ bottles: [bottle('beer', 'crown_26', 500, worst)] })).verdict).toBe('safe');
    expect(judgeBench(benchRequest({ bottles: [bottle('beer', 'crown_26', 500, worst - 0.01)] })).verdict).toBe('stop');
  });

  test('nothing to fill is told, not reckoned', () => {
    expect(kinds(stopped(benchRequest({ volumeL: 0.3 })))).toEqual(['nothing_to_fill']);
  });
});

describe('still drink', () => {
  const still = { priming: { way: 'none' }, bottles: [bottle('still_wine', 'plain_cork', 750, null)] } as const;

  test('a finished dry drink goes into still-wine glass', () => {
    expect(safe(benchRequest(still)).dose).toEqual({ way: 'none' });
  });

  test('not with points of sugar that may still ferment', () => {
    const stop = stopped(benchRequest(still, { ...twice(1.003), expectedFinal: { lo: 0.998, value: 1.0, hi: 1.003 } }));
    expect(kinds(stop)).toEqual(['never_under_pressure']);
  });

  test('a stabilised sweet one may', () => {
    expect(judgeBench(benchRequest(still, { ...twice(1.012), stabilised: true })).verdict).toBe('safe');
  });
});

describe('ways out', () => {
  const request = benchRequest({}, { ...twice(1.003), expectedFinal: { lo: 0.998, value: 1.0, hi: 1.003 } });

  test('each is itself safe by the same judgement, and tells its own worst case', () => {
    const { ways } = stopped(request);
    expect(ways.map((w) => w.kind)).toEqual(expect.arrayContaining(['other_bottles', 'wait', 'stabilise_still', 'keg']));
    for (const way of ways) {
      expect(way.worstBar).toBeLessThanOrEqual(way.rated === 'never' ? 1 : way.rated);
      if (way.request && way.kind !== 'other_bottles') expect(judgeBench(way.request).verdict).toBe('safe');
    }
  });

  test('other bottles are offered without a rating: the person confirms it first', () => {
    const other = stopped(request).ways.find((w) => w.kind === 'other_bottles');
    if (!other?.request) throw new Error('other bottles expected');
    expect(kinds(stopped(other.request))).toContain('rating_not_confirmed');
    const asSaid = Number(/at (\d+\.\d) bar/.exec(other.sentence)?.[1]);
    const confirm = (bar: number) => ({ ...other.request, bottles: other.request?.bottles.map((b) => ({ ...b, choice: { ...b.choice, confirmedBar: bar } })) ?? [] }) as BenchRequest;
    expect(judgeBench(confirm(asSaid)).verdict).toBe('safe');
    expect(judgeBench(confirm(asSaid - 0.1)).verdict).toBe('stop');
  });

  test('waiting names the gravity at which these bottles will do, and they do there', () => {
    const wait = stopped(request).ways.find((w) => w.kind === 'wait');
    const target = Number(/\d\.\d{3}/.exec(wait?.title ?? '')?.[0]);
    expect(target).toBeLessThan(1.003);
    const then = benchRequest({}, { ...twice(target), expectedFinal: { lo: 0.998, value: 1.0, hi: 1.003 } });
    expect(judgeBench(then).verdict).toBe('safe');
  });

  test('where the bottles bear no point on top of what is asked, waiting comes with less sugar then, or none', () => {
    const working = { hydrometer: [{ at: NOW - 6 * DAY, gravity: 1.009 }, { at: NOW - DAY, gravity: 1.005 }] };
    const beer = (wanted: number, rating: number) => stopped(benchRequest({ bottles: [bottle('beer', 'crown_26', 500, rating)], priming: { way: 'weighed', sugar: primingSugar('sucrose'), wantedVolumes: wanted } }, working));
    expect(beer(2.4, 3).ways.find((w) => w.kind === 'wait')?.sentence).toMatch(/Then with less sugar: prime to [12]\.\d volumes/);
    expect(beer(2.4, 1.2).ways.find((w) => w.kind === 'wait')?.sentence).toMatch(/Then still/);
  });

  test('a figure nobody has confirmed hides no way out; it says that the figure is still to be confirmed, and the bench goes on asking', () => {
    const stop = stopped(benchRequest({ bottles: [bottle('beer', 'crown_26', 500, null)], priming: { way: 'weighed', sugar: primingSugar('sucrose'), wantedVolumes: 3.5 } }));
    const less = stop.ways.find((w) => w.kind === 'less_sugar');
    expect(less?.sentence).toContain('Confirm the maker’s figure first');
    expect(kinds(stopped(less!.request!))).toEqual(['rating_not_confirmed']);
  });

  test('less sugar is found where it is enough', () => {
    const sparkling = benchRequest({ priming: { way: 'weighed', sugar: primingSugar('sucrose'), wantedVolumes: 3.5 } });
    const less = stopped(sparkling).ways.find((w) => w.kind === 'less_sugar');
    if (less?.request?.priming.way !== 'weighed') throw new Error('less sugar expected');
    expect(judgeBench(less.request).verdict).toBe('safe');
    const more = { ...less.request, priming: { ...less.request.priming, wantedVolumes: less.request.priming.wantedVolumes + 0.1 } };
    expect(judgeBench(more).verdict).toBe('stop');
  });

  test('a working batch is never offered stabilising: it does not stop a working yeast', () => {
    const working = benchRequest({}, { hydrometer: [{ at: NOW - 8 * DAY, gravity: 1.02 }, { at: NOW, gravity: 1.012 }] });
    expect(stopped(working).ways.map((w) => w.kind)).not.toContain('stabilise_still');
  });

  test('an unfinished batch may go into a keg unprimed, never primed', () => {
    const keg = { bottles: [bottle('keg', 'keg_lid', 4000, 6)] };
    const unfinished = { hydrometer: [{ at: NOW, gravity: 1.001 }] };
    expect(judgeBench(benchRequest({ ...keg, priming: { way: 'none' } }, unfinished)).verdict).toBe('safe');
    expect(kinds(stopped(benchRequest(keg, unfinished)))).toContain('not_done');
  });
});

describe('drops', () => {
  test('one for 250 ml, three for 750 ml', () => {
    expect([250, 330, 500, 750].map((ml) => usualDrops(ml / 1000))).toEqual([1, 1, 2, 3]);
  });

  test('are reckoned at the heaviest a drop may be, and fewer are offered', () => {
    const beer = bottle('beer', 'crown_26', 500, 4);
    const request = benchRequest({ bottles: [beer], priming: { way: 'drops', gramsEach: USUAL_DROP_G, drops: { [beer.key]: 3 } } });
    const stop = stopped(request);
    const added = gasFromSugar(DROPS, { lo: 12, value: 15, hi: 18 });
    expect(stop.bottles[0]?.volumes.value.hi).toBeCloseTo(stop.residual.value.hi + added.hi, 9);
    const fewer = stop.ways.find((w) => w.kind === 'fewer_drops');
    if (fewer?.request?.priming.way !== 'drops') throw new Error('fewer drops expected');
    expect(fewer.request.priming.drops[beer.key]).toBeLessThan(3);
    expect(judgeBench(fewer.request).verdict).toBe('safe');
  });
});

describe('override', () => {
  const request = benchRequest({}, { ...twice(1.003), expectedFinal: { lo: 0.998, value: 1.0, hi: 1.003 } });
  const reason = 'Forced sample stood at 1.003 for ten days at 25 °C';

  test('a written reason gives the dose and keeps problems, reason, name and worst case', () => {
    const stop = stopped(request);
    const overridden = overrideStop(request, { reason: ` ${reason} `, by: 'Oriel', at: NOW });
    expect(overridden).toMatchObject({ verdict: 'overridden', reason, by: 'Oriel', at: NOW, problems: stop.problems, worstBar: stop.bottles[0]?.worst.bar, dose: { way: 'weighed' } });
  });

  test.each(['', '   ', 'ok', '.........................', 'because'])('"%s" is not a reason', (words) => {
    expect(overrideStop(request, { reason: words, by: 'Oriel', at: NOW })).toMatchObject({ verdict: 'refused', why: 'reason_too_short' });
  });

  test('what is safe needs none', () => {
    expect(overrideStop(benchRequest(), { reason, by: 'Oriel', at: NOW })).toMatchObject({ verdict: 'refused', why: 'nothing_to_override' });
  });
});

describe('whatever is asked', () => {
  const anyRequest = fc
    .record({
      gravity: fc.double({ min: 0.99, max: 1.03, noNaN: true }),
      og: fc.double({ min: 1.03, max: 1.11, noNaN: true }),
      wanted: fc.double({ min: 0, max: 6, noNaN: true }),
      warmest: fc.double({ min: 2, max: 35, noNaN: true }),
      since: fc.double({ min: 0, max: 30, noNaN: true }),
      rating: fc.option(fc.double({ min: 0.5, max: 9, noNaN: true })),
      kind: fc.constantFrom('beer', 'swing_top', 'sparkling_wine', 'still_wine', 'pet') as fc.Arbitrary<'beer' | 'swing_top' | 'sparkling_wine' | 'still_wine' | 'pet'>,
      readings: fc.boolean(),
    })
    .map((r) => {
      const closure = BOTTLES[r.kind].closures[0] ?? 'crown_26';
      return benchRequest(
        {
          bottles: [bottle(r.kind, closure, 500, r.rating)],
          warmestStoreC: r.warmest,
          warmestSinceEndC: r.since,
          priming: { way: 'weighed', sugar: primingSugar('sucrose'), wantedVolumes: r.wanted },
        },
        { originalGravity: r.og, hydrometer: r.readings ? twice(r.gravity).hydrometer : [{ at: NOW, gravity: r.gravity }] },
      );
    });

  test('a still drink too is held against a bottle that is said to hold less than still drink may reach', () => {
    const request = benchRequest(
      { bottles: [bottle('beer', 'crown_26', 500, 0.5)], warmestStoreC: 5, warmestSinceEndC: 0, priming: { way: 'weighed', sugar: primingSugar('sucrose'), wantedVolumes: 0 } },
      { originalGravity: 1.035, hydrometer: twice(0.99).hydrometer },
    );
    const verdict = judgeBench(request);
    expect(verdict.bottles[0]!.worst.bar).toBeGreaterThan(0.5);
    expect(verdict.bottles[0]!.worst.bar).toBeLessThan(1);
    expect(verdict.verdict).toBe('stop');
  });

  test('a stop never shows a dose, and safe always means: done, and at worst within what the bottle holds', () => {
    fc.assert(
      fc.property(anyRequest, (request) => {
        const verdict = judgeBench(request);
        if (verdict.verdict === 'stop') {
          expect(verdict.problems.length).toBeGreaterThan(0);
          for (const name of ['dose', 'gPerL', 'totalG']) expect(names(verdict)).not.toContain(name);
          return;
        }
        expect(request.done.verdict).toBe('done');
        for (const { worst, holds: held } of verdict.bottles) {
          if (held.rating === 'never') expect(verdict.dose.way).not.toBe('drops');
          expect(worst.bar).toBeLessThanOrEqual(held.rating === 'never' ? 1 : held.rating + 1e-9);
        }
      }),
      { numRuns: 150 },
    );
  });

  test('the worst case of a bottle rises with the warmest place, with the sugar that goes in and with the points that are left', () => {
    const value = (min: number, max: number) => fc.double({ min, max, noNaN: true });
    const worst = (celsius: number, grams: number, left: number) => {
      const key = 'sparkling_wine-750';
      const drops = { way: 'drops', gramsEach: { lo: grams, value: grams, hi: grams }, drops: { [key]: 2 } } as const;
      const request = benchRequest({ bottles: [bottle('sparkling_wine', 'wired_stopper', 750, 6)], warmestStoreC: celsius, priming: drops }, { ...twice(1.001 + left / 1000), expectedFinal: { lo: 1.0, value: 1.001, hi: 1.004 } });
      return judgeBench(request).bottles[0]!.worst.bar;
    };
    fc.assert(
      fc.property(value(12, 34), value(0.5, 4), value(0, 2), (celsius, grams, left) => {
        const base = worst(celsius, grams, left);
        // Two degrees, a gram and a point each press by more than the 0.1 bar that pressures are rounded up to.
        expect(worst(celsius + 2, grams, left)).toBeGreaterThanOrEqual(base);
        expect(worst(celsius, grams + 1, left)).toBeGreaterThan(base);
        expect(worst(celsius, grams, left + 1)).toBeGreaterThan(base);
      }),
      { numRuns: 40 },
    );
  });

  test('pressure rises with temperature, with gas, with alcohol and with sugar', () => {
    const value = (min: number, max: number) => fc.double({ min, max, noNaN: true });
    fc.assert(
      fc.property(value(0.3, 6), value(0, 38), value(0, 16), value(0, 150), (volumes, t, abv, sugar) => {
        const base = drinkPressure(volumes, t, { abvPercent: abv, sugarGPerL: sugar }).gaugeBar;
        expect(drinkPressure(volumes, t + 1, { abvPercent: abv, sugarGPerL: sugar }).gaugeBar).toBeGreaterThan(base);
        expect(drinkPressure(volumes + 0.1, t, { abvPercent: abv, sugarGPerL: sugar }).gaugeBar).toBeGreaterThan(base);
        expect(drinkPressure(volumes, t, { abvPercent: abv + 1, sugarGPerL: sugar }).gaugeBar).toBeGreaterThanOrEqual(base);
        expect(drinkPressure(volumes, t, { abvPercent: abv, sugarGPerL: sugar + 10 }).gaugeBar).toBeGreaterThanOrEqual(base);
      }),
      { numRuns: 60 },
    );
  });
});
