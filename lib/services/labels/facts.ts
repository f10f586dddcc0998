import { Batch, LotBottle, type Lot } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { snakeKeys } from '@/lib/contracts/case';
import type { LabelFacts } from '@/lib/contracts/labels';
import { allergenLine, strengthLine, type AllergenLine, type StrengthLine } from '@/lib/core/naming/label';
import type { Suggestion } from '@/lib/core/naming/kind';
import { suggestionOf } from '../drink/name';
import { drinkState, type DrinkState } from '../drink/state';
import { iso, isoOrNull } from '../iso';
import { loadLot } from '../lots/load';
import { openShareOf } from '../shares/open';

export const SPARKLE_WORDS: Record<Lot['sparkle'], string> = { still: 'still', light: 'lightly sparkling', sparkling: 'sparkling' };

export interface LotFacts {
  lot: Lot;
  batch: Batch;
  state: DrinkState;
  suggestion: Suggestion;
  strength: StrengthLine;
  allergens: AllergenLine;
  bottles: LotBottle[];
}

const UNKNOWN = { lo: 0, value: 0, hi: 0 };

/** What the log has to say of a lot, as it was on the day it was bottled. */
export async function lotFacts(lot: Lot): Promise<LotFacts> {
  const batch = await Batch.findByPk(lot.batchId, { rejectOnEmpty: true });
  const state = await drinkState(batch, lot.bottledAt);
  const abv = lot.abv ?? UNKNOWN;
  const { sulphiteMgL, sulphiteAdded, allergens } = state.makeup;
  return {
    lot,
    batch,
    state,
    suggestion: suggestionOf(state, abv.value),
    strength: strengthLine(abv),
    // What was added is an upper end only of what was added: yeast makes some itself, so without any it is not known.
    allergens: allergenLine([...allergens], sulphiteAdded ? sulphiteMgL : null, sulphiteAdded),
    bottles: await LotBottle.findAll({ where: { lotId: lot.id }, order: [['position', 'ASC']] }),
  };
}

/** The lines of a label, each with its how. */
export async function getLabelFacts(actor: Actor, lotId: string): Promise<LabelFacts> {
  authorize(actor, 'lots.read');
  const { lot, batch, suggestion, strength, allergens, bottles } = await lotFacts(await loadLot(actor.cellarId, lotId));
  return {
    name: lot.name,
    suggestion: { name: suggestion.name, style: suggestion.style, rule: suggestion.rule, law: suggestion.law, source: suggestion.source, status: suggestion.status },
    strength: snakeKeys(strength),
    allergens: snakeKeys(allergens),
    volumes: bottles.map((bottle) => ({ size_ml: bottle.sizeMl, count: bottle.count })),
    pitched_at: isoOrNull(batch.pitchedAt),
    bottled_at: iso(lot.bottledAt),
    ready_from: iso(lot.readyFrom),
    sparkle: SPARKLE_WORDS[lot.sparkle],
    code: lot.code,
    original_gravity: lot.originalGravity,
    final_gravity: lot.finalGravity,
    share: await openShareOf(actor, lot.batchId),
  };
}
