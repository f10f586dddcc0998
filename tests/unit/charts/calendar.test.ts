import { describe, expect, it } from 'vitest';
import { calendarOf, daysOf } from '@/components/charts/calendar';

const utc = (iso: string) => Date.parse(iso) / 1000;
const DAY = 86_400;

describe('the days of a span', () => {
  it('are whole, ascending and without a gap, also over a change of clocks', () => {
    const days = daysOf({ from: utc('2026-10-20T11:00:00Z'), to: utc('2026-11-02T05:00:00Z') }, 'Europe/Prague');
    expect(days).toHaveLength(14);
    days.slice(1).forEach((day, index) => expect(day.from).toBe(days[index]!.to));
    const change = days.find((day) => day.date === 25)!;
    expect(change.to - change.from).toBe(25 * 3600);
    expect(change).toMatchObject({ weekday: 'Sun', weekend: true, month: 'Oct' });
  });

  it('run over the end of a year', () => {
    const days = daysOf({ from: utc('2026-12-30T00:00:00Z'), to: utc('2027-01-02T00:00:00Z') }, 'UTC');
    expect(days.map((day) => `${day.date} ${day.month}`)).toEqual(['30 Dec', '31 Dec', '1 Jan']);
  });
});

describe('the calendar axis', () => {
  const now = utc('2026-10-15T14:32:00Z');
  const around = (days: number) => ({ from: now - (days * DAY) / 2, to: now + (days * DAY) / 2 });

  it('marks the stretch that holds now, once, whatever the zoom', () => {
    for (const days of [0.2, 1, 3, 12, 40, 120, 400]) {
      const { labels } = calendarOf(around(days), 'Europe/Prague', 900, now);
      expect(labels.filter((label) => label.today), `${days} days`).toHaveLength(1);
    }
  });

  it('never crowds its labels: each has at least 20 pixels', () => {
    for (const days of [0.2, 1, 3, 12, 40, 120, 400]) {
      for (const width of [340, 900]) {
        const span = around(days);
        const { labels } = calendarOf(span, 'UTC', width, now, width === 340);
        const whole = labels.slice(1, -1).map((label) => ((label.to - label.from) * width) / (span.to - span.from));
        expect(Math.min(...whole, 1000), `${days} days on ${width} px`).toBeGreaterThanOrEqual(20);
        expect(labels.length).toBeGreaterThan(0);
      }
    }
  });

  it('names the weekday where there is room and its letter where there is not', () => {
    expect(calendarOf(around(12), 'UTC', 900, now).labels.find((label) => label.today)).toMatchObject({ top: 'Thu', bottom: '15' });
    expect(calendarOf(around(24), 'UTC', 700, now).labels.find((label) => label.today)).toMatchObject({ top: 'T', bottom: '15' });
  });

  it('shows hours once zoomed in', () => {
    const { labels } = calendarOf(around(1), 'UTC', 900, now);
    expect(labels.map((label) => label.bottom)).toContain('12:00');
    expect(labels.find((label) => label.strong)).toMatchObject({ top: 'Fri 16', bottom: '00:00' });
  });

  it('names the day of hours that show no midnight', () => {
    const { labels } = calendarOf({ from: utc('2026-10-15T06:20:00Z'), to: utc('2026-10-15T14:00:00Z') }, 'UTC', 900, now);
    expect(labels.flatMap((label) => (label.top ? [label.top] : []))).toEqual(['Thu 15']);
  });
});
