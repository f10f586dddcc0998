import { describe, expect, it } from 'vitest';
import { moneyText } from '@/components/ui/money';

describe('what something cost', () => {
  it('is a figure alone where the cellar never said what it counts in', () => {
    expect(moneyText(12.5, null)).toBe('12.50');
  });

  it('carries the currency’s own sign and as many places as it has', () => {
    expect(moneyText(12.5, 'EUR')).toBe('€12.50');
    expect(moneyText(1250, 'JPY')).toBe('¥1,250');
    expect(moneyText(-3, 'GBP')).toBe('−£3.00');
    expect(moneyText(7, 'DKK')).toMatch(/7\.00/);
  });
});
