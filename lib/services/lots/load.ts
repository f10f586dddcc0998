import type { Transaction } from 'sequelize';
import { Lot, LotBottle } from '@/db/models';
import { InvalidError, NotFoundError } from '@/lib/errors';

/** The lot, locked where the transaction will write. @throws NotFoundError for another cellar's as for none at all. */
export async function loadLot(cellarId: string, id: string, transaction?: Transaction): Promise<Lot> {
  const lot = await Lot.findOne({ where: { id, cellarId }, transaction, ...(transaction && { lock: transaction.LOCK.UPDATE }) });
  if (!lot) throw new NotFoundError('lot');
  return lot;
}

export async function loadBottle(lot: Lot, id: string, transaction: Transaction): Promise<LotBottle> {
  const bottle = await LotBottle.findOne({ where: { id, lotId: lot.id }, transaction });
  if (!bottle) throw new InvalidError('This lot has no such bottles.', { bottle_id: ['is not of this lot'] });
  return bottle;
}
