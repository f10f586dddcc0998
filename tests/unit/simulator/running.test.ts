import { describe, expect, test } from 'vitest';
import { FastClock } from '@/devices/simulator/fast-clock';
import { Memory } from '@/devices/simulator/memory';
import { RunningFloat } from '@/devices/simulator/running-float';
import type { TelemetryReading } from '@/lib/contracts/telemetry';
import { ManualClock } from '@/lib/clock';

const HOUR = 3_600_000;
const start = Date.UTC(2026, 1, 1);
const entry = { sensor: 'float-1', secret: 'one', scenario: 'late-backlog', seed: 3, startedAt: new Date(start).toISOString(), interval_s: 900 };

/** A link that keeps what it is given. */
function keeper() {
  const sent: TelemetryReading[] = [];
  return { sent, send: (reading: TelemetryReading) => void sent.push(reading), pump: () => undefined };
}

describe('a fast clock', () => {
  test('runs at its speed, catches up with the real one, and goes on with it', () => {
    const real = new ManualClock(start);
    const fast = new FastClock(real, start - 20 * HOUR, 3600);
    expect(fast.now()).toBe(start - 20 * HOUR);
    real.advance(10_000);
    expect(fast.now()).toBe(start - 10 * HOUR);
    real.advance(10_010);
    expect(fast.now()).toBe(real.now());
    real.advance(5 * HOUR);
    expect(fast.now()).toBe(real.now());
  });
});

describe('a memory', () => {
  test('gives the oldest first and, when full, lets the oldest go and counts them', () => {
    const memory = new Memory<number>(3);
    for (const item of [1, 2, 3, 4, 5]) memory.add(item);
    expect(memory.overwritten).toBe(2);
    expect(memory.take(2)).toEqual([3, 4]);
    expect(memory.size).toBe(1);
    expect(memory.take(2)).toEqual([5]);
  });
});

describe('a running float', () => {
  test('never hands over what is measured after now', () => {
    const clock = new ManualClock(start);
    const link = keeper();
    const float = new RunningFloat(entry, link, clock, start);
    for (let step = 0; step < 400; step += 1) {
      clock.advance(HOUR / 4);
      float.tick();
      expect(Date.parse(link.sent.at(-1)?.at ?? '')).toBeLessThanOrEqual(clock.now());
    }
    expect(link.sent.length).toBeGreaterThan(250);
  });

  test('hands over a backlog in one go when its link is back', () => {
    const clock = new ManualClock(start);
    const link = keeper();
    const float = new RunningFloat(entry, link, clock, start);
    clock.set(start + 51.9 * HOUR);
    float.tick();
    const before = link.sent.length;
    clock.set(start + 52 * HOUR + 5_000);
    float.tick();
    const late = link.sent.slice(before).map(({ at = '' }) => Date.parse(at));
    expect(late.length).toBeGreaterThan(45);
    expect(late).toEqual([...late].sort((one, other) => one - other));
  });

  test('after a restart sends the same readings again and no others', () => {
    const clock = new ManualClock(start + 100 * HOUR);
    const first = keeper();
    const second = keeper();
    new RunningFloat(entry, first, clock, start).tick();
    clock.advance(48 * HOUR);
    new RunningFloat(entry, second, clock, start).tick();
    expect(second.sent.slice(0, first.sent.length)).toEqual(first.sent);
  });

  test('is over when its cell is flat', () => {
    const clock = new ManualClock(start + 30 * 24 * HOUR);
    const float = new RunningFloat({ ...entry, scenario: 'silent' }, keeper(), clock, start);
    float.tick();
    expect(float.over).toBe(true);
  });
});
