import type { LotBottle } from '@/db/models';
import type { LiftedRow, LotRow, MoveRow, OpeningRow, StandRow } from '@/db/queries/lots';
import type { NextTimeRow } from '@/db/queries/musts';
import type { LotBody, LotSummary } from '@/lib/contracts/lots';
import { times } from '@/lib/core/units/range';
import { iso } from '../iso';
import { presentNextTime } from '../musts/get';
import { summaryOf } from '../tastings/summary';
import { howOfLot, howOfPressure, howOfRow } from './how';
import { keptBench, keptCost, keptPressure, totalCost } from './kept';

export function presentLot(row: LotRow, now: number): LotSummary {
  const cost = keptCost(row.cost);
  const total = totalCost(cost);
  return {
    id: row.id,
    code: row.code,
    name: row.name,
    batch: { id: row.batch.id, name: row.batch.name, kind: row.batch.kind, drink_colour: row.batch.drinkColour },
    bottled_at: iso(row.bottledAt),
    ready_from: iso(row.readyFrom),
    ready: row.readyFrom.getTime() <= now,
    sparkle: row.sparkle,
    volume_l: row.volumeL,
    original_gravity: row.originalGravity,
    final_gravity: row.finalGravity,
    abv_percent: row.abv,
    counts: { bottled: row.bottled, left: row.left, opened: row.opened, given: row.given, broken: row.broken, gushed: row.gushed },
    places: row.places,
    caution: row.caution,
    overridden: row.overrideReason !== null,
    cost_per_litre: total && times(total, 1 / row.volumeL),
    cost_known: cost.known,
    tastings: summaryOf(row.tastings),
    how: howOfRow(row, keptBench(row.bench), cost),
  };
}

export interface LotParts {
  bottles: readonly LotBottle[];
  stands: readonly StandRow[];
  openings: readonly OpeningRow[];
  moves: readonly MoveRow[];
  lifted: readonly LiftedRow[];
  nextTime: readonly NextTimeRow[];
}

export function presentWhole(row: LotRow, parts: LotParts, now: number): LotBody {
  const summary = presentLot(row, now);
  const cost = keptCost(row.cost);
  const bench = keptBench(row.bench);
  return {
    ...summary,
    bottles: parts.bottles.map((bottle) => {
      const stands = parts.stands.filter((stand) => stand.lotBottleId === bottle.id).map(({ place, count }) => ({ place, count }));
      const pressure = keptPressure(bottle.pressure);
      return {
        id: bottle.id,
        kind: bottle.kind,
        closure: bottle.closure,
        size_ml: bottle.sizeMl,
        rating: bottle.ratingBar ?? 'never',
        rating_confirmed: bottle.ratingConfirmed,
        cellar_bar: pressure.cellarBar,
        warm_bar: pressure.warmBar,
        worst_bar: pressure.worstBar,
        how: howOfPressure(bench, pressure, bottle),
        bottled: bottle.count,
        left: stands.reduce((sum, stand) => sum + stand.count, 0),
        stands,
        cost_each: summary.cost_per_litre && times(summary.cost_per_litre, bottle.sizeMl / 1000),
      };
    }),
    openings: parts.openings.map((opening) => ({ id: opening.id, at: iso(opening.at), kind: opening.kind, bottle_id: opening.lotBottleId, size_ml: opening.sizeMl, count: opening.count, to: opening.to, note: opening.note, place: opening.place, by: opening.by })),
    moves: parts.moves.map((move) => ({ at: iso(move.at), from: move.from, to: move.to, size_ml: move.sizeMl, count: move.count, by: move.by, override_reason: move.overrideReason })),
    lifted: parts.lifted.map((lift) => ({ caution: lift.caution, reason: lift.reason, by: lift.by, at: iso(lift.at) })),
    bench: bench.shown,
    override: row.overrideReason === null || row.overrideAt === null ? null : { reason: row.overrideReason, by: row.overrideBy, at: iso(row.overrideAt) },
    next_time: parts.nextTime.map(presentNextTime),
    own_next_time: row.nextTime,
    note: row.note,
    how: howOfLot(row, bench, cost),
    cost: { total: totalCost(cost), known: cost.known, other: cost.other },
  };
}
