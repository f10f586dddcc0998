import { z } from 'zod';
import { BOTTLE_KINDS, CLOSURES } from '../core/bottling/bottles';
import { DRINK_KINDS } from '../core/types';
import { doseSchema } from './bench';
import { id, line, text, timestamp } from './common';
import { howSchema, rangeSchema } from './figures';
import { nextTimeSchema } from './musts';
import { tastingSummary } from './tastings';

export const OPENING_KINDS = ['opened', 'given', 'broken', 'gushed'] as const;
export const LOT_SPARKLES = ['still', 'light', 'sparkling'] as const;

export const placeForm = z.object({
  name: line(60),
  /** Bottles it holds; null: as many as there are. */
  capacity: z.number().int('must be a whole number').min(1, 'must be at least 1').max(100_000).nullable().default(null),
  /** Warmest it gets, °C. */
  temperature_c: z.number('must be a number').min(-5, 'must be between -5 and 45 °C').max(45, 'must be between -5 and 45 °C').nullable().default(null),
});
export type PlaceForm = z.infer<typeof placeForm>;
export const updatePlaceForm = z.object({ name: placeForm.shape.name.optional(), capacity: placeForm.shape.capacity.unwrap().optional(), temperature_c: placeForm.shape.temperature_c.unwrap().optional() });
export type UpdatePlaceForm = z.infer<typeof updatePlaceForm>;
export const placeSchema = z.object({ id, name: z.string(), capacity: z.number().nullable(), temperature_c: z.number().nullable(), bottles: z.number().int(), lots: z.number().int() });
export type PlaceBody = z.infer<typeof placeSchema>;
export const placeList = z.object({ items: z.array(placeSchema) });

const who = z.object({ id, name: z.string() }).nullable();
const placeName = z.object({ id, name: z.string() }).nullable();

export const lotBottleSchema = z.object({
  id,
  kind: z.enum(BOTTLE_KINDS),
  closure: z.enum(CLOSURES),
  size_ml: z.number(),
  /** What it is rated for, bar gauge; `never` for glass that stays still. */
  rating: z.union([z.number(), z.literal('never')]),
  rating_confirmed: z.boolean(),
  /** Upper ends as the bench had them, bar gauge. */
  cellar_bar: z.number(),
  warm_bar: z.number(),
  worst_bar: z.number(),
  how: z.object({ cellar: howSchema, warm: howSchema, worst: howSchema, holds: howSchema }),
  bottled: z.number().int(),
  left: z.number().int(),
  stands: z.array(z.object({ place: placeName, count: z.number().int() })),
  cost_each: rangeSchema.nullable(),
});

export const openingSchema = z.object({ id, at: z.string(), kind: z.enum(OPENING_KINDS), bottle_id: id, size_ml: z.number(), count: z.number().int(), to: z.string().nullable(), note: z.string().nullable(), place: placeName, by: who });

const lotFields = {
  id,
  code: z.string(),
  name: z.string(),
  batch: z.object({ id, name: z.string(), kind: z.enum(DRINK_KINDS), drink_colour: z.string() }),
  bottled_at: z.string(),
  ready_from: z.string(),
  ready: z.boolean(),
  sparkle: z.enum(LOT_SPARKLES),
  volume_l: z.number(),
  original_gravity: z.number().nullable(),
  final_gravity: z.number().nullable(),
  /** By Balling, priming counted, % vol. */
  abv_percent: rangeSchema.nullable(),
  counts: z.object({ bottled: z.number().int(), left: z.number().int(), opened: z.number().int(), given: z.number().int(), broken: z.number().int(), gushed: z.number().int() }),
  places: z.array(z.string()),
  /** Set by a bottle that gushed, or by a stop that was put aside. */
  caution: z.string().nullable(),
  overridden: z.boolean(),
  cost_per_litre: rangeSchema.nullable(),
  /** False where part of it was never told: it cost that or more. */
  cost_known: z.boolean(),
  tastings: tastingSummary,
  how: z.object({ strength: howSchema, cost: howSchema }),
};

export const lotSummary = z.object(lotFields);
export type LotSummary = z.infer<typeof lotSummary>;

export const lotSchema = z.object({
  ...lotFields,
  bottles: z.array(lotBottleSchema),
  openings: z.array(openingSchema),
  /** A reason: they went against a stop, and why. */
  moves: z.array(z.object({ at: z.string(), from: placeName, to: placeName, size_ml: z.number(), count: z.number().int(), by: who, override_reason: z.string().nullable() })),
  /** Cautions that a brewer took off again, newest first. */
  lifted: z.array(z.object({ caution: z.string(), reason: z.string(), by: who, at: z.string() })),
  bench: z.object({
    verdict: z.enum(['safe', 'overridden']),
    headline: z.string(),
    problems: z.array(z.string()),
    cellar_c: z.number(),
    /** The bottles may stand no warmer than this. */
    warmest_store_c: z.number(),
    worst_bar: z.number(),
    volumes: rangeSchema.nullable(),
    wanted_volumes: z.number().nullable(),
    dose: doseSchema,
    cautions: z.array(z.string()),
  }),
  /** Whoever put a stop aside, and why. */
  override: z.object({ reason: z.string(), by: who, at: z.string() }).nullable(),
  /** What is written on the lot and on its tastings, newest first. */
  next_time: z.array(nextTimeSchema),
  /** What is written on the lot itself. */
  own_next_time: z.string().nullable(),
  note: z.string().nullable(),
  how: lotFields.how.extend({ gravity: howSchema, sparkle: howSchema, ready: howSchema }),
  cost: z.object({ total: rangeSchema.nullable(), known: z.boolean(), other: z.number().nullable() }),
});
export type LotBody = z.infer<typeof lotSchema>;

export const lotList = z.object({ items: z.array(lotSummary), next_cursor: z.string().nullable() });
export type LotList = z.infer<typeof lotList>;

export const LOT_SORTS = ['bottled', 'ready', 'name', 'left', 'abv', 'score'] as const;
export const lotQuery = z.object({
  q: z.string().max(80).optional(),
  kind: z.enum(DRINK_KINDS).optional(),
  place: id.optional(),
  batch: id.optional(),
  /** `cellared`: some are left. `empty`: none. `ready`: may be opened. `caution`: with a caution on it. */
  state: z.enum(['all', 'cellared', 'ready', 'empty', 'caution']).default('all'),
  sort: z.enum(LOT_SORTS).default('bottled'),
  order: z.enum(['asc', 'desc']).default('desc'),
  cursor: z.string().max(200).optional(),
  limit: z.coerce.number().int().min(1).max(200).default(50),
});
export type LotQuery = z.infer<typeof lotQuery>;

export const updateLot = z.object({
  name: line(80).optional(),
  code: line(20).optional(),
  note: text(2000).nullable().optional(),
  ready_from: timestamp.optional(),
  /** What to do otherwise next time; it goes along when the must sheet is copied. */
  next_time: text(500).nullable().optional(),
});
export type UpdateLot = z.infer<typeof updateLot>;

/** `POST /api/v1/lots/{id}/lift-caution`. */
export const liftCaution = z.object({ /** Why it is no longer needed; stays in the lot's history. */ reason: text(1000) });
export type LiftCaution = z.infer<typeof liftCaution>;

const bottles = z.number('must be a number of bottles').int('must be whole bottles').min(1, 'must be at least 1').max(10_000);

export const moveBottles = z.object({
  bottle_id: id,
  from_place_id: id.nullable(),
  to_place_id: id.nullable(),
  count: bottles,
  /** Needed where the place is warmer than the bottles were reckoned for, and they do not hold it. */
  override_reason: text(1000).nullable().default(null),
});
export type MoveBottles = z.infer<typeof moveBottles>;

export const openBottles = z.object({
  at: timestamp,
  kind: z.enum(OPENING_KINDS, 'choose what became of it'),
  bottle_id: id,
  /** Where it stood. */
  place_id: id.nullable(),
  count: bottles.default(1),
  /** Whom it was given to. */
  to: line(80).nullable().default(null),
  note: text(500).nullable().default(null),
  client_id: z.uuid().nullable().default(null),
});
export type OpenBottles = z.infer<typeof openBottles>;
