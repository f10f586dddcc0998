import type { Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { CatalogueItem } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { CatalogueForm, CatalogueItem as ItemBody } from '@/lib/contracts/catalogue';
import { InvalidError, NotFoundError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { bodyOfForm, presentItem } from './present';

async function load(cellarId: string, id: string, transaction: Transaction): Promise<CatalogueItem> {
  const item = await CatalogueItem.findOne({ where: { id, cellarId, removedAt: null }, transaction, lock: transaction.LOCK.UPDATE });
  if (!item) throw new NotFoundError('ingredient');
  return item;
}

/** Changes an own item. Must sheets keep what they were written with. */
export async function updateCatalogue(actor: Actor, id: string, form: CatalogueForm): Promise<ItemBody> {
  authorize(actor, 'catalogue.write');
  return inTransaction(async (transaction) => {
    const item = await load(actor.cellarId, id, transaction);
    if (item.sort !== form.sort) throw new InvalidError('A yeast cannot become an ingredient.', { sort: ['cannot be changed'] });
    await item.update({ body: bodyOfForm(form) }, { transaction });
    await auditBy(actor, 'catalogue.updated', id, { name: bodyOfForm(form).name }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'must', batch: null }, transaction);
    return presentItem(item);
  });
}

export async function removeFromCatalogue(actor: Actor, id: string, clock: Clock = systemClock): Promise<void> {
  authorize(actor, 'catalogue.write');
  await inTransaction(async (transaction) => {
    const item = await load(actor.cellarId, id, transaction);
    await item.update({ removedAt: new Date(clock.now()) }, { transaction });
    await auditBy(actor, 'catalogue.removed', id, {}, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'must', batch: null }, transaction);
  });
}
