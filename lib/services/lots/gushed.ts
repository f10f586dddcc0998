import type { Transaction } from 'sequelize';
import type { Lot } from '@/db/models';
import { gushedJob } from './jobs';

const GUSHED = 'A bottle gushed. Eye protection and gloves for the others; move the lot somewhere cold, chill each one before it is opened, open it outdoors, away from faces.';

/** A bottle gushed, whoever says so: a caution on the whole lot, and a job for now. */
export async function markGushed(lot: Lot, now: Date, transaction: Transaction): Promise<void> {
  // A caution that is there already keeps its words: why it was put aside must not be written over.
  await lot.update({ caution: lot.caution === null ? GUSHED : lot.caution.includes('gushed') ? lot.caution : `${lot.caution} ${GUSHED}` }, { transaction });
  await gushedJob(lot, now, transaction);
}
