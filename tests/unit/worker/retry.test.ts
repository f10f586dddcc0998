import { describe, expect, it } from 'vitest';
import { GIVE_UP_AFTER_MS, nextTry, REFUSALS_BEFORE_GIVING_UP } from '@/lib/services/outbox/retry';
import type { FailureKind } from '@/lib/mail/transport';

const START = Date.UTC(2026, 0, 1);
/** Waits between tries, s, with no spread. */
function waits(kind: FailureKind, tries: number): Array<number | null> {
  let now = START;
  return Array.from({ length: tries }, (_, index) => {
    const next = nextTry(kind, index + 1, START, now, 0.5);
    const wait = next === null ? null : (next - now) / 1000;
    now = next ?? now;
    return wait;
  });
}

describe('when a mail is tried again', () => {
  it('waits longer each time while the server is away, and never more than five minutes', () => {
    expect(waits('unavailable', 9)).toEqual([5, 10, 20, 40, 80, 160, 300, 300, 300]);
  });

  it('is patient with a server that says later', () => {
    expect(waits('deferred', 8)).toEqual([30, 60, 120, 240, 480, 960, 1800, 1800]);
  });

  it('takes a no for an answer the fifth time', () => {
    expect(waits('refused', REFUSALS_BEFORE_GIVING_UP)).toEqual([60, 240, 960, 3840, null]);
  });

  it('outlasts a mail server that is away for a day', () => {
    expect(nextTry('unavailable', 400, START, START + 24 * 3_600_000, 0.5)).not.toBeNull();
  });

  it('gives up what is two days old', () => {
    for (const kind of ['unavailable', 'deferred', 'refused'] as const) expect(nextTry(kind, 3, START, START + GIVE_UP_AFTER_MS, 0.5)).toBeNull();
  });

  it('spreads the tries by a quarter up and down', () => {
    expect(nextTry('unavailable', 3, START, START, 0)).toBe(START + 15_000);
    expect(nextTry('unavailable', 3, START, START, 1)).toBe(START + 25_000);
  });
});
