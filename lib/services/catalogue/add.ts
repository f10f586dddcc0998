import { inTransaction } from '@/db/client';
import { CatalogueItem } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { CatalogueForm, CatalogueItem as ItemBody } from '@/lib/contracts/catalogue';
import { ConflictError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { bodyOfForm, presentItem } from './present';

/** Nobody keeps more; a program gone wild might. */
const MOST_OWN = 1000;

/** Adds an ingredient or a yeast of the cellar's own. */
export async function addToCatalogue(actor: Actor, form: CatalogueForm): Promise<ItemBody> {
  authorize(actor, 'catalogue.write');
  return inTransaction(async (transaction) => {
    if ((await CatalogueItem.count({ where: { cellarId: actor.cellarId, removedAt: null }, transaction })) >= MOST_OWN) throw new ConflictError(`The catalogue has ${MOST_OWN} of your own. Take some out first.`);
    const item = await CatalogueItem.create({ cellarId: actor.cellarId, sort: form.sort, body: bodyOfForm(form), createdBy: actor.personId }, { transaction });
    await auditBy(actor, 'catalogue.added', item.id, { name: bodyOfForm(form).name }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'must', batch: null }, transaction);
    return presentItem(item);
  });
}
