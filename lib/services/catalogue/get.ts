import { CatalogueItem } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { snakeKeys } from '@/lib/contracts/case';
import type { CatalogueBody } from '@/lib/contracts/catalogue';
import { CATALOGUE, YEASTS } from '@/lib/core/must/catalogue';
import { presentItem } from './present';

/** The program's ingredients and yeasts, after the cellar's own. */
export async function getCatalogue(actor: Actor): Promise<CatalogueBody> {
  authorize(actor, 'musts.read');
  const rows = await CatalogueItem.findAll({ where: { cellarId: actor.cellarId, removedAt: null }, order: [['createdAt', 'ASC']] });
  const own = rows.map(presentItem);
  return {
    ingredients: [...own.flatMap((item) => (item.sort === 'ingredient' ? [item.ingredient] : [])), ...CATALOGUE.map((ingredient) => ({ ...snakeKeys(ingredient), id: null }))],
    yeasts: [...own.flatMap((item) => (item.sort === 'yeast' ? [item.yeast] : [])), ...YEASTS.map((yeast) => ({ ...snakeKeys(yeast), id: null }))],
  };
}
