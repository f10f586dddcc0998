import type { LotBottle, Place } from '@/db/models';
import { drinkPressure } from '@/lib/core/bottling/co2';
import { ratedBar, STILL_LIMIT_BAR } from '@/lib/core/bottling/judge';
import { roundUp } from '@/lib/core/units/rounding';
import { keptPressure, type KeptBench } from './kept';

/** The pressure methods end here, °C; bottles have no business anywhere warmer. */
const WARMEST_C = 40;

export interface TooWarm {
  sentence: string;
  /** Whether a brewer's written reason may put it aside. */
  overridable: boolean;
}

/** Whether bottles that were judged for one warmest place may stand in another; null where they may. */
export function tooWarm(bench: KeptBench, bottle: Pick<LotBottle, 'pressure' | 'ratingBar'>, place: Pick<Place, 'name' | 'temperatureC'>): TooWarm | null {
  const celsius = place.temperatureC;
  if (celsius === null || celsius <= bench.shown.warmest_store_c) return null;
  if (celsius > WARMEST_C) return { sentence: `${place.name} gets ${celsius} °C. No bottle stands over ${WARMEST_C} °C.`, overridable: false };
  const { worstVolumes } = keptPressure(bottle.pressure);
  const bar = roundUp(Math.max(0, drinkPressure(worstVolumes, Math.max(0, celsius), bench.drink).gaugeBar), 0.1);
  const limit = bottle.ratingBar === null ? STILL_LIMIT_BAR : ratedBar(bottle.ratingBar);
  if (bar <= limit) return null;
  return { sentence: `At ${celsius} °C these bottles may reach ${bar.toFixed(1)} bar; ${bottle.ratingBar === null ? `still drink stays under ${limit.toFixed(1)}` : `they are rated for ${limit.toFixed(1)}`}.`, overridable: bottle.ratingBar !== null };
}
