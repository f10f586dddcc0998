import { expect, it } from 'vitest';
import { holdOf, turnsOf, type Held } from '@/lib/core/alerts/telling';
import { seeded } from '../../support/random';

const MINUTE = 60_000;
const ZONES = ['UTC', 'Europe/Berlin', 'America/St_Johns', 'Australia/Lord_Howe', 'Pacific/Chatham', 'America/Los_Angeles'];

const STEP = 5;
const CLOCKS = new Map(ZONES.map((timeZone) => [timeZone, new Intl.DateTimeFormat('en-GB', { timeZone, hour: '2-digit', minute: '2-digit', hourCycle: 'h23' })]));

/** The same promise the plain way: stand at the wall clock and wait, five minutes at a time, until nothing holds it back. */
class Waiting {
  constructor(private readonly held: Held) {}
  private quietAt(now: number): boolean {
    const { quiet } = this.held;
    if (!quiet || quiet.fromMin === quiet.toMin) return false;
    const [hour, minute] = CLOCKS.get(this.held.timeZone)!.format(now).split(':').map(Number) as [number, number];
    const at = hour * 60 + minute;
    return quiet.fromMin < quiet.toMin ? at >= quiet.fromMin && at < quiet.toMin : at >= quiet.fromMin || at < quiet.toMin;
  }
  /** The first of these times at which it goes. */
  goesAt(now: number): number {
    if (this.held.level === 'act' || this.held.asked) return now;
    let at = Math.max(now, this.held.mutedUntil ?? now);
    while (this.quietAt(at)) at += STEP * MINUTE;
    return at;
  }
}

it.each([1, 2, 3])('lets every one of 10,000 random messages go at the minute at which somebody who waits would see it go (seed %i)', (seed) => {
  const random = seeded(seed);
  const pick = <T>(list: readonly T[]) => list[Math.floor(random() * list.length)]!;
  const whole = (below: number) => Math.floor((random() * below) / STEP) * STEP;
  let differences = 0;
  let held = 0;
  for (let index = 0; index < 10_000; index += 1) {
    const now = Date.UTC(2026, Math.floor(random() * 12), 1 + Math.floor(random() * 28), Math.floor(random() * 24), whole(60));
    // Not within the hours that the clock leaves out or gives twice, where "until 02:30" has two meanings; those are named cases of their own.
    const minute = () => 240 + whole(1200);
    const message: Held = {
      level: pick(['act', 'check', 'check', 'know']),
      asked: random() < 0.1,
      quiet: random() < 0.2 ? null : random() < 0.5 ? { fromMin: 21 * 60 + whole(120), toMin: 300 + whole(240) } : { fromMin: minute(), toMin: minute() },
      timeZone: pick(ZONES),
      mutedUntil: random() < 0.3 ? now + (whole(2880) - 600) * MINUTE : null,
    };
    const hold = holdOf(message, now);
    const expected = new Waiting(message).goesAt(now);
    if ((hold?.until ?? now) !== expected) differences += 1;
    if (hold) held += 1;
  }
  expect(differences).toBe(0);
  expect(held).toBeGreaterThan(2_000);
});

it.each([1, 2, 3])('never lets everybody wait, never lets two of the order pass each other (seed %i)', (seed) => {
  const random = seeded(seed);
  for (let index = 0; index < 10_000; index += 1) {
    const all = ['a', 'b', 'c', 'd', 'e', 'f'].filter(() => random() < 0.7);
    const order = [...all, 'gone'].map((person) => ({ person, key: random() })).filter(() => random() < 0.6).sort((x, y) => x.key - y.key).map(({ person }) => person);
    const afterMin = 5 + Math.floor(random() * 100);
    const turns = turnsOf(all, random() < 0.5 ? 'act' : 'check', { afterMin, order });
    expect([...turns.keys()].sort()).toEqual([...all].sort());
    if (all.length) expect(Math.min(...turns.values())).toBe(0);
    const waiting = order.filter((person) => turns.has(person)).map((person) => turns.get(person)! / (afterMin * MINUTE));
    const first = waiting.length === all.length ? 0 : 1;
    expect(waiting).toEqual(waiting.map((_, place) => place + first));
  }
});
