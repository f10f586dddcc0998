import type { Tasting } from '@/db/models';
import { may, type Actor } from '@/lib/auth/policies';
import type { TastingBody } from '@/lib/contracts/tastings';
import { iso } from '../iso';

/** An own note, or any for those who keep the book. */
export const mayRemoveTasting = (actor: Actor, tasting: Pick<Tasting, 'personId'>): boolean => tasting.personId === actor.personId || may(actor.role, 'lots.update');

export function presentTasting(tasting: Tasting, actor: Actor, names: ReadonlyMap<string, string>): TastingBody {
  const name = tasting.personId === null ? tasting.guestName : (names.get(tasting.personId) ?? null);
  return {
    id: tasting.id,
    at: iso(tasting.at),
    by: { id: tasting.personId, name, guest: tasting.personId === null },
    look: tasting.look,
    smell: tasting.smell,
    taste: tasting.taste,
    balance: tasting.balance,
    sparkle: tasting.sparkle,
    score: tasting.score,
    words: tasting.words,
    next_time: tasting.nextTime,
    show_name: tasting.showName,
    mine: mayRemoveTasting(actor, tasting),
  };
}
