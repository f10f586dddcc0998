import { describe, expect, it } from 'vitest';
import { doubt, grams, litres, points, typedGravity } from '@/components/batch/figures';

describe('a number as a person types it', () => {
  it('reads a hydrometer without its point, and leaves any other whole number alone', () => {
    expect([typedGravity('1048'), typedGravity('998'), typedGravity('1.048'), typedGravity('1,048')]).toEqual([1.048, 0.998, 1.048, 1.048]);
    expect(typedGravity('48')).toBe(48);
    expect(typedGravity('1')).toBe(1);
  });
});

describe('figures in the log', () => {
  it('say points without needless decimals, one of them in the singular, with a real minus', () => {
    expect([points(1), points(0.44), points(23.2), points(-0.5), points(2)]).toEqual(['1 point', '0.4 points', '23 points', '−0.5 points', '2 points']);
  });

  it('never claim less doubt than the last decimal shown', () => {
    expect(doubt({ lo: 1.04, hi: 1.0402 })).toBe('± 0.001');
    expect(doubt({ lo: 1.0, hi: 1.008 })).toBe('± 0.004');
  });

  it('keep litres and grams short', () => {
    expect([litres(4.5), litres(4.52), litres(20), grams(120), grams(12_500)]).toEqual(['4.5 L', '4.52 L', '20 L', '120 g', '12.5 kg']);
  });
});
