import { describe, expect, it } from 'vitest';
import { Schedule } from '@/broker/worker/schedule';

const MINUTE = 60_000;

describe('the schedule of judgements', () => {
  it('judges at once after the first reading', () => {
    const schedule = new Schedule(MINUTE);
    schedule.ask('a', 0);
    expect(schedule.take(0)).toBe('a');
    expect(schedule.take(0)).toBeNull();
  });

  it('judges a batch at most once a minute however many readings come', () => {
    const schedule = new Schedule(MINUTE);
    let judged = 0;
    for (let now = 0; now < 10 * MINUTE; now += 1_000) {
      schedule.ask('a', now);
      if (schedule.take(now)) judged += 1;
    }
    expect(judged).toBe(10);
  });

  it('judges soon after what a person did', () => {
    const schedule = new Schedule(MINUTE);
    schedule.ask('a', 0);
    schedule.take(0);
    schedule.ask('a', 100);
    schedule.askSoon('a', 500);
    expect(schedule.take(900)).toBeNull();
    expect(schedule.take(1_000)).toBe('a');
  });

  it('takes the longest waiting first and none twice', () => {
    const schedule = new Schedule(MINUTE);
    schedule.ask('b', 5);
    schedule.ask('a', 3);
    schedule.ask('a', 9);
    expect([schedule.take(10), schedule.take(10), schedule.take(10)]).toEqual(['a', 'b', null]);
  });

  it('takes first what somebody is looking at', () => {
    const schedule = new Schedule(MINUTE);
    for (const batch of ['a', 'b', 'c']) schedule.ask(batch, 0);
    schedule.askSoon('d', 5);
    expect([schedule.take(10), schedule.take(10)]).toEqual(['d', 'a']);
  });

  it('says when the next is due', () => {
    const schedule = new Schedule(MINUTE);
    expect(schedule.nextAt()).toBeNull();
    schedule.ask('a', 0);
    schedule.take(0);
    schedule.ask('a', 10);
    expect(schedule.nextAt()).toBe(MINUTE);
  });

  it('is not held up when the clock is set back', () => {
    const schedule = new Schedule(MINUTE);
    schedule.ask('a', 3_600_000);
    schedule.take(3_600_000);
    schedule.ask('a', 1_000);
    expect(schedule.take(1_000)).toBe('a');
  });

  it('forgets batches that nothing holds back any more', () => {
    const schedule = new Schedule(MINUTE);
    schedule.ask('a', 0);
    schedule.take(0);
    schedule.forget(2 * MINUTE);
    schedule.ask('a', 2 * MINUTE);
    expect(schedule.take(2 * MINUTE)).toBe('a');
    expect(schedule.waiting).toBe(0);
  });
});
