import { describe, expect, it } from 'vitest';
import { amountOf, amountText, scaledText } from '@/components/musts/amount';

describe('an amount as a person writes it', () => {
  it('reads numbers, commas and fractions', () => {
    expect(amountOf('340')).toEqual({ lo: 340, value: 340, hi: 340 });
    expect(amountOf('0,5')?.value).toBe(0.5);
    expect(amountOf('1/2')?.value).toBe(0.5);
    expect(amountOf('1 ½')?.value).toBe(1.5);
  });

  it('takes "about" as good to a fifth, and two ends as a range', () => {
    expect(amountOf('about half')).toBeNull();
    expect(amountOf('about 0.5')).toEqual({ lo: 0.4, value: 0.5, hi: 0.6 });
    expect(amountOf('300 to 380')).toEqual({ lo: 300, value: 340, hi: 380 });
    expect(amountOf('350 (300 to 380)')).toEqual({ lo: 300, value: 350, hi: 380 });
  });

  it('refuses what is no amount', () => {
    for (const text of ['', 'some', '-3', '1/0', '400 (300 to 380)', '5000000']) expect(amountOf(text), text).toBeNull();
  });

  it('writes a range so that reading it again gives the same', () => {
    for (const text of ['340', 'about 0.5', '300 to 380', '350 (300 to 380)']) {
      const range = amountOf(text)!;
      expect(amountOf(amountText(range)), text).toEqual(range);
    }
  });

  it('scales every form and leaves what it cannot read', () => {
    expect(scaledText('300 to 380', 2)).toBe('600 to 760');
    expect(scaledText('a pinch', 2)).toBe('a pinch');
  });
});
