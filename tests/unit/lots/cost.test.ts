import { describe, expect, test } from 'vitest';
import { totalCost } from '@/lib/services/lots/kept';

const nought = { lo: 0, value: 0, hi: 0 };

describe('what the bottles cost', () => {
  test('is not known where no line of the sheet has a price, rather than nought', () => {
    expect(totalCost({ must: nought, known: false, other: null })).toBeNull();
  });

  test('is nought where every line was told to cost nothing, and what was paid for bottles counts', () => {
    expect(totalCost({ must: nought, known: true, other: null })).toEqual(nought);
    expect(totalCost({ must: nought, known: false, other: 4 })).toMatchObject({ value: 4 });
  });
});
