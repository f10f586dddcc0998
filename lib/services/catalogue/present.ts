import type { CatalogueItem as ItemRow } from '@/db/models';
import { catalogueItem, type CatalogueForm, type CatalogueItem } from '@/lib/contracts/catalogue';

const OWN = { source: 'told by the cellar: its label or a measurement', status: 'told' } as const;

/** An own item as the catalogue shows it; its key never meets one of the program's. */
export function presentItem(row: Pick<ItemRow, 'id' | 'sort' | 'body'>): CatalogueItem {
  const body = row.body as object;
  return catalogueItem.parse(row.sort === 'ingredient' ? { sort: 'ingredient', ingredient: { ...body, ...OWN, id: row.id, key: `own-${row.id}` } } : { sort: 'yeast', yeast: { ...body, status: OWN.status, id: row.id } });
}

export const bodyOfForm = (form: CatalogueForm) => (form.sort === 'ingredient' ? form.ingredient : form.yeast);
