import { describe, expect, it } from 'vitest';
import { draftOfIngredient, draftOfKind, draftOfYeast, emptyYeast, ingredientOf, yeastOf } from '@/components/musts/own-draft';
import { catalogueForm } from '@/lib/contracts/catalogue';
import { INGREDIENT_KINDS } from '@/lib/core/must/ingredients';

describe('an ingredient of the cellar’s own', () => {
  it.each(INGREDIENT_KINDS)('%s: starts from usual figures that the contract takes as they stand', (kind) => {
    expect(catalogueForm.safeParse({ sort: 'ingredient', ingredient: ingredientOf(draftOfKind(kind, 'ours')) }).error).toBeUndefined();
  });

  it('reads a range of sugar as it is written, as shares of the whole', () => {
    const made = ingredientOf({ ...draftOfKind('fruit', 'quinces'), sugar: '10 to 14' });
    expect(made.extract_share.lo).toBeCloseTo(0.1, 9);
    expect(made.extract_share.value).toBeCloseTo(0.12, 9);
    expect(made.extract_share.hi).toBeCloseTo(0.14, 9);
  });

  it('is the same after it was kept and opened again', () => {
    const first = ingredientOf({ ...draftOfKind('candied_fruit', 'ginger'), sugar: '70', days: '5 to 9', pieceGrams: '30', pieceName: 'lump', allergens: ['sulphites'] });
    expect(ingredientOf(draftOfIngredient(first))).toEqual(first);
  });

  it('is refused where sugar and pulp are more than the whole, and where a figure is no number', () => {
    const tell = (change: object) => catalogueForm.safeParse({ sort: 'ingredient', ingredient: ingredientOf({ ...draftOfKind('fruit', 'stones'), ...change }) }).error?.issues.map((issue) => issue.path.join('.')) ?? [];
    expect(tell({ sugar: '60', insoluble: '50' })).toEqual(['ingredient.insoluble_share']);
    expect(tell({ sugar: 'much' }).some((path) => path.startsWith('ingredient.extract_share'))).toBe(true);
  });
});

describe('a yeast of the cellar’s own', () => {
  it('takes all the sugar where no attenuation is told', () => {
    const yeast = yeastOf({ ...emptyYeast(), name: 'ours', tolerance: '12 to 14', coldest: '12', warmest: '20' });
    expect(yeast.attenuation).toBeNull();
    expect(yeast.tolerance_abv).toEqual({ lo: 12, value: 13, hi: 14 });
    expect(catalogueForm.safeParse({ sort: 'yeast', yeast }).success).toBe(true);
    expect(yeastOf(draftOfYeast(yeast))).toEqual(yeast);
  });

  it('is refused without what it bears', () => {
    expect(catalogueForm.safeParse({ sort: 'yeast', yeast: yeastOf({ ...emptyYeast(), name: 'ours', coldest: '12', warmest: '20' }) }).success).toBe(false);
  });
});
