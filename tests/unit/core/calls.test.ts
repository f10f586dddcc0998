import { describe, expect, it } from 'vitest';
import { assess, assessEvery } from '../../../lib/core/assess';
import { modelGravity } from '../../../lib/core/fit/models';
import type { BatchEvent, BatchSetup, CallName, Reading } from '../../../lib/core/types';
import { Random } from '../../evaluation/random';

const PITCH = Date.UTC(2026, 1, 20, 18);
const DAY = 86_400_000;

const setup: BatchSetup = {
  kind: 'cider',
  pitchedAt: PITCH,
  originalGravity: 1.055,
  volumeL: 4.5,
  vesselL: 5,
  attenuation: { min: 0.95, max: 1.05 },
  alcoholToleranceAbv: 14,
  temperature: { minC: 15, maxC: 22 },
  neck: 'blow_off',
  events: [],
  timeZone: 'UTC',
};

/** A float's record of a gravity curve, every 30 min. */
function record(days: number, points: (day: number) => number, celsius: (day: number) => number = () => 19, noise = 0.4): Reading[] {
  const random = new Random(3, 'calls');
  const readings: Reading[] = [];
  for (let day = 0; day <= days; day += 1 / 48) {
    readings.push({ at: PITCH + Math.round(day * DAY), gravity: 1 + (points(day) + random.normal(0, noise)) / 1000, temperature: celsius(day) + random.normal(0, 0.1) });
  }
  return readings;
}

const cider = (day: number): number => modelGravity('kinetic', [55, -1, -1, 0.2, -1.2, -1], day);
const at = (day: number, readings: Reading[], extra: Partial<BatchSetup> = {}) => assess({ ...setup, ...extra }, readings, PITCH + day * DAY).assessment;

describe('the calls', () => {
  it('say that it has started once it falls, and since when', () => {
    const { started } = at(3, record(3, cider)).calls;
    expect(started.verdict).toBe('yes');
    expect(started.since).toBeGreaterThan(PITCH);
  });

  it('do not say of what nobody has read that it has not begun', () => {
    const { bottle, rack, stalled } = at(7, [], { neck: 'airlock' }).calls;
    for (const { verdict, headline, reason } of [bottle, rack, stalled]) {
      expect(verdict).toBe('unknown');
      expect(`${headline} ${reason}`).not.toMatch(/not started|still to come\.$/i);
    }
    expect(at(1, record(1, () => 55)).calls.bottle).toMatchObject({ verdict: 'no', headline: 'Not yet: it has not started.' });
  });

  it('say that a start is overdue after three days of nothing', () => {
    const { started } = at(4, record(4, () => 55)).calls;
    expect(started).toMatchObject({ verdict: 'hold', kind: 'overdue' });
  });

  it('keep the tube on while the gas is strong, then ask for the airlock, then see that it is on', () => {
    const readings = record(14, cider);
    expect(at(2, readings).calls.neck.verdict).toBe('hold');
    const later = at(13, readings).calls.neck;
    expect(later.verdict).toBe('yes');
    expect(later.headline).toMatch(/^Swap tube for airlock: from /);
    const swapped = at(13, readings, { events: [{ at: PITCH + 12 * DAY, kind: 'neck', neck: 'airlock' }] }).calls.neck;
    expect(swapped).toMatchObject({ verdict: 'no', headline: 'Airlock is on already.' });
  });

  it('want a bung out of a vessel that works, by float or by hand, and leave it where nothing comes any more', () => {
    const bung = (days: number): BatchEvent => ({ at: PITCH + days * DAY, kind: 'neck', neck: 'bung' });
    const works = at(4, record(4, cider), { events: [bung(3.5)] }).calls.neck;
    expect(works).toMatchObject({ verdict: 'hold', kind: 'closed', headline: 'Take the bung out: it still works.', since: PITCH + 3.5 * DAY });
    expect(works.act).toMatch(/away from faces/);
    expect(at(40, record(40, cider), { events: [bung(39)] }).calls.neck).toMatchObject({ verdict: 'no', headline: 'Bung is in already.', act: null });
    // Gone silent, nobody knows that it is over.
    expect(at(6, record(4, cider), { events: [bung(5)] }).calls.neck).toMatchObject({ verdict: 'no', act: expect.stringMatching(/^Never stop a vessel/) });
    const read = (day: number): BatchEvent => ({ kind: 'reading', at: PITCH + day * DAY, gravity: 1 + cider(day) / 1000 });
    expect(at(4.2, [], { events: [read(2), read(4), bung(4.1)] }).calls.neck).toMatchObject({ verdict: 'hold', kind: 'closed' });
    expect(at(20, [], { events: [read(2), read(4), bung(4.1)] }).calls.neck).toMatchObject({ verdict: 'no', act: expect.stringMatching(/^Never stop a vessel/) });
    expect(at(4, record(4, cider), { events: [{ at: PITCH + 3.5 * DAY, kind: 'neck', neck: 'airlock' }] }).calls.neck.kind).toBeNull();
  });

  it('see that the peak is over, and ask for the airlock, though the float was silent or stuck meanwhile', () => {
    let over = 0;
    for (let day = 0; day < 12; day += 0.25) if (cider(day) - cider(day + 0.25) > cider(over) - cider(over + 0.25)) over = day;
    const readings = record(over + 6, cider);
    const gap = readings.filter(({ at: when }) => when < PITCH + (over + 1) * DAY);
    expect(at(over + 4, gap).stage).toBe('slowing');
    const stuck = readings.map((reading) => (reading.at > PITCH + (over + 2) * DAY ? { ...reading, gravity: 1 + (cider(over + 2) + 0.01 * Math.sin(reading.at)) / 1000 } : reading));
    const { sensor, neck } = at(over + 6, stuck, { vesselL: 6 }).calls;
    expect(sensor.kind).toBe('frozen');
    expect(neck.verdict).toBe('yes');
    expect(at(over + 2.5, stuck, { vesselL: 4.6 }).calls.neck.verdict).not.toBe('yes');
  });

  it('let it be racked by what the float gave before it fell silent, once little is left even at half the pace, and ask for a reading first', () => {
    const { rack, bottle } = at(9, record(4, cider)).calls;
    expect(rack).toMatchObject({ verdict: 'yes', reason: 'By what the sensor gave before it fell silent.' });
    expect(rack.act).toMatch(/^Read by hand first/);
    expect(bottle.verdict).toBe('unknown');
    expect(at(5, record(4, cider)).calls.rack.verdict).toBe('unknown');
    // Silent before it had begun, nobody knows what came of it.
    expect(at(12, record(1, cider)).calls.rack.verdict).not.toBe('yes');
    expect(at(12, record(6, (day) => Math.max(25, cider(day)))).calls.rack.verdict).not.toBe('yes');
  });

  it('take it for finished by its curve while the float is stuck, give no date for what nobody saw, and take that back when the float works again and stands high', () => {
    const stuck = record(25, cider).map((reading) => {
      const day = (reading.at - PITCH) / DAY;
      return day > 7 && day < 20 ? { ...reading, gravity: 1 + cider(7) / 1000 } : reading;
    });
    expect(at(6.9, stuck).stage).toBe('slowing');
    const blind = at(12, stuck);
    expect(blind).toMatchObject({ stage: 'terminal', terminalAt: null });
    expect(blind.calls).toMatchObject({ sensor: { kind: 'frozen' }, bottle: { verdict: 'unknown' } });
    expect(at(20.5, stuck).stage).toBe('terminal');
    const high = stuck.map((reading) => (reading.at >= PITCH + 20 * DAY ? { ...reading, gravity: reading.gravity + 0.012 } : reading));
    expect(at(22, high).stage).toBe('slowing');
    // Two fifths of the fall were still to come when it was last seen, and not a day has gone by.
    expect(at(4, record(3.2, cider)).stage).not.toBe('terminal');
  });

  it('see the peak of a late start within two days of it', () => {
    const late = (day: number): number => cider(Math.max(0, day - 5));
    let over = 5;
    for (let day = 5; day < 15; day += 0.25) if (late(day) - late(day + 0.25) > late(over) - late(over + 0.25)) over = day;
    expect(at(over + 2, record(over + 2, late)).stage).toBe('slowing');
  });

  it('say that it is slow when it falls by a point a day with much to come', () => {
    let slow = 0;
    while (cider(slow) > 24) slow += 0.25;
    const crawling = (day: number): number => (day < slow ? cider(day) : 24 - (day - slow));
    expect(at(slow + 6, record(slow + 6, crawling)).calls.stalled).toMatchObject({ verdict: 'yes', kind: 'sluggish' });
    expect(at(slow - 1, record(slow + 6, crawling)).calls.stalled.verdict).toBe('no');
  });

  it('do not call it finished or ready to rack while sugar that went in at rest lies still', () => {
    const events: BatchEvent[] = [{ at: PITCH + 30 * DAY, kind: 'addition', sugarG: 60 }];
    const sweet = (day: number): number => (day < 30 ? cider(day) : cider(day) + 5.2);
    const { calls, stage } = at(44, record(44, sweet), { events });
    expect(stage).not.toBe('terminal');
    expect(calls.rack.verdict).not.toBe('yes');
  });

  it('do not let a ferment that ends be bottled before it holds, and do afterwards', () => {
    const readings = record(40, cider);
    expect(at(8, readings).calls.bottle.verdict).not.toBe('yes');
    const { calls, stage } = at(40, readings);
    expect(calls.bottle.verdict).toBe('yes');
    expect(calls.rack.verdict).toBe('yes');
    expect(calls.stalled.verdict).toBe('no');
    expect(stage).toBe('terminal');
  });

  it('do not let a batch be bottled that still falls, though it is far below its range already', () => {
    // The range says that 15 points are the end; it has shown itself wrong.
    const wrong = { attenuation: { min: 0.7, max: 0.75 }, originalGravity: 1.055 };
    const slow = record(32, (day) => (day < 8 ? 55 - 5 * day : 15 - 0.45 * (day - 8)), () => 19, 0.8);
    for (const day of [16, 20, 24, 28, 32]) expect(at(day, slow.filter((reading) => reading.at <= PITCH + day * DAY), wrong).calls.bottle.verdict, `day ${day}`).not.toBe('yes');
  });

  it('show the chance of a late fall of what rests: over its limit while the fall is young, under it once ready, and none while it works', () => {
    const slow = (day: number): number => modelGravity('kinetic', [55, -1, -2.2, 0.2, -1.2, -1], day);
    const bottleOn = (day: number) => at(day, record(day, slow)).calls.bottle;
    const chanceOn = (day: number) => bottleOn(day).evidence.find((item) => item.unit === '%');
    expect(chanceOn(12)).toBeUndefined();
    const ready = Array.from({ length: 20 }, (_, i) => 18 + i).find((day) => bottleOn(day).verdict === 'yes')!;
    const before = chanceOn(ready - 2)!;
    expect(before.value).toBeGreaterThan(before.threshold!);
    expect(bottleOn(ready - 2).changesIt).toMatch(/a chance of 10 % at most/);
    expect(chanceOn(ready)!.value).toBeLessThanOrEqual(before.threshold!);
    // No figure of ours is surer than a hundred to one.
    expect(chanceOn(ready + 12)!.value).toBe(1);
  });

  it('know the temperature between the words of a float that speaks every six hours', () => {
    const seldom = record(10, cider).filter((_, index) => index % 12 === 0);
    for (const hours of [0, 2, 4, 5]) expect(at(8 + hours / 24, seldom.filter((reading) => reading.at <= PITCH + 8 * DAY)).calls.temperature.verdict, `${hours} h`).toBe('no');
    expect(at(9.8, seldom.filter((reading) => reading.at <= PITCH + 8 * DAY)).calls.temperature.verdict).toBe('unknown');
  });

  it('take "ready" back when a batch that has rested for weeks begins to fall', () => {
    // From day 45.1, between two of the judgements that a resting batch is given.
    const readings = record(49, (day) => cider(Math.min(day, 45.1)) - 1.2 * Math.max(0, day - 45.1));
    expect(at(45, readings).calls.bottle.verdict).toBe('yes');
    expect(at(48, readings).calls.bottle.verdict).not.toBe('yes');
  });

  it('call a stall with sugar left, and forbid the bottle', () => {
    const stopped = (day: number): number => Math.max(24, cider(day));
    const { calls } = at(16, record(16, stopped));
    expect(calls.stalled).toMatchObject({ verdict: 'yes', kind: 'stuck' });
    expect(calls.bottle.verdict).toBe('hold');
  });

  it('take a level a little above the range for the end after days of rest, but ask for a hydrometer before the bottle', () => {
    // With its doubt, done is 2.8 or less here (4.0 where it surely rests), and stuck 4.5 or more.
    const high = (day: number): number => modelGravity('kinetic', [55, 4.12, -1, 0.2, -1.2, -1], day);
    const { calls, stage } = at(30, record(30, high, () => 19, 0.3));
    expect(stage).toBe('terminal');
    expect(calls.rack.verdict).toBe('yes');
    expect(calls.stalled.verdict).toBe('no');
    expect(calls.bottle).toMatchObject({ verdict: 'unknown' });
    expect(calls.bottle.act).toMatch(/hydrometer/);
  });

  it('let a batch that surely rests just above the range be bottled, once a hydrometer has agreed', () => {
    const high = (day: number): number => modelGravity('kinetic', [55, 3.5, -1, 0.2, -1.2, -1], day);
    const { calls } = at(30, record(30, high, () => 19, 0.3));
    expect(calls.bottle).toMatchObject({ verdict: 'yes' });
    expect(calls.bottle.act).toMatch(/hydrometer/);
  });

  it('say of a float that climbs that it drifts, and never that the ferment is stuck', () => {
    const climbing = (day: number): number => (day < 5 ? cider(day) : cider(day) + 0.4 * (day - 5));
    const readings = record(45, climbing, () => 19, 0.3);
    for (const day of [30, 38, 45]) expect(at(day, readings).calls.stalled.verdict).not.toBe('yes');
    expect(at(38, readings).calls.sensor).toMatchObject({ verdict: 'yes', kind: 'drifting' });
  });

  it('name the cold where the temperature fell below the range', () => {
    const stopped = (day: number): number => Math.max(24, cider(day));
    const { calls } = at(14, record(14, stopped, (day) => (day < 6 ? 19 : 9)));
    expect(calls.stalled).toMatchObject({ verdict: 'yes', kind: 'cold' });
    expect(calls.temperature).toMatchObject({ verdict: 'yes', kind: 'low' });
  });

  it('leave the tube on what is only cold, and say what it may give once it is warm', () => {
    const stopped = (day: number): number => Math.max(24, cider(day));
    const cold = at(8, record(8, stopped, (day) => (day < 4 ? 19 : 8)), { volumeL: 20, vesselL: 20.4 }).calls.neck;
    expect(cold).toMatchObject({ verdict: 'hold', headline: 'Leave the tube on: it is only cold.' });
    expect(cold.reason).toMatch(/^Gas 0\.\d+ L\/h; warm again it may give [1-9]/);
    expect(at(8, record(8, stopped), { volumeL: 20, vesselL: 20.4 }).calls.neck.verdict).toBe('yes');
  });

  it('call it too cold until it is back inside its range, and do not begin to at the limit', () => {
    const falling = (celsius: number) => (day: number): number => (day < 3 ? 17 : day < 4 ? celsius : 14.8);
    const noiseless = (celsius: number) => record(6, cider, falling(celsius)).map((reading, i) => ({ ...reading, temperature: Math.round(reading.temperature! * 5) / 5 + 0.001 * (i % 2) }));
    expect(at(3.5, noiseless(14.2)).calls.temperature).toMatchObject({ verdict: 'yes', kind: 'low' });
    expect(at(5.5, noiseless(14.2)).calls.temperature).toMatchObject({ verdict: 'yes', kind: 'low' });
    expect(at(5.5, noiseless(14.8)).calls.temperature.verdict).toBe('no');
  });

  it('call slow what begins to creep again after a stall, not as it should be', () => {
    const creeping = (day: number): number => Math.max(24, cider(day)) - 1.4 * Math.max(0, day - 9);
    const readings = record(16, creeping);
    const said = [...assessEvery(setup, readings, Array.from({ length: 40 }, (_, i) => PITCH + (8 + i / 8) * DAY), { picture: false })].map(({ assessment: { calls } }) => calls.stalled.kind ?? calls.stalled.verdict);
    const stuck = said.lastIndexOf('stuck');
    expect(stuck).toBeGreaterThan(0);
    expect(said[stuck + 1]).toBe('sluggish');
  });

  it('see a batch that works again after it was sweetened at rest', () => {
    const events: BatchEvent[] = [{ at: PITCH + 30 * DAY, kind: 'addition', sugarG: 90 }];
    const sweet = (day: number): number => (day < 30 ? cider(day) : cider(30) + 7.7 * Math.exp(-Math.max(0, day - 31) / 3));
    const { calls } = at(36, record(36, sweet), { events });
    expect(calls.bottle).toMatchObject({ verdict: 'hold', kind: 'refermentation' });
  });

  it('do not bottle a batch that was sweetened at rest and lies still, unless it was stabilised', () => {
    const events: BatchEvent[] = [{ at: PITCH + 30 * DAY, kind: 'addition', sugarG: 60 }];
    const sweet = (day: number): number => (day < 30 ? cider(day) : cider(day) + 5.2);
    const readings = record(44, sweet);
    expect(at(44, readings, { events }).calls.bottle).toMatchObject({ verdict: 'hold', headline: 'Do not bottle: the sugar that went in is still there.' });
    const held: BatchEvent[] = [...events, { at: PITCH + 29 * DAY, kind: 'stabilise' }];
    const stabilised = at(44, readings, { events: held }).calls;
    expect(stabilised.bottle.verdict).toBe('yes');
    expect(stabilised.bottle.act).toMatch(/^Do not prime it/);
    expect(stabilised.stalled.verdict).not.toBe('yes');
    // Far above where it ended, too: what lies there has been told of.
    const sweeter: BatchEvent[] = [held[1]!, { at: PITCH + 30 * DAY, kind: 'addition', sugarG: 140 }];
    const much = at(44, record(44, (day) => (day < 30 ? cider(day) : cider(day) + 12)), { events: sweeter }).calls;
    expect(much.bottle.verdict).toBe('yes');
    expect(much.stalled.verdict).not.toBe('yes');
  });

  it('do not bottle what only the cold has stopped, though it lies within its range', () => {
    const stopped = (day: number): number => Math.max(1.5, cider(day));
    let stop = 0;
    while (cider(stop) > 1.5) stop += 0.25;
    expect(at(stop + 7, record(stop + 7, stopped)).calls.bottle.verdict).toBe('yes');
    expect(at(stop + 7, record(stop + 7, stopped, (day) => (day < stop - 0.5 ? 19 : 9))).calls.bottle.verdict).not.toBe('yes');
  });

  it('say that the sensor is silent, and that they do not know', () => {
    const { calls } = at(6, record(5, cider));
    expect(calls.sensor).toMatchObject({ verdict: 'yes', kind: 'silent' });
    expect(calls.stalled.verdict).toBe('unknown');
    expect(calls.bottle.verdict).toBe('unknown');
  });

  it('keep where the float last knew it to stand, steps and offset taken out, until a hydrometer says more', () => {
    const off = record(5, cider).map((reading) => ({ ...reading, gravity: reading.gravity + 0.003 }));
    const read = (day: number): BatchEvent => ({ kind: 'reading', at: PITCH + day * DAY, gravity: 1 + cider(day) / 1000 });
    const silent = at(7, off, { events: [read(4.5)] });
    expect(silent).toMatchObject({ gravity: null });
    expect(silent.lastGravity!.at).toBe(PITCH + 5 * DAY);
    expect(Math.abs(silent.lastGravity!.value - (1 + cider(5) / 1000))).toBeLessThan(0.0015);
    const speaking = at(5.01, off, { events: [read(4.5)] });
    expect(speaking.lastGravity).toEqual({ at: PITCH + 5 * DAY, value: speaking.gravity!.value });
    const since = at(7, off, { events: [read(4.5), read(6)] });
    expect(since.lastGravity).toEqual({ at: PITCH + 6 * DAY, value: since.gravity!.value });
    // Stuck, it says nothing of now either.
    const stuck = record(8, cider).map((reading) => (reading.at > PITCH + 4 * DAY ? { ...reading, gravity: 1.03 + 1e-5 * Math.sin(reading.at) } : reading));
    const frozen = at(8, stuck);
    expect(frozen).toMatchObject({ gravity: null, calls: { sensor: { kind: 'frozen' } } });
    expect(Math.abs(frozen.lastGravity!.at - (PITCH + 4 * DAY))).toBeLessThan(0.3 * DAY);
    expect(at(7, []).lastGravity).toBeNull();
  });

  it('see a float that is stuck', () => {
    const readings = record(6, cider).map((reading) => (reading.at > PITCH + 4 * DAY ? { ...reading, gravity: 1.03 + 1e-5 * Math.sin(reading.at) } : reading));
    expect(at(6, readings).calls.sensor).toMatchObject({ verdict: 'yes', kind: 'frozen' });
  });

  it('carry a figure with its unit in every reason that has evidence, and no exclamation', () => {
    for (const day of [0.2, 2, 6, 13, 30]) {
      for (const call of Object.values(at(day, record(day, cider)).calls)) {
        expect(`${call.headline} ${call.reason} ${call.act ?? ''}`).not.toMatch(/!|undefined|NaN|null/);
        expect(call.headline).toMatch(/\.$/);
        for (const item of call.evidence) expect(item.unit).not.toBe('');
      }
    }
  });

  it('count the days that a stalled batch has really been flat', () => {
    const stopped = (day: number): number => Math.max(24, cider(day));
    let stop = 0;
    while (cider(stop) > 24) stop += 0.25;
    const { stalled } = at(stop + 6, record(stop + 6, stopped)).calls;
    expect(stalled.headline).toMatch(/flat for 6 days\.$/);
  });

  it('show no pace of a batch that has stopped', () => {
    const stopped = (day: number): number => Math.max(24, cider(day));
    for (const day of [14, 15, 16, 18]) expect(Math.abs(at(day, record(day, stopped)).ratePointsPerDay!.value)).toBeLessThan(0.4);
  });

  it('follow the record of a stalled batch with its curve, and show what should have come with room for doubt', () => {
    const stopped = (day: number): number => Math.max(24, cider(day));
    const { curve, expected } = assess(setup, record(16, stopped), PITCH + 16 * DAY);
    const here = curve.filter((point) => point.at <= PITCH + 16 * DAY && point.at > PITCH + 12 * DAY);
    for (const point of here) expect(Math.abs(1000 * (point.gravity - 1.024))).toBeLessThan(2);
    expect(expected.at(-1)!.gravity).toBeLessThan(1.006);
    for (const point of expected) expect(point.hi - point.lo).toBeGreaterThan(0.0009);
  });

  it('take the strength of a drink that tops up for what it was, not for water', () => {
    const topUp = { at: PITCH + 20 * DAY, kind: 'top_up' as const, volumeL: 1.5, gravity: 1.0 };
    const plain = at(22, record(22, cider), { events: [topUp] });
    const strong = at(22, record(22, cider), { events: [{ ...topUp, originalGravity: 1.075 }] });
    expect(strong.abvPercent! - plain.abvPercent!).toBeGreaterThan(1.5);
  });

  it('call it racked and bottled after a float that stuck, from the record on both sides of the gap', () => {
    const frozen = record(40, cider).map((reading) => {
      const day = (reading.at - PITCH) / DAY;
      return day > 16 && day < 20 ? { ...reading, gravity: 1 + cider(16) / 1000 + 1e-5 * Math.sin(reading.at) } : reading;
    });
    const { sensor, rack } = at(22.5, frozen).calls;
    expect(sensor.kind).not.toBe('frozen');
    expect(rack.verdict).toBe('yes');
  });

  it('know nothing before the pitch is told', () => {
    const { calls, stage } = at(3, record(3, cider), { pitchedAt: null });
    expect(stage).toBe('unknown');
    expect(calls.bottle.verdict).toBe('unknown');
  });

  it('take an unlogged sugar addition for one, and a float that was moved for that', () => {
    const fed = (day: number): number => (day < 6 ? cider(day) : cider(day) + 12 * Math.exp(-(day - 6) / 4));
    const before = at(5.9, record(5.9, fed));
    const after = at(7, record(7, fed));
    expect(after.attenuationPercent!).toBeLessThan(before.attenuationPercent!);
    const moved = (day: number): number => cider(day) + (day > 30 ? 4 : 0);
    const gravity = at(40, record(40, moved)).gravity!.value;
    expect(Math.abs(gravity - (1 + cider(40) / 1000))).toBeLessThan(0.0015);
  });
});

describe('hydrometer readings alone', () => {
  const read = (day: number, gravity: number): BatchEvent => ({ at: PITCH + day * DAY, kind: 'reading', gravity });
  const events = [read(3, 1.046), read(7, 1.03), read(14, 1.006), read(21, 1.0), read(28, 1.0)];

  it('carry a start, a swap, racking and, when they hold, bottling', () => {
    expect(at(4, [], { events }).calls.started.verdict).toBe('yes');
    expect(at(15, [], { events }).calls.bottle.verdict).toBe('no');
    const late = at(29, [], { events }).calls;
    expect(late.rack.verdict).toBe('yes');
    expect(late.bottle.verdict).toBe('yes');
  });

  it('do not bottle by readings that may be off by 3 points', () => {
    const rough = events.map((event) => ({ ...event, gravitySd: 3 }));
    expect(at(29, [], { events }).calls.bottle.verdict).toBe('yes');
    expect(at(29, [], { events: rough }).calls.bottle.verdict).not.toBe('yes');
  });

  it('ask for the reading that would settle it', () => {
    const { bottle } = at(22, [], { events }).calls;
    expect(bottle.verdict).toBe('unknown');
    expect(bottle.act).toMatch(/^Read again /);
    expect(bottle.expectedAt).toBeGreaterThan(PITCH + 23 * DAY);
  });

  it('are settled by an equal reading at the time that is named, and not by looking more often', () => {
    const twoAWeek = [...events.slice(0, 3), ...[21, 24, 27].map((day) => read(day, 1.0))];
    const asked = at(22, [], { events: twoAWeek.slice(0, 4) }).calls.bottle.expectedAt!;
    const { bottle } = at(27.5, [], { events: twoAWeek }).calls;
    expect(bottle.verdict).toBe('yes');
    expect(asked).toBeLessThanOrEqual(PITCH + 27 * DAY);
    for (const day of [34, 48]) {
      const old = [...events.slice(0, 3), read(day, 1.0)];
      const named = at(day + 0.1, [], { events: old }).calls.bottle;
      expect(named.verdict).toBe('unknown');
      const again = { ...read(0, 1.0), at: named.expectedAt! };
      const between = { ...read(0, 1.0), at: (again.at + PITCH + day * DAY) / 2 };
      const looked = (more: BatchEvent[]) => assess({ ...setup, events: [...old, ...more] }, [], again.at + 3_600_000).assessment.calls.bottle.verdict;
      expect([looked([again]), looked([between, again])]).toEqual(['yes', 'yes']);
    }
  });

  it('are not asked to rack again what was racked, nor while a fining falls in it', () => {
    const off: BatchEvent = { at: PITCH + 22 * DAY, kind: 'rack' };
    const fining: BatchEvent = { at: PITCH + 22.1 * DAY, kind: 'note', settlesAt: PITCH + 40 * DAY };
    expect(at(29, [], { events: [...events, off] }).calls.rack).toMatchObject({ verdict: 'no', since: off.at });
    expect(at(29, [], { events: [...events, fining] }).calls.rack).toMatchObject({ verdict: 'soon', expectedAt: fining.settlesAt });
    expect(at(29, [], { events: [...events, { ...off, at: PITCH + 2 * DAY }] }).calls.rack.verdict).toBe('yes');
  });

  it('keep the tube on before the strong foam is past for that reason, not for a gas that an airlock bears', () => {
    const slow = [read(4, 1.05), read(10, 1.044), read(17, 1.038)];
    const { neck } = at(18, [], { events: slow }).calls;
    expect(neck).toMatchObject({ verdict: 'hold', reason: expect.stringMatching(/17 points down; the strong foam/) });
    expect(neck.reason).not.toMatch(/L\/h/);
  });

  it('are repeated before yeast goes in on the word of an old one', () => {
    const flat = [read(3.1, 1.054)];
    expect(at(3.5, [], { events: flat }).calls.started.act).toMatch(/^Check the temperature/);
    expect(at(9, [], { events: flat }).calls.started.act).toMatch(/^Read it again first/);
  });
});

describe('calls that do not flicker', () => {
  /** How often a call turns to yes, looked at every six hours from that day on. */
  const rises = (call: CallName, readings: Reading[], from: number, to: number, extra: Partial<BatchSetup> = {}): number => {
    const times = Array.from({ length: (to - from) * 4 }, (_, i) => PITCH + (from + i / 4) * DAY);
    const said = [...assessEvery({ ...setup, ...extra }, readings, times, { picture: false })].map(({ assessment }) => assessment.calls[call].verdict === 'yes');
    return said.filter((yes, i) => yes && !said[i - 1]).length;
  };

  it('take a record of two readings a week for one read by hand, from its second reading on', () => {
    const days = [0, 3, 7, 10, 14, 17, 21, 24, 28];
    const readings = days.map((day): Reading => ({ at: PITCH + day * DAY, gravity: 1 + cider(day) / 1000, temperature: 19 }));
    expect(rises('sensor', readings, 4, 28)).toBe(0);
    expect(at(10.5, readings).calls.started.verdict).toBe('yes');
    expect(at(10.5, readings).ratePointsPerDay).not.toBeNull();
  });

  it('do not come and go while a float swings about a level at which it has stopped', () => {
    const stuck = (day: number): number => Math.max(55 - 5 * day, 20);
    const swinging = record(45, (day) => stuck(day) + 0.5 * Math.sin((2 * Math.PI * day) / 5));
    expect(rises('stalled', swinging, 10, 45)).toBe(1);
  });

  it('see a mead that rests where its yeast was said to end as finished, though its honey could have gone lower', () => {
    const mead = record(70, (day) => modelGravity('kinetic', [75, 2, -1, 0.2, -1.2, -1], day));
    const told: Partial<BatchSetup> = { kind: 'mead', originalGravity: 1.075, attenuation: { min: 0.94, max: 1.02 }, alcoholToleranceAbv: 14 };
    const { stage, calls } = at(69, mead, told);
    expect(stage).toBe('terminal');
    expect(calls.stalled.verdict).toBe('no');
    expect(calls.bottle.verdict).toBe('yes');
  });

  it('name a float that climbs once, until it has come to rest', () => {
    const drifting = record(60, (day) => cider(day) + 0.2 * Math.max(0, day - 20) + 0.2 * Math.sin((2 * Math.PI * day) / 7));
    expect(rises('sensor', drifting, 10, 60)).toBe(1);
    expect(rises('stalled', drifting, 25, 60)).toBe(0);
  });
});
