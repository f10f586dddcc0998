import type { z } from 'zod';
import type { lotSchema } from '@/lib/contracts/lots';
import type { DrinkForGas } from '@/lib/core/bottling/co2';
import type { Range } from '@/lib/core/units/range';

/** What a lot keeps of the bench for good, as the wire has it, and what its pressure elsewhere is reckoned from. */
export interface KeptBench {
  shown: z.infer<typeof lotSchema>['bench'];
  /** Priming counted in, upper ends. */
  drink: DrinkForGas;
}

/** What a kind of bottle keeps: upper ends. */
export interface KeptPressure {
  volumes: number;
  worstVolumes: number;
  cellarBar: number;
  warmBar: number;
  worstBar: number;
}

export interface KeptCost {
  /** Part of the must sheet's cost that is in these bottles. */
  must: Range | null;
  /** Every line has its cost, and nothing else was blended in. */
  known: boolean;
  other: number | null;
}

export const keptBench = (bench: unknown): KeptBench => bench as KeptBench;
export const keptPressure = (pressure: unknown): KeptPressure => pressure as KeptPressure;
export const keptCost = (cost: unknown): KeptCost => ({ must: null, known: false, other: null, ...(cost as Partial<KeptCost>) });

/** All that these bottles cost; null where nothing is known. */
export function totalCost(cost: KeptCost): Range | null {
  // A sheet without a single price is no cost of nought.
  if ((cost.must === null || (!cost.known && cost.must.hi === 0)) && cost.other === null) return null;
  const other = cost.other ?? 0;
  const must = cost.must ?? { lo: 0, value: 0, hi: 0 };
  return { lo: must.lo + other, value: must.value + other, hi: must.hi + other };
}
