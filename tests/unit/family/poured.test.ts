import { describe, expect, it } from 'vitest';
import { inflowOf, poured, type TopUp } from '@/components/family/poured';
import type { DrinkBody } from '@/lib/contracts/family';

// Only what is reckoned with.
const drink = (gravity: number | null, original: number | null = 1.088): DrinkBody => ({ gravity, effective_og: original, original_gravity: original, volume_l: 4.5 }) as DrinkBody;
const nothing: TopUp = { what: '', litres: null, gravity: null, original: null, from: null };
const topUp = (more: Partial<TopUp>): TopUp => ({ ...nothing, litres: 0.5, ...more });

describe('what a racking comes to before it is done', () => {
  it('leaves gravity and strength alone where nothing goes in', () => {
    const result = poured(drink(0.998), 4.5, 0.3, 4.5, nothing)!;
    expect(result.litres).toBeCloseTo(4.2, 9);
    expect(result.moved?.gravityChangePoints).toBeCloseTo(0, 6);
    expect(result.moved?.abvChangePercent).toBeCloseTo(0, 6);
  });

  it('says that water thins it and that must feeds it', () => {
    const thinned = poured(drink(0.998), 4.5, 0.3, 5, topUp({ what: 'water' }))!;
    expect(thinned.moved!.abvChangePercent).toBeLessThan(-0.5);
    const fed = poured(drink(0.998), 4.5, 0.3, 5, topUp({ what: 'must', gravity: 1.05 }))!;
    expect(fed.moved!.gravityChangePoints).toBeGreaterThan(1);
    expect(fed.moved!.cautions.join(' ')).toContain('may work again');
  });

  it('says whether it fits, and where too much air stays above it', () => {
    expect(poured(drink(0.998), 4.5, 0.1, 4.5, nothing)!.room).toBe('fits');
    expect(poured(drink(0.998), 4.5, 0.5, 4.5, nothing)!.room).toBe('air');
    expect(poured(drink(0.998), 4.5, 0, 4.5, topUp({ what: 'water', litres: 0.2 }))!.room).toBe('too_much');
  });

  it('tells the volume alone while the gravity is not known or what goes in is not told', () => {
    expect(poured(drink(null), 4.5, 0.3, 5, nothing)).toMatchObject({ moved: null });
    expect(poured(undefined, 4.5, 0.3, 5, nothing)).toMatchObject({ moved: null });
    expect(poured(drink(0.998), 4.5, 0.3, 5, topUp({ what: 'must' }))).toMatchObject({ litres: 4.7, moved: null });
    expect(poured(drink(0.998), 4.5, NaN, 5, nothing)).toBeNull();
    expect(poured(drink(0.998), 4.5, 4.5, 5, nothing)).toBeNull();
  });

  it('takes another batch as what stands in it, and a drink from elsewhere by both its gravities', () => {
    const other = inflowOf(topUp({ what: 'batch', from: drink(1.0, 1.05) }))!;
    const elsewhere = inflowOf(topUp({ what: 'drink', gravity: 1.0, original: 1.05 }))!;
    expect(other).toEqual(elsewhere);
    expect(inflowOf(topUp({ what: 'drink', gravity: 1.05, original: 1.0 }))).toBeNull();
  });
});
