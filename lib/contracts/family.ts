import { z } from 'zod';
import { NECKS } from '../core/types';
import { batchSchema, DRINK_COLOURS, entrySchema, VESSEL_KINDS } from './batches';
import { gravity, id, line, text, timestamp } from './common';
import { howSchema, rangeSchema, strengthSchema } from './figures';

const litres = (min: number) => z.number('must be a number of litres').min(min, `must be at least ${min} L`).max(2000, 'must be at most 2000 L');
const grams = z.number('must be a number of grams').min(0, 'must not be negative').max(200_000);

/** `GET /api/v1/batches/{id}/drink`: what is in the vessel by the log, for additions, the bench and the family. */
export const drinkSchema = z.object({
  batch_id: id,
  at: z.string(),
  volume_l: z.number(),
  /** As read at the pitch, SG. */
  original_gravity: z.number().nullable(),
  /** With all the sugar that went in since. */
  effective_og: z.number().nullable(),
  gravity: z.number().nullable(),
  gravity_at: z.string().nullable(),
  gravity_by: z.enum(['hydrometer', 'refractometer', 'float']).nullable(),
  temperature_c: z.number().nullable(),
  strength: strengthSchema.nullable(),
  /** Where the fall should end, SG. */
  expected_final: rangeSchema.nullable(),
  ph: z.object({ value: z.number(), at: z.string() }).nullable(),
  titratable_acid_g_per_l: z.object({ value: z.number(), at: z.string() }).nullable(),
  free_sulphite_mg_l: z.object({ value: z.number(), at: z.string() }).nullable(),
  /** All that was ever added, with what the must brought, mg/L. */
  total_sulphite_mg_l: rangeSchema,
  sulphite_added: z.boolean(),
  nitrogen: z.object({ needed_mg_l: z.number().nullable(), given_mg_l: z.number(), given_dap_g: z.number(), given_complex_g: z.number(), /** When nutrient went in last. */ last_fed_at: z.string().nullable() }),
  stabilised: z.boolean(),
  diastatic: z.boolean(),
  unfermentable_points: z.number(),
  allergens: z.array(z.string()),
  last_addition_at: z.string().nullable(),
});
export type DrinkBody = z.infer<typeof drinkSchema>;

/** What a vessel is topped up with. */
export const topUpForm = z
  .object({
    what: z.enum(['water', 'must', 'drink', 'batch'], 'choose what went in'),
    volume_l: litres(0.001),
    /** Of juice, must or a drink from elsewhere, SG. */
    gravity: gravity.nullable().default(null),
    /** Of a drink from elsewhere, SG. */
    original_gravity: gravity.nullable().default(null),
    /** A batch of this cellar that it comes from. */
    batch_id: id.nullable().default(null),
  })
  .superRefine((value, context) => {
    const need = (path: string, message: string) => context.addIssue({ code: 'custom', path: [path], message });
    if (value.what === 'must' && value.gravity === null) need('gravity', 'is needed: how much sugar does it bring?');
    if (value.what === 'drink' && value.gravity === null) need('gravity', 'is needed for a drink from elsewhere');
    if (value.what === 'drink' && value.original_gravity === null) need('original_gravity', 'is needed for a drink from elsewhere');
    if (value.what === 'batch' && value.batch_id === null) need('batch_id', 'choose the batch it comes from');
  });
export type TopUpForm = z.infer<typeof topUpForm>;

const vessel = {
  vessel_kind: z.enum(VESSEL_KINDS, 'choose a vessel'),
  vessel_l: litres(0.1),
  tag: z.number().int().min(1, 'must be 1 to 999').max(999, 'must be 1 to 999').nullable(),
  place: line(80).nullable(),
  neck: z.enum(NECKS, 'choose what closes the neck'),
};

const happened = { at: timestamp, text: text(2000).nullable().default(null), client_id: z.uuid().nullable().default(null) };

/** `POST /api/v1/batches/{id}/rack`. */
export const rackForm = z.object({
  ...happened,
  /** Left on the lees and in the hose. */
  left_l: litres(0),
  /** The vessel it went into; what is not told stays as it was. */
  vessel: z.object(vessel).partial().default({}),
  top_up: z.array(topUpForm).max(4).default([]),
  /** Potassium metabisulphite that went in with it, g. */
  sulphite_g: grams.nullable().default(null),
});
export type RackForm = z.infer<typeof rackForm>;

/** `POST /api/v1/batches/{id}/top-up`. */
export const topUpBatchForm = z.object({ ...happened, top_up: topUpForm });
export type TopUpBatchForm = z.infer<typeof topUpBatchForm>;

const readout = z.object({ volume_l: z.number(), effective_og: z.number(), gravity: z.number(), abv_percent: z.number() });

/** What a racking or a top-up did, by conserved masses; null where the batch has no gravity to reckon from. */
export const movedSchema = z.object({
  entries: z.array(entrySchema),
  batch: batchSchema,
  effect: z.object({ before: readout, after: readout, gravity_change_points: z.number(), abv_change_percent: z.number(), cautions: z.array(z.string()), how: howSchema }).nullable(),
});
export type MovedBody = z.infer<typeof movedSchema>;

const newVesselFields = { name: line(80), ...vessel, tag: vessel.tag.default(null), place: vessel.place.default(null), neck: vessel.neck.default('airlock'), vessel_kind: vessel.vessel_kind.default('demijohn') };

/** A vessel that part of a batch goes into. */
const newVessel = z
  .object({ ...newVesselFields, volume_l: litres(0.1) })
  .refine((part) => part.volume_l <= part.vessel_l, { path: ['volume_l'], message: 'is more than the vessel holds' });

/** `POST /api/v1/batches/{id}/split`: parts go into vessels of their own; what is not taken stays. */
export const splitForm = z.object({ ...happened, parts: z.array(newVessel).min(1, 'say what goes where').max(8), /** Lost on the way. */ lost_l: litres(0).default(0) });
export type SplitForm = z.infer<typeof splitForm>;
export const splitResult = z.object({ batch: batchSchema, parts: z.array(batchSchema) });

/** `POST /api/v1/blends`: from several batches into one that is there, or into a new one. */
export const blendForm = z
  .object({
    ...happened,
    parts: z.array(z.object({ batch_id: id, volume_l: litres(0.01) })).min(1, 'say what goes in').max(12),
    into_batch_id: id.nullable().default(null),
    into: z.object({ ...newVesselFields, drink_colour: z.union([z.enum(DRINK_COLOURS), z.string().regex(/^#[0-9a-fA-F]{6}$/)]).default('gold') }).nullable().default(null),
  })
  .superRefine((value, context) => {
    const tell = (path: string, message: string) => context.addIssue({ code: 'custom', path: [path], message });
    if ((value.into_batch_id === null) === (value.into === null)) tell('into', 'choose a batch that is there, or name a new one');
    if (value.into !== null && value.parts.length < 2) tell('parts', 'a blend has at least two parts');
    if (new Set(value.parts.map((part) => part.batch_id)).size !== value.parts.length) tell('parts', 'a batch is named twice');
    if (value.parts.some((part) => part.batch_id === value.into_batch_id)) tell('parts', 'a batch cannot be blended into itself');
  });
export type BlendForm = z.infer<typeof blendForm>;
/** `how` is null where it had been done before: what went in is reckoned only as it is poured. */
export const blendResult = z.object({ batch: batchSchema, reading: readout.nullable(), how: howSchema.nullable() });

/** `GET /api/v1/batches/{id}/family`. */
export const familySchema = z.object({
  batches: z.array(batchSchema.pick({ id: true, name: true, kind: true, drink_colour: true, vessel_kind: true, tag: true, volume_l: true, vessel_l: true, neck: true, state: true, pitched_at: true, original_gravity: true })),
  links: z.array(z.object({ from: id, to: id, kind: z.enum(['split', 'blend', 'top_up']), litres: z.number(), at: z.string() })),
  /** Shares of the batches that this one comes from, 0 to 1, largest first. */
  ancestry: z.array(z.object({ batch: id, share: z.number() })),
  /** Lots bottled from any of them. */
  lots: z.array(z.object({ id, batch_id: id, code: z.string(), name: z.string() })),
});
export type FamilyBody = z.infer<typeof familySchema>;

/** `POST /api/v1/batches/{id}/finings`: the first dose. A two-part fining starts its timer. */
export const finingForm = z.object({
  ...happened,
  fining: z.string().regex(/^[a-z0-9-]{1,40}$/, 'choose a fining'),
  /** As it was measured: `a teaspoon`, `2 g`. */
  dose: line(60).nullable().default(null),
  /** The packet's, where it differs from the usual. */
  interval_min: z.number().int().min(1).max(10_080).nullable().default(null),
  settle_days: z.number().min(0.5).max(90).nullable().default(null),
});
export type FiningForm = z.infer<typeof finingForm>;
export const secondDoseForm = z.object({ ...happened, dose: line(60).nullable().default(null) });
export type SecondDoseForm = z.infer<typeof secondDoseForm>;

export const finingSchema = z.object({
  id,
  batch_id: id,
  fining: z.string(),
  name: z.string(),
  parts: z.array(z.string()),
  first_at: z.string(),
  second_at: z.string().nullable(),
  interval_min: z.number().nullable(),
  settle_days: z.number(),
  state: z.enum(['waiting_for_second', 'second_due', 'settling', 'settled']),
  /** When the second dose is due. */
  due_at: z.string().nullable(),
  late_min: z.number().nullable(),
  bright_from: z.string().nullable(),
  allergens: z.array(z.string()),
  caution: z.string(),
});
export type FiningBody = z.infer<typeof finingSchema>;
export const finingList = z.object({ items: z.array(finingSchema) });
