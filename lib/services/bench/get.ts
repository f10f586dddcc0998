import { nextCode } from '@/db/queries/lots';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { BenchFacts } from '@/lib/contracts/bench';
import { loadBatch } from '../batches/load';
import { presentDrink } from '../drink/get';
import { drinkState } from '../drink/state';
import { iso } from '../iso';
import { presentDone } from './present';
import { doneCheck, gasOf, hydrometerOf, warmestSinceEnd } from './request';

/** What the log says to the bottling bench: is it done, how strong, what may still ferment, how warm it stood. */
export async function getBench(actor: Actor, batchId: string, clock: Clock = systemClock): Promise<BenchFacts> {
  authorize(actor, 'batches.read');
  const batch = await loadBatch(actor.cellarId, batchId);
  const state = await drinkState(batch, new Date(clock.now()));
  const done = doneCheck(state);
  const gas = gasOf(state, done);
  return {
    batch: { id: batch.id, name: batch.name, kind: batch.kind, drink_colour: batch.drinkColour, vessel_kind: batch.vesselKind, tag: batch.tag, place: batch.place, neck: batch.neck, volume_l: batch.volumeL, vessel_l: batch.vesselL, state: batch.state },
    drink: presentDrink(state),
    done: presentDone(done),
    for_gas: { abv_percent: gas.abvPercent, sugar_g_per_l: gas.sugarGPerL, assumed: gas.assumed },
    readings: hydrometerOf(state).map((reading) => ({ at: iso(reading.at), gravity: reading.gravity })),
    warmest_since_end_c: await warmestSinceEnd(state, done),
    suggested_code: await nextCode(actor.cellarId, state.at),
  };
}
