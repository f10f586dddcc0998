import { describe, expect, it } from 'vitest';
import { amountOf, amountText, scaledText } from '@/components/musts/amount';
import { newLine, quantityOf, withAmount, withUnit } from '@/components/musts/draft';
import { written } from '@/components/musts/written';
import { snakeKeys } from '@/lib/contracts/case';
import { catalogued } from '@/lib/core/must/catalogue';

describe('an amount as a person writes it', () => {
  it('reads numbers, commas and fractions', () => {
    expect(amountOf('340')).toEqual({ lo: 340, value: 340, hi: 340 });
    expect(amountOf('0,5')?.value).toBe(0.5);
    expect(amountOf('1/2')?.value).toBe(0.5);
    expect(amountOf('1 ½')?.value).toBe(1.5);
  });

  it('takes "about" as good to a fifth, and two ends as a range', () => {
    expect(amountOf('about 0.5')).toEqual({ lo: 0.4, value: 0.5, hi: 0.6 });
    expect(amountOf('300 to 380')).toEqual({ lo: 300, value: 340, hi: 380 });
    expect(amountOf('350 (300 to 380)')).toEqual({ lo: 300, value: 350, hi: 380 });
  });

  it('reads the small numbers that people write as words', () => {
    expect(amountOf('half')?.value).toBe(0.5);
    expect(amountOf('about half')).toEqual({ lo: 0.4, value: 0.5, hi: 0.6 });
    expect(amountOf('one and a half')?.value).toBe(1.5);
    expect(amountOf('three quarters')?.value).toBe(0.75);
    expect(amountOf('two to three')).toEqual({ lo: 2, value: 2.5, hi: 3 });
  });

  it('reads a unit behind it, if the ingredient can be measured so', () => {
    const honey = snakeKeys(catalogued('honey')!);
    const damsons = snakeKeys(catalogued('damson')!);
    expect(written('about half a jar', honey)).toMatchObject({ quantity: { lo: 0.4, value: 0.5, hi: 0.6 }, unit: 'each', bare: 'about half' });
    expect(written('a jar of honey', honey)).toMatchObject({ quantity: { value: 1 }, unit: 'each' });
    expect(written('340 g', honey)).toMatchObject({ quantity: { value: 340 }, unit: 'g', bare: '340' });
    expect(written('1 to 1.4 kg', damsons)).toMatchObject({ quantity: { lo: 1, hi: 1.4 }, unit: 'kg' });
    expect(written('2 tablespoons', honey)).toMatchObject({ quantity: { value: 2 }, unit: 'tbsp' });
    expect(written('340', honey)).toMatchObject({ unit: null });
    // Damsons are not poured, and nobody knows what a jar of them weighs.
    expect(written('2 L', damsons)).toBeNull();
    expect(written('half a jar', damsons)).toBeNull();
    expect(written('a handful', damsons)).toBeNull();
  });

  it('lets the unit follow what is written, and what is written follow the unit', () => {
    const line = { ...newLine(snakeKeys(catalogued('honey')!)), unit: 'g' as const };
    const typed = withAmount(line, 'half a jar');
    expect(typed).toMatchObject({ amount: 'half a jar', unit: 'each' });
    expect(quantityOf(typed)?.value).toBe(0.5);
    const inGrams = withUnit(withAmount(line, '340 g'), 'kg');
    expect(inGrams).toMatchObject({ amount: '340', unit: 'kg' });
    expect(quantityOf(inGrams)?.value).toBe(340);
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
