import { snakeKeys } from '@/lib/contracts/case';
import type { LotBody, LotSummary } from '@/lib/contracts/lots';
import { howOfHolds } from '@/lib/core/bottling/bottles';
import { drinkPressure } from '@/lib/core/bottling/co2';
import { how } from '@/lib/core/how/how';
import { howOfLotCost, howOfLotGravity, howOfLotStrength } from '@/lib/core/how/lots';
import { practice, SOURCES } from '@/lib/core/how/sources';
import type { LotBottle } from '@/db/models';
import type { LotRow } from '@/db/queries/lots';
import type { KeptBench, KeptCost, KeptPressure } from './kept';
import { LIGHT_FROM, SPARKLING_FROM } from './sparkle';

type Kept = Pick<LotRow, 'originalGravity' | 'finalGravity' | 'volumeL'>;

/** `10 g of table sugar` */
function fizz({ shown: { dose } }: KeptBench): string {
  return dose.way === 'weighed' ? `${dose.total_g.toFixed(0)} g of ${dose.sugar.name}` : dose.way === 'drops' ? `${dose.total_drops} drops` : 'none';
}

/** Where the figures of a row of the book come from. */
export const howOfRow = (row: Kept, bench: KeptBench, cost: KeptCost): LotSummary['how'] => ({
  strength: snakeKeys(howOfLotStrength(row, fizz(bench))),
  cost: snakeKeys(
    howOfLotCost(
      [
        ['from the must sheet', cost.must && Number(cost.must.value.toFixed(2)), ''],
        ['every line of it has a cost', cost.known ? 'yes' : 'no', ''],
        ['bottles, caps and sugar', cost.other, ''],
      ],
      row.volumeL,
    ),
  ),
});

/** Where the figures of a lot come from, as they were kept on the day it was bottled. */
export function howOfLot(row: Kept, bench: KeptBench, cost: KeptCost): LotBody['how'] {
  return {
    ...howOfRow(row, bench, cost),
    gravity: snakeKeys(howOfLotGravity(row)),
    sparkle: snakeKeys(
      how(`sparkling from ${SPARKLING_FROM} volumes of gas, lightly sparkling from ${LIGHT_FROM}, by what was wanted; where nothing was, by what is likely in the bottle`, SOURCES.ownRule, [
        ['wanted', bench.shown.wanted_volumes, 'volumes'],
        ['likely in the bottle', bench.shown.volumes && Number(bench.shown.volumes.value.toFixed(2)), 'volumes'],
      ]),
    ),
    ready: snakeKeys(
      how('with sugar for fizz 14 days at 20 °C, slower in the cold by 2.2 times for 10 °C, never less; still, 7 days. Then as somebody set it', practice('two weeks in the warm, then a cool place'), [
        ['sugar for fizz', fizz(bench), ''],
        ['judged for a cellar of', bench.shown.cellar_c, '°C'],
      ]),
    ),
  };
}

/** Where the pressures of a bottle come from, the gas in it at the two temperatures that the bench judged for, and what it holds. */
export function howOfPressure({ shown, drink }: KeptBench, pressure: KeptPressure, bottle: Pick<LotBottle, 'kind' | 'closure' | 'ratingBar' | 'ratingConfirmed'>): LotBody['bottles'][number]['how'] {
  return {
    cellar: snakeKeys(drinkPressure(pressure.volumes, shown.cellar_c, drink).how),
    warm: snakeKeys(drinkPressure(pressure.volumes, shown.warmest_store_c, drink).how),
    worst: snakeKeys(drinkPressure(pressure.worstVolumes, shown.warmest_store_c, drink).how),
    holds: snakeKeys(howOfHolds({ kind: bottle.kind, closure: bottle.closure, confirmedBar: bottle.ratingConfirmed ? bottle.ratingBar : null })),
  };
}
