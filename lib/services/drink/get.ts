import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import { snakeKeys } from '@/lib/contracts/case';
import type { DrinkBody } from '@/lib/contracts/family';
import { loadBatch } from '../batches/load';
import { iso, isoOrNull } from '../iso';
import { drinkState, lastFedAt, lastMeasured, type DrinkState } from './state';

const measured = (found: { value: number; at: Date } | null) => found && { value: found.value, at: iso(found.at) };

export function presentDrink(state: DrinkState): DrinkBody {
  const { batch, ledger, makeup, entries } = state;
  return {
    batch_id: batch.id,
    at: iso(state.at),
    volume_l: batch.volumeL,
    original_gravity: batch.originalGravity,
    effective_og: ledger.effectiveOg,
    gravity: state.gravity,
    gravity_at: isoOrNull(state.gravityAt),
    gravity_by: state.gravityBy,
    temperature_c: state.temperatureC,
    strength: state.strength && snakeKeys(state.strength),
    expected_final: state.expectedFinal,
    ph: measured(lastMeasured(entries, 'ph')),
    titratable_acid_g_per_l: measured(lastMeasured(entries, 'titratable_acid_g_per_l')),
    free_sulphite_mg_l: measured(lastMeasured(entries, 'free_sulphite_mg_l')),
    total_sulphite_mg_l: makeup.sulphiteMgL,
    sulphite_added: makeup.sulphiteAdded,
    nitrogen: { needed_mg_l: makeup.nitrogen.neededMgL, given_mg_l: makeup.nitrogen.givenMgL, given_dap_g: makeup.nitrogen.dapG, given_complex_g: makeup.nitrogen.complexG, last_fed_at: isoOrNull(lastFedAt(entries)) },
    stabilised: makeup.stabilised,
    diastatic: makeup.diastatic,
    unfermentable_points: makeup.unfermentable.must + makeup.unfermentable.added,
    allergens: [...makeup.allergens],
    last_addition_at: isoOrNull(ledger.lastAdditionAt),
  };
}

/** What is in the vessel by the log, for additions, the bench and the family. */
export async function getDrink(actor: Actor, batchId: string, clock: Clock = systemClock): Promise<DrinkBody> {
  authorize(actor, 'batches.read');
  return presentDrink(await drinkState(await loadBatch(actor.cellarId, batchId), new Date(clock.now())));
}
