import type { Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Tasting, type Lot } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { CreateTasting, GuestTasting, TastingBody, TastingList } from '@/lib/contracts/tastings';
import { ConflictError, ForbiddenError, NotFoundError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { namesOf } from '../entries/names';
import { markGushed } from '../lots/gushed';
import { loadLot } from '../lots/load';
import { notAhead } from '../not-ahead';
import { mayRemoveTasting, presentTasting } from './present';
import { summaryOf } from './summary';

/** Notes of a lot, newest first, with their average and spread. */
export async function listTastings(actor: Actor, lotId: string): Promise<TastingList> {
  authorize(actor, 'lots.read');
  await loadLot(actor.cellarId, lotId);
  const rows = await Tasting.findAll({ where: { lotId, removedAt: null }, order: [['at', 'DESC']], limit: 500 });
  const names = await namesOf(rows.map((row) => row.personId));
  return { items: rows.map((row) => presentTasting(row, actor, names)), summary: summaryOf(rows) };
}

const figuresOf = (input: CreateTasting | GuestTasting) => ({ look: input.look, smell: input.smell, taste: input.taste, balance: input.balance, sparkle: input.sparkle, score: input.score, words: input.words, nextTime: input.next_time });

/** Writes a note once: the same `client_id` again is the note that is there. */
export async function writeTasting(lot: Lot, input: CreateTasting | GuestTasting, by: { at: Date; personId: string | null; shareId: string | null; guestName: string | null; showName: boolean }, transaction: Transaction): Promise<Tasting> {
  const known = input.client_id === null ? null : await Tasting.findOne({ where: { cellarId: lot.cellarId, clientId: input.client_id }, transaction });
  if (known && known.lotId !== lot.id) throw new ConflictError('This was sent for another lot.');
  if (known) return known;
  const tasting = await Tasting.create({ cellarId: lot.cellarId, lotId: lot.id, ...figuresOf(input), ...by, clientId: input.client_id }, { transaction });
  // Told at the table is told: the other bottles do not wait for somebody to write it into the book.
  if (input.sparkle === 'gushing') await markGushed(lot, by.at, transaction);
  await notifyChange({ cellar: lot.cellarId, kind: 'lot', batch: null }, transaction);
  return tasting;
}

export async function createTasting(actor: Actor, lotId: string, input: CreateTasting, clock: Clock = systemClock): Promise<TastingBody> {
  authorize(actor, 'tastings.write');
  const at = notAhead(input.at, clock.now());
  return inTransaction(async (transaction) => {
    const lot = await loadLot(actor.cellarId, lotId, transaction);
    const tasting = await writeTasting(lot, input, { at, personId: actor.personId, shareId: null, guestName: null, showName: input.show_name }, transaction);
    await auditBy(actor, 'tasting.written', tasting.id, { lot: lotId }, transaction);
    return presentTasting(tasting, actor, await namesOf([tasting.personId], transaction));
  });
}

export async function removeTasting(actor: Actor, id: string, clock: Clock = systemClock): Promise<void> {
  authorize(actor, 'tastings.write');
  await inTransaction(async (transaction) => {
    const tasting = await Tasting.findOne({ where: { id, cellarId: actor.cellarId, removedAt: null }, transaction });
    if (!tasting) throw new NotFoundError('tasting note');
    if (!mayRemoveTasting(actor, tasting)) throw new ForbiddenError('You can take back only your own note.');
    await tasting.update({ removedAt: new Date(clock.now()) }, { transaction });
    await auditBy(actor, 'tasting.removed', id, { lot: tasting.lotId }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'lot', batch: null }, transaction);
  });
}
