import { describe, expect, it } from 'vitest';
import { clock, dayRange, duration, instantOf, wallTime, when } from '@/components/charts/zone';

const utc = (iso: string) => Date.parse(iso) / 1000;

describe('the wall clock of a zone', () => {
  it('shows the local hour, also where the zone is half an hour off', () => {
    expect(clock(utc('2026-01-10T12:00:00Z'), 'Asia/Kolkata')).toBe('17:30');
    expect(wallTime(utc('2026-07-01T22:30:00Z'), 'Europe/Prague')).toMatchObject({ year: 2026, month: 7, day: 2, hour: 0, minute: 30, weekday: 'Thu' });
  });

  it('is undone by instantOf on every hour of the two days when clocks change', () => {
    for (const day of ['2026-03-29', '2026-10-25']) {
      for (let hour = 0; hour < 30; hour++) {
        const at = utc(`${day}T00:00:00Z`) - 3600 * 3 + hour * 3600;
        const back = instantOf(wallTime(at, 'Europe/Prague'), 'Europe/Prague');
        // The hour that comes twice in autumn may give either of its two instants.
        expect([at, at - 3600, at + 3600]).toContain(back);
        expect(clock(back, 'Europe/Prague')).toBe(clock(at, 'Europe/Prague'));
      }
    }
  });

  it('gives the time after the gap for an hour that summer time leaves out', () => {
    const skipped = instantOf({ year: 2026, month: 3, day: 29, hour: 2, minute: 30 }, 'Europe/Prague');
    expect(clock(skipped, 'Europe/Prague')).toBe('03:30');
  });
});

describe('times in words', () => {
  it('names a range of days once where the month is the same', () => {
    expect(dayRange(utc('2026-10-20T10:00:00Z'), utc('2026-10-22T10:00:00Z'), 'UTC')).toBe('20–22 Oct');
    expect(dayRange(utc('2026-10-30T10:00:00Z'), utc('2026-11-02T10:00:00Z'), 'UTC')).toBe('30 Oct–2 Nov');
    expect(dayRange(utc('2026-10-20T10:00:00Z'), utc('2026-10-20T20:00:00Z'), 'UTC')).toBe('20 Oct');
  });

  it('leaves out what is plain from now', () => {
    const now = utc('2026-10-15T14:32:00Z');
    expect(when(utc('2026-10-15T09:04:00Z'), now, 'UTC')).toBe('09:04');
    expect(when(utc('2026-10-14T07:30:00Z'), now, 'UTC')).toBe('Wed 07:30');
    expect(when(utc('2026-10-01T07:30:00Z'), now, 'UTC')).toBe('Thu 1 Oct 07:30');
  });

  it('writes a span as the trade says it', () => {
    expect([-5, 40 * 60, 4 * 3600 + 600, 31 * 3600, 72 * 3600].map(duration)).toEqual(['0 min', '40 min', '4 h 10 min', '31 h', '3 days']);
  });
});
