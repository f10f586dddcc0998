import { describe, expect, it } from 'vitest';
import { dayWords, whenWords } from '@/lib/core/calls/words';

const at = (iso: string) => Date.parse(iso);

describe('a day in a call', () => {
  it('has the three letters of its month that every screen has, in September too', () => {
    expect(dayWords(at('2026-09-09T10:50Z'), 'UTC')).toBe('Wed 9 Sep');
    expect(whenWords(at('2026-09-09T10:50Z'), at('2026-12-02T05:00Z'), 'UTC')).toBe('Wed 9 Sep');
    const months = Array.from({ length: 12 }, (_, month) => dayWords(Date.UTC(2026, month, 15), 'UTC').split(' ')[2]);
    for (const month of months) expect(month).toHaveLength(3);
  });
});
