import { describe, expect, it } from 'vitest';
import { BOTTLE_LEAST, BOTTLE_MOST, LATE_FRUIT, LATE_SUGAR, NEAR_TOLERANCE, NEAR_TOLERANCE_FROM, bottleMost, bottlePoints, STALL_POINTS, STALL_ROOM, held, mixed, remaining, shareLetPass, shareOfTail } from '../../../lib/core/stages/remaining';

describe('what may still come of a batch to be bottled', () => {
  it('is less the higher it rests above where its yeast ends, and no more below that', () => {
    expect(bottlePoints(-4, 2)).toBe(BOTTLE_MOST);
    expect(bottlePoints(0, 2)).toBe(BOTTLE_MOST);
    expect(bottlePoints(2, 2)).toBeCloseTo((BOTTLE_MOST + BOTTLE_LEAST) / 2, 12);
    expect(bottlePoints(9, 2)).toBeCloseTo(BOTTLE_LEAST, 12);
    // The surer the yeast's end is, the sooner it counts.
    expect(bottlePoints(2, 1)).toBeLessThan(bottlePoints(2, 3));
  });

  it('makes less than a volume of gas at worst, and of what rests as high as a stall hardly more than is likely', () => {
    expect(bottleMost(0, 4) * 0.51).toBeCloseTo(1, 12);
    expect(bottleMost(STALL_POINTS, 4) * 0.51).toBeCloseTo(1, 12);
    expect(bottleMost(STALL_POINTS + 0.1, 4)).toBeCloseTo(STALL_ROOM * bottlePoints(STALL_POINTS + 0.1, 4), 12);
    expect(bottleMost(8, 4)).toBeLessThan(1);
  });
});

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

describe('the share of it that is let pass', () => {
  const plain = { fruit: false, added: false, ofTolerance: null };
  it('is less where the last of a fall is slow, least where that has two reasons', () => {
    expect(shareLetPass(plain)).toBe(1);
    expect(shareLetPass({ ...plain, added: true })).toBe(LATE_SUGAR);
    expect(shareLetPass({ ...plain, added: true, fruit: true })).toBe(LATE_FRUIT);
    expect(shareLetPass({ ...plain, ofTolerance: NEAR_TOLERANCE_FROM })).toBe(1);
    expect(shareLetPass({ ...plain, ofTolerance: 0.95 })).toBe(NEAR_TOLERANCE);
    expect(shareLetPass({ added: true, fruit: true, ofTolerance: 1 })).toBeCloseTo(LATE_FRUIT * NEAR_TOLERANCE, 12);
    expect(LATE_FRUIT).toBeLessThan(LATE_SUGAR);
  });
});
