import type { Transaction } from 'sequelize';
import { warmestSince } from '@/db/queries/warmest';
import type { BenchForm, PrimingForm } from '@/lib/contracts/bench';
import type { BenchRequest, Priming } from '@/lib/core/bottling/bench';
import { checkDone, type DoneCheck } from '@/lib/core/bottling/done';
import { drinkForGas } from '@/lib/core/bottling/drink';
import type { DrinkForGas } from '@/lib/core/bottling/co2';
import { primingSugar, syrup } from '@/lib/core/bottling/priming';
import { kindByMust } from '@/lib/core/naming/makeup';
import { pointsOf } from '@/lib/core/units/convert';
import { InvalidError } from '@/lib/errors';
import { detailOf } from '../drink/ledger';
import type { DrinkState } from '../drink/state';
import { sheetOf } from '../musts/sheet';

const HOUR = 3_600_000;
/** A float's rate of fall says nothing when it is older. */
const FLOAT_FRESH_MS = 36 * HOUR;
/** Where nobody told the original gravity: the upper end of what yeast makes, and sugar as if every point were sugar, g/L. */
const UNKNOWN = { abvPercent: 15, sugarPerPoint: 2.59 } as const;
const SLACK_L = 1e-6;

/** Readings by hydrometer alone: a refractometer in a drink with alcohol is never good enough to bottle by. */
export const hydrometerOf = (state: DrinkState) => state.entries.filter((entry) => entry.kind === 'reading' && entry.gravity !== null && detailOf(entry).instrument !== 'refractometer').map((entry) => ({ at: entry.at.getTime(), gravity: entry.gravity! }));

/** Is it done? From the readings, the float, the additions and what yeast and must promise. */
export function doneCheck(state: DrinkState): DoneCheck {
  const { batch, at, ledger, makeup, assessment } = state;
  const floatAt = assessment?.last_reading_at ? Date.parse(assessment.last_reading_at) : null;
  const fresh = floatAt !== null && at.getTime() - floatAt < FLOAT_FRESH_MS;
  const sheet = state.stories.of.get(batch.id)?.sheet ?? null;
  return checkDone({
    // A name must not widen what counts as done.
    kind: sheet ? kindByMust(batch.kind, sheetOf(sheet).lines) : batch.kind,
    at: at.getTime(),
    pitchedAt: batch.pitchedAt?.getTime() ?? null,
    originalGravity: ledger.effectiveOg,
    hydrometer: hydrometerOf(state),
    floatRate: fresh ? (assessment?.rate_points_per_day ?? null) : null,
    expectedFinal: state.expectedFinal,
    toleranceAbv: batch.alcoholToleranceAbv,
    diastatic: makeup.diastatic,
    stabilised: makeup.stabilised,
    unfermentablePoints: makeup.unfermentable.must + makeup.unfermentable.added,
    lastAdditionAt: ledger.lastAdditionAt?.getTime() ?? null,
  });
}

/** Strength and sugar for the pressure; where they are not known, their upper ends. */
export function gasOf(state: DrinkState, done: DoneCheck): DrinkForGas & { assumed: boolean } {
  const og = state.ledger.effectiveOg;
  const gravity = done.gravity ?? state.gravity;
  if (og !== null && gravity !== null) return { ...drinkForGas(Math.max(og, gravity), gravity), assumed: false };
  return { abvPercent: UNKNOWN.abvPercent, sugarGPerL: Math.max(0, pointsOf(gravity ?? og ?? 1) * UNKNOWN.sugarPerPoint), assumed: true };
}

/** Highest the sensor measured since the fall ended; null where none was there. */
export async function warmestSinceEnd(state: DrinkState, done: DoneCheck, transaction?: Transaction): Promise<number | null> {
  // The readings that agree tell since when it stands still; before the first of them it may still have worked.
  const readings = hydrometerOf(state);
  const standing = readings.filter((reading) => done.gravity !== null && Math.abs(reading.gravity - done.gravity) <= 0.001 + 1e-9);
  const from = standing[0]?.at ?? state.at.getTime();
  return warmestSince(state.batch.id, new Date(from), state.at, transaction);
}

function primingOf(form: PrimingForm, bottles: BenchForm['bottles']): Priming {
  switch (form.way) {
    case 'none':
      return { way: 'none' };
    case 'weighed':
      return { way: 'weighed', sugar: form.sugar === 'syrup' ? syrup(form.syrup_share ?? 1) : primingSugar(form.sugar), wantedVolumes: form.wanted_volumes };
    case 'drops':
      return { way: 'drops', gramsEach: form.grams_each, drops: Object.fromEntries(bottles.map((bottle) => [bottle.key, bottle.drops])) };
  }
}

export interface AskedBench {
  request: BenchRequest;
  done: DoneCheck;
  gas: DrinkForGas & { assumed: boolean };
  warmestMeasuredC: number | null;
}

/**
 * The bench's request from a form: of the drink, what is left in it and whether
 * it is done, the form is not believed; all of that comes from the log.
 */
export async function benchRequest(state: DrinkState, form: BenchForm, transaction?: Transaction): Promise<AskedBench> {
  const { batch } = state;
  const volumeL = form.volume_l ?? batch.volumeL;
  if (volumeL > batch.vesselL + SLACK_L) throw new InvalidError('There cannot be that much in it.', { volume_l: [`the vessel holds ${batch.vesselL} L`] });
  if (form.losses_l > volumeL) throw new InvalidError('More is lost than there is.', { losses_l: [`must be at most ${volumeL} L`] });
  if (form.warmest_store_c < form.cellar_c) throw new InvalidError('The warmest place is warmer than the cellar.', { warmest_store_c: [`must be at least ${form.cellar_c} °C`] });
  const done = doneCheck(state);
  const gas = gasOf(state, done);
  const measured = await warmestSinceEnd(state, done, transaction);
  const told = form.warmest_since_end_c;
  if (measured === null && told === null) throw new InvalidError('Gas that is already there is not known.', { warmest_since_end_c: ['how warm was it at most since it finished?'] });
  // Cold drink holds more gas: of two figures the colder one is the safe one.
  const warmest = Math.min(40, Math.max(0, Math.min(measured ?? Infinity, told ?? Infinity)));
  return {
    done,
    gas,
    warmestMeasuredC: measured,
    request: {
      volumeL,
      lossesL: form.losses_l,
      bottles: form.bottles.map((bottle) => ({ key: bottle.key, choice: { kind: bottle.kind, closure: bottle.closure, sizeMl: bottle.size_ml, confirmedBar: bottle.confirmed_bar }, atHand: bottle.at_hand })),
      drink: { abvPercent: Math.min(30, gas.abvPercent), sugarGPerL: Math.min(400, gas.sugarGPerL) },
      done,
      warmestSinceEndC: warmest,
      cellarC: form.cellar_c,
      warmestStoreC: form.warmest_store_c,
      priming: primingOf(form.priming, form.bottles),
    },
  };
}
