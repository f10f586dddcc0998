import { beforeAll, describe, expect, it } from 'vitest';
import { catalogue, GROUPS, makeCase, MISTOLD_GROUPS, PITCHED } from './catalogue';
import { naiveLooks } from './naive';
import { pictures } from './plots';
import { summarise, tables, type Summary } from './report';
import { lookAt } from './run';
import { addCase, newScore, type Score } from './score';
import { secondFerment, sharpe } from './second-ferment';
import { Truths } from './truths';

/** Seeds of their own, and a fifth of the catalogue for each: enough to see a rule break. `npm run evaluate` has the whole of it. */
const SEEDS = [7001, 7002, 7003];
const few = (groups: readonly (readonly [string, number])[]): (readonly [string, number])[] => groups.map(([name, count]) => [name, Math.max(2, Math.round(count / 5))] as const);

let ours: Score;
let summary: Summary;
let thumb: Summary;

beforeAll(() => {
  ours = newScore();
  const naive = newScore();
  for (const seed of SEEDS) {
    for (const batch of catalogue(seed, few(GROUPS))) {
      const truths = new Truths(batch);
      addCase(ours, batch, truths, lookAt(batch, PITCHED));
      addCase(naive, batch, truths, naiveLooks(batch, PITCHED));
    }
  }
  summary = summarise(ours);
  thumb = summarise(naive);
});

describe('the calls on simulated batches', () => {
  it('never let a batch be bottled that is stuck with sugar', () => {
    expect(ours.unsafeBottleStuck).toEqual([]);
    expect(summary.stuckBatches).toBeGreaterThan(4);
  });

  it('say "ready to bottle" wrongly of far fewer batches than three equal readings do', () => {
    expect(summary.unsafeBottle).toBeLessThanOrEqual(Math.floor(0.04 * summary.batches));
    expect(thumb.unsafeBottle).toBeGreaterThan(8 * Math.max(1, summary.unsafeBottle) - 1);
  });

  it('find starts, stalls, stuck floats and batches that work again', () => {
    expect(summary.decisions.started.recall).toBeGreaterThan(0.93);
    expect(summary.decisions.stuck.recall).toBeGreaterThan(0.7);
    expect(summary.decisions.sluggish.recall).toBeGreaterThan(0.7);
    expect(summary.decisions['sensor frozen'].recall).toBeGreaterThan(0.6);
    expect(summary.decisions['sensor drifting'].falsePerMonth).toBeLessThan(0.06);
    expect(summary.decisions['working again'].recall).toBeGreaterThan(0.6);
  });

  it('find the peak, the swap, the end, and the days of racking and bottling', () => {
    const least = { 'past peak': 0.9, 'airlock ok': 0.88, terminal: 0.86, 'ready to rack': 0.84, 'ready to bottle': 0.84 } as const;
    for (const decision of Object.keys(least) as (keyof typeof least)[]) expect(summary.decisions[decision].recall, decision).toBeGreaterThan(least[decision]);
    expect(summary.decisions['ready to rack'].delayMedian).toBeLessThan(20);
    expect(summary.rackDateMae).toBeLessThan(1.3);
    expect(summary.forecasts['50']!.dateMedian).toBeLessThan(1.8);
    expect(summary.forecasts['75']!.dateMedian).toBeLessThan(1.1);
  });

  it('cry wolf seldom', () => {
    expect(summary.decisions['ready to bottle'].falsePerMonth).toBeLessThan(0.07);
    expect(summary.decisions['past peak'].falsePerMonth).toBeLessThan(0.12);
    expect(summary.decisions['ready to rack'].falsePerMonth).toBeLessThan(0.18);
    expect(summary.decisions.stuck.falsePerMonth).toBeLessThan(0.15);
    expect(summary.decisions.sluggish.falsePerMonth).toBeLessThan(0.08);
    expect(summary.decisions['sensor frozen'].falsePerMonth).toBeLessThan(0.06);
  });

  it('hold their intervals of the final gravity about as often as they say', () => {
    for (const share of ['25', '50', '75']) {
      const forecast = summary.forecasts[share]!;
      expect(forecast.in80).toBeGreaterThan(0.65);
      expect(forecast.in95).toBeGreaterThan(0.88);
    }
  });

  it('tell most people a date when a quarter of the time has passed, and hold its interval', () => {
    const forecast = summary.forecasts['25']!;
    expect(forecast.dated).toBeGreaterThan(0.7);
    expect(forecast.dateIn80).toBeGreaterThan(0.75);
  });

  it('come through with what people tell wrongly', () => {
    const mistold = newScore();
    for (const batch of catalogue(SEEDS[0]!, few(MISTOLD_GROUPS))) addCase(mistold, batch, new Truths(batch), lookAt(batch, PITCHED));
    expect(mistold.unsafeBottleStuck).toEqual([]);
    expect(summarise(mistold).decisions.started.recall).toBeGreaterThan(0.9);
  });

  it('hold on ferments of another make, which slow down for longer', () => {
    const second = newScore();
    const naive = newScore();
    for (const seed of SEEDS) {
      for (const batch of catalogue(seed, few(GROUPS), secondFerment)) {
        const truths = new Truths(batch);
        addCase(second, batch, truths, lookAt(batch, PITCHED));
        addCase(naive, batch, truths, naiveLooks(batch, PITCHED));
      }
    }
    expect(second.unsafeBottleStuck).toEqual([]);
    const { decisions, unsafeBottle, batches } = summarise(second);
    // Twice the goal: a fifth of the catalogue has more than its share of slow ends, and no more than a hundred batches.
    expect(unsafeBottle).toBeLessThanOrEqual(0.08 * batches);
    expect(naive.unsafeBottle.length).toBeGreaterThan(5 * unsafeBottle);
    for (const [decision, recall] of [['started', 0.93], ['past peak', 0.9], ['terminal', 0.85], ['ready to bottle', 0.84]] as const) expect(decisions[decision].recall, decision).toBeGreaterThan(recall);
  });

  it('can be shown as a table and as pictures', () => {
    expect(tables(summary, thumb)).toContain('ready to bottle');
    for (const { svg } of pictures(ours)) expect(svg).toMatch(/^<svg[\s\S]*<\/svg>$/);
  });
});

describe('the catalogue', () => {
  it('is the same for the same seed and another for another', () => {
    const [one] = [...catalogue(5, [['healthy beer', 1]])];
    const [same] = [...catalogue(5, [['healthy beer', 1]])];
    const [other] = [...catalogue(6, [['healthy beer', 1]])];
    expect(same!.readings).toEqual(one!.readings);
    expect(other!.readings[0]!.gravity).not.toBe(one!.readings[0]!.gravity);
  });

  it('has two makes of ferment, of which the second has the slower end', () => {
    const cold = { coldest: 10, hottest: 39 };
    expect(sharpe(20, cold)).toBeCloseTo(1, 9);
    expect(sharpe(8, cold)).toBeLessThan(0.02);
    expect(sharpe(28, cold)).toBeGreaterThan(1.5);
    const share = (simulate?: typeof secondFerment): number => {
      const { truth, finals } = makeCase('healthy mead', 1, 5, simulate);
      const left = Array.from(truth.gravity, (points) => points - finals[0]!.points);
      const at = (points: number): number => left.findIndex((one) => one <= points);
      return (at(0.5) - at(2)) / at(2);
    };
    expect(share(secondFerment)).toBeGreaterThan(1.3 * share());
  });

  it('holds for stuck what ends by itself with much sugar left, and for ended what has eaten it', () => {
    const tired = makeCase('slow tail', 0, 12);
    expect(tired.finals[0]!.points).toBeLessThan(tired.truth.gravity.at(-1)! - 30);
    const truths = new Truths(tired);
    expect(truths.moments('stuck')).toHaveLength(1);
    expect(truths.moments('ready to bottle')).toEqual([]);
    const ended = makeCase('healthy beer', 0, 12);
    expect(ended.finals[0]!.points).toBe(ended.truth.gravity.at(-1));
  });
});
