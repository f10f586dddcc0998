import { describe, expect, it } from 'vitest';
import { themeAt } from '@/components/ui/theme';
import { NIGHT, THEME_KEY, THEME_SCRIPT } from '@/components/ui/theme-script';

describe('day and night', () => {
  it('by hand do not ask the clock', () => {
    for (let hour = 0; hour < 24; hour++) {
      expect(themeAt('day', hour)).toBe('day');
      expect(themeAt('night', hour)).toBe('night');
    }
  });

  it('by the clock change at 20:00 and 07:00', () => {
    expect([6, 7, 19, 20].map((hour) => themeAt('clock', hour))).toEqual(['night', 'day', 'day', 'night']);
  });

  it('are the same in the script that runs before the page is drawn', () => {
    for (const choice of ['day', 'night', 'clock', null] as const) {
      for (const hour of [0, NIGHT.to - 1, NIGHT.to, 12, NIGHT.from - 1, NIGHT.from]) {
        const dataset: { theme?: string } = {};
        const run = new Function('localStorage', 'document', 'Date', THEME_SCRIPT) as (...globals: unknown[]) => void;
        run({ getItem: (key: string) => (key === THEME_KEY ? choice : null) }, { documentElement: { dataset } }, class { getHours = () => hour; });
        expect(dataset.theme).toBe(themeAt(choice ?? 'day', hour));
      }
    }
  });
});
