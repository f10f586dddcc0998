import { describe, expect, it } from 'vitest';
import { held, mixed, remaining, shareOfTail } from '../../../lib/core/stages/remaining';

describe('what is still to fall', () => {
  it('is at most its mean and 1.28 standard deviations nine times in ten, and half of one seven times in ten', () => {
    expect(remaining(2, 1).most).toBeCloseTo(3.28, 12);
    expect(remaining(2, 1).likely).toBeCloseTo(2.5, 12);
  });

  it('of two independent estimates lies between them, nearer to the surer, and is surer than either', () => {
    const both = held({ value: 1, sd: 1 }, { value: 4, sd: 2 });
    expect(both.value).toBeCloseTo(1.6, 12);
    expect(both.sd).toBeCloseTo(Math.sqrt(0.8), 12);
  });

  it('of two views of one record is no surer than the surer of them', () => {
    const both = mixed({ value: 1, sd: 1 }, { value: 3, sd: 0.6 }, 0.5);
    expect(both).toMatchObject({ value: 2, sd: 0.8 });
  });

  it('is told by the curve until 85 % of the fall are done, and by the tail alone at its end', () => {
    const curve = { og: 50, fg: 0 };
    expect(shareOfTail(curve, 7.5)).toBe(0);
    expect(shareOfTail(curve, 3.75)).toBeCloseTo(0.5, 12);
    expect(shareOfTail(curve, 0)).toBe(1);
    expect(shareOfTail(curve, -3)).toBe(1);
    expect(shareOfTail({ og: 10, fg: 10 }, 10)).toBe(1);
  });
});
