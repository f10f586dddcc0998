import { z } from 'zod';
import { PROBLEM_KINDS, WAY_KINDS } from '../core/bottling/bench';
import { BOTTLE_KINDS, CLOSURES } from '../core/bottling/bottles';
import { DONE_VERDICTS, EXPLANATIONS, type DoneCheck } from '../core/bottling/done';
import { camelKeys } from './case';
import { id, line, text, timestamp } from './common';
import { drinkSchema } from './family';
import { howSchema, numberFigure, rangeFigure, rangeWithin } from './figures';

const litres = (min: number) => z.number('must be a number of litres').min(min, `must be at least ${min} L`).max(2000, 'must be at most 2000 L');
const celsius = z.number('must be a number').min(0, 'must be between 0 and 40 °C').max(40, 'must be between 0 and 40 °C');

/** Sugars that can be weighed out; a syrup tells its share of sugar. */
export const WEIGHED_SUGARS = ['sucrose', 'glucose', 'glucose_monohydrate', 'fructose', 'honey', 'malt', 'syrup'] as const;

/** Kinds and sizes in one plan: each of the eight kinds in three sizes. */
export const MOST_BOTTLE_ROWS = 24;

export const bottleForm = z.object({
  /** The form's own name for this row. */
  key: z.string().regex(/^[A-Za-z0-9_-]{1,40}$/),
  kind: z.enum(BOTTLE_KINDS, 'choose a bottle'),
  closure: z.enum(CLOSURES, 'choose a closure'),
  size_ml: z.number('must be a number of ml').int().min(50, 'must be at least 50 ml').max(60_000, 'must be at most 60 L'),
  /** What the maker says, bar gauge, read by the person; null: nobody has looked. */
  confirmed_bar: z.number('must be a number of bar').min(0.5, 'must be at least 0.5 bar').max(12, 'must be at most 12 bar').nullable().default(null),
  /** How many there are; null: enough. */
  at_hand: z.number().int().min(0).max(10_000).nullable().default(null),
  /** Sugar drops in each, where drops are used. */
  drops: z.number().int().min(0).max(40).default(0),
});

export const primingForm = z.discriminatedUnion('way', [
  z.object({ way: z.literal('none') }),
  z.object({ way: z.literal('weighed'), sugar: z.enum(WEIGHED_SUGARS, 'choose a sugar'), syrup_share: z.number().gt(0).max(1).nullable().default(null), wanted_volumes: z.number('must be a number of volumes').min(0).max(6, 'must be at most 6 volumes') }).refine((form) => form.sugar !== 'syrup' || form.syrup_share !== null, { path: ['syrup_share'], message: 'how much of the syrup is sugar?' }),
  z.object({ way: z.literal('drops'), grams_each: rangeWithin(0.5, 20) }),
]);
export type PrimingForm = z.infer<typeof primingForm>;

/**
 * What somebody wants to bottle, and into what. The drink, its sugar left and
 * whether it is done are not asked: the server takes them from the log.
 */
export const benchForm = z.object({
  /** What is in the vessel, measured; null: as the log has it. */
  volume_l: litres(0.05).nullable().default(null),
  losses_l: litres(0).default(0),
  bottles: z.array(bottleForm).min(1, 'choose a bottle').max(MOST_BOTTLE_ROWS, `at most ${MOST_BOTTLE_ROWS} kinds and sizes in one plan`).refine((bottles) => new Set(bottles.map((bottle) => bottle.key)).size === bottles.length, 'two rows have the same key'),
  cellar_c: celsius,
  /** The warmest place the bottles will ever stand. */
  warmest_store_c: celsius,
  /** Warmest since it finished. What was measured is used where it is colder, since cold drink holds more gas. */
  warmest_since_end_c: celsius.nullable().default(null),
  priming: primingForm,
});
export type BenchForm = z.infer<typeof benchForm>;

export const doneSchema = z.object({
  verdict: z.enum(DONE_VERDICTS),
  explanation: z.enum(EXPLANATIONS).nullable(),
  gravity: z.number().nullable(),
  remaining: rangeFigure.nullable(),
  stabilised: z.boolean(),
  reasons: z.array(z.string()),
  changes_it: z.string(),
  read_again_at: z.string().nullable(),
  how: howSchema,
});

/** The check as the core's bench takes it, for judging in the browser while somebody types. */
export function doneOf(body: z.infer<typeof doneSchema>): DoneCheck {
  return { ...camelKeys(body), readAgainAt: body.read_again_at === null ? null : Date.parse(body.read_again_at) };
}

/** `GET /api/v1/batches/{id}/bench`: what the log says to the bench. */
export const benchFacts = z.object({
  batch: z.object({ id, name: z.string(), kind: z.string(), drink_colour: z.string(), vessel_kind: z.string(), tag: z.number().nullable(), place: z.string().nullable(), neck: z.string(), volume_l: z.number(), vessel_l: z.number(), state: z.string() }),
  drink: drinkSchema,
  done: doneSchema,
  /** Strength and sugar at their upper ends, for the pressure. */
  for_gas: z.object({ abv_percent: z.number(), sugar_g_per_l: z.number(), /** Nobody measured: the upper end of what it may be. */ assumed: z.boolean() }),
  readings: z.array(z.object({ at: z.string(), gravity: z.number() })),
  /** Highest the sensor measured since the fall ended; null without a sensor. */
  warmest_since_end_c: z.number().nullable(),
  suggested_code: z.string(),
});
export type BenchFacts = z.infer<typeof benchFacts>;

const rating = z.union([z.number(), z.literal('never')]);
const pressure = z.object({ bar: z.number(), celsius: z.number(), how: howSchema });

export const bottlePictureSchema = z.object({
  key: z.string(),
  choice: z.object({ kind: z.enum(BOTTLE_KINDS), closure: z.enum(CLOSURES), size_ml: z.number(), confirmed_bar: z.number().nullable() }),
  holds: z.object({ rating, confirmed: z.boolean(), source: z.string(), status: z.string() }),
  count: z.number().int(),
  volumes: rangeFigure,
  worst_volumes: numberFigure,
  cellar: pressure,
  warm: pressure,
  worst: pressure,
});

const picture = {
  plan: z.object({ filled: z.array(z.object({ key: z.string(), size_ml: z.number(), count: z.number().int() })), bottled_l: z.number(), lost_l: z.number(), over_l: z.number(), bottles: z.number().int() }),
  bottles: z.array(bottlePictureSchema),
  residual: rangeFigure,
  remaining: rangeFigure,
  cautions: z.array(z.string()),
};

export const doseSchema = z.discriminatedUnion('way', [
  z.object({ way: z.literal('none') }),
  z.object({ way: z.literal('weighed'), sugar: z.object({ kind: z.string(), name: z.string() }), g_per_l: z.number(), total_g: z.number(), how: howSchema }),
  z.object({ way: z.literal('drops'), drops: z.array(z.object({ key: z.string(), each: z.number().int() })), total_drops: z.number().int() }),
]);

const problem = z.object({ kind: z.enum(PROBLEM_KINDS), bottle: z.string().nullable(), sentence: z.string(), overridable: z.boolean() });

/** A stop has no dose in its schema: whatever the code would put there is cut off here. */
export const benchVerdictSchema = z.discriminatedUnion('verdict', [
  z.object({ ...picture, verdict: z.literal('safe'), headline: z.string(), sentence: z.string(), dose: doseSchema, abv_added_percent: z.number() }),
  z.object({
    ...picture,
    verdict: z.literal('stop'),
    headline: z.string(),
    sentence: z.string(),
    problems: z.array(problem),
    ways: z.array(
      z.object({
        kind: z.enum(WAY_KINDS),
        title: z.string(),
        sentence: z.string(),
        worst_bar: z.number(),
        rated: rating,
        /** What to change on the form; null where something else has to happen first. */
        change: z.object({ bottles: z.array(bottleForm), priming: primingForm }).nullable(),
      }),
    ),
  }),
]);
export type BenchVerdictBody = z.infer<typeof benchVerdictSchema>;

/** `POST /api/v1/batches/{id}/bottle`. */
export const bottleBatchForm = benchForm.extend({
  at: timestamp,
  /** On the label and the lot; unique in the cellar. */
  code: line(20).nullable().default(null),
  name: line(80).nullable().default(null),
  place_id: id.nullable().default(null),
  /** What is left in the vessel: nothing, or the batch goes on. */
  ends_batch: z.boolean().default(true),
  /** Bottles, caps, sugar: what this bottling cost beside the must. */
  other_cost: z.number().min(0).max(100_000).nullable().default(null),
  /** Why the stop is put aside; stays on the lot for good. */
  override_reason: text(1000).nullable().default(null),
  /** Made by the sender, so that sending twice makes one lot. */
  client_id: z.uuid().nullable().default(null),
});
export type BottleBatchForm = z.infer<typeof bottleBatchForm>;
