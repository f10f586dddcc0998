import type { BenchBottle, BenchRequest } from '@/lib/core/bottling/bench';
import type { BottleKind, Closure } from '@/lib/core/bottling/bottles';
import { checkDone, type DoneInput } from '@/lib/core/bottling/done';
import { drinkForGas } from '@/lib/core/bottling/drink';
import { primingSugar } from '@/lib/core/bottling/priming';

export const DAY = 86_400_000;
export const NOW = Date.UTC(2031, 9, 15, 12);

/** A cider eight weeks old, two equal readings a week apart, float at rest, inside its expected range. */
export function doneInput(over: Partial<DoneInput> = {}): DoneInput {
  return {
    kind: 'cider',
    at: NOW,
    pitchedAt: NOW - 56 * DAY,
    originalGravity: 1.05,
    hydrometer: [
      { at: NOW - 8 * DAY, gravity: 1.0 },
      { at: NOW - 0.5 * DAY, gravity: 1.0 },
    ],
    floatRate: { lo: -0.1, value: 0, hi: 0.2 },
    expectedFinal: { lo: 0.9995, value: 1.0, hi: 1.003 },
    toleranceAbv: 12,
    diastatic: false,
    stabilised: false,
    unfermentablePoints: 0,
    lastAdditionAt: null,
    ...over,
  };
}

export function bottle(kind: BottleKind, closure: Closure, sizeMl: number, confirmedBar: number | null, atHand: number | null = null): BenchBottle {
  return { key: `${kind}-${sizeMl}`, choice: { kind, closure, sizeMl, confirmedBar }, atHand };
}

/** 4.2 L of that cider for beer bottles of a confirmed 4 bar, primed to 2.4 volumes. */
export function benchRequest(over: Partial<BenchRequest> = {}, done: Partial<DoneInput> = {}): BenchRequest {
  const input = doneInput(done);
  const last = input.hydrometer.at(-1)?.gravity ?? 1.0;
  return {
    volumeL: 4.2,
    lossesL: 0.2,
    bottles: [bottle('beer', 'crown_26', 500, 4)],
    drink: drinkForGas(input.originalGravity ?? 1.05, last),
    done: checkDone(input),
    warmestSinceEndC: 18,
    cellarC: 12,
    warmestStoreC: 25,
    priming: { way: 'weighed', sugar: primingSugar('sucrose'), wantedVolumes: 2.4 },
    ...over,
  };
}
