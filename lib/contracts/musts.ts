import { z } from 'zod';
import { ALLERGENS } from '../core/must/ingredients';
import { SWEETNESSES } from '../core/must/sheet';
import { DRINK_KINDS } from '../core/types';
import { MEASURE_UNITS } from '../core/units/measures';
import { ingredientSchema, yeastSchema } from './catalogue';
import { gravity, id, line, text } from './common';
import { howSchema, rangeFigure, rangeSchema, rangeWithin, strengthSchema } from './figures';

/** What somebody may call a line by; kept over versions, so that a change is known as one. */
const lineId = z.string().regex(/^[A-Za-z0-9-]{1,40}$/, 'is not the id of a line');
const litres = (min: number) => z.number('must be a number of litres').min(min, `must be at least ${min} L`).max(2000, 'must be at most 2000 L');

export const mustLineSchema = z.object({
  id: lineId,
  ingredient: ingredientSchema,
  amount: z.object({ quantity: rangeWithin(0, 1_000_000), unit: z.enum(MEASURE_UNITS as [string, ...string[]] as [(typeof MEASURE_UNITS)[number], ...(typeof MEASURE_UNITS)[number][]], 'choose a unit') }),
  /** Cost of one unit of the amount, in the cellar's currency. */
  cost_per_unit: z.number().min(0, 'must not be negative').max(100_000).nullable().default(null),
  note: text(300).nullable().default(null),
});

/** A must sheet as it is written and kept; `camelKeys` makes it the core's. */
export const mustSheetSchema = z
  .object({
    name: line(80),
    kind: z.enum(DRINK_KINDS, 'choose what it is'),
    lines: z.array(mustLineSchema).max(60, 'has at most 60 lines'),
    yeast: yeastSchema.nullable(),
    boiled_away_l: litres(0).default(0),
    vessel_l: litres(0.1).nullable().default(null),
    /** What to do with it, in the keeper's words. */
    method: text(5000).nullable().default(null),
  })
  .refine((sheet) => new Set(sheet.lines.map((item) => item.id)).size === sheet.lines.length, { path: ['lines'], message: 'two lines have the same id' });
export type MustSheetBody = z.infer<typeof mustSheetSchema>;

export const neckForecastSchema = z.object({
  headspace_l: rangeFigure,
  peak_gas_l_per_h: rangeFigure,
  airlock_bears_l_per_h: z.number(),
  fits: z.boolean(),
  start_on: z.enum(['blow_off', 'airlock']),
  foam: z.enum(['low', 'some', 'high']),
  sentence: z.string(),
  how: howSchema,
});

export const mustOutcomeSchema = z.object({
  volume_l: rangeFigure,
  fill_l: rangeFigure,
  sugar_g: rangeFigure,
  original_gravity: rangeFigure,
  gravity_at_pitch: rangeFigure,
  fermentable_share: rangeFigure,
  final_gravity: rangeFigure,
  strength: strengthSchema,
  potential: strengthSchema,
  sugar_left_g_per_l: rangeFigure,
  sweetness: z.object({ from: z.enum(SWEETNESSES), to: z.enum(SWEETNESSES) }),
  nitrogen: z.object({ needed_mg_l: rangeFigure, given_mg_l: rangeFigure, missing_mg_l: z.number(), notes: z.array(z.string()) }),
  neck: neckForecastSchema.nullable(),
  releases: z.array(z.object({ line: z.string(), name: z.string(), sugar_g: z.number(), over_days: rangeSchema })),
  sulphite_mg_per_l: rangeFigure,
  allergens: z.array(z.enum(ALLERGENS)),
  cost: rangeFigure.extend({ known: z.boolean() }),
  notes: z.array(z.object({ kind: z.enum(['preservative', 'sulphite', 'allergen', 'dose', 'caution', 'volume', 'tolerance', 'release', 'diastatic']), line: z.string().nullable(), sentence: z.string() })),
});

export const mustResultSchema = z.discriminatedUnion('ok', [
  z.object({ ok: z.literal(true), outcome: mustOutcomeSchema }),
  z.object({ ok: z.literal(false), problems: z.array(z.object({ line: z.string().nullable(), sentence: z.string() })) }),
]);
export type MustResultBody = z.infer<typeof mustResultSchema>;

const byWhom = z.object({ id, name: z.string() }).nullable();

/** A note for the next time, from a tasting or a lot of a batch that the sheet made. */
export const nextTimeSchema = z.object({ note: z.string(), lot: z.object({ id, code: z.string() }), by: z.string().nullable(), at: z.string() });

export const mustSchema = z.object({
  id,
  version_id: id,
  version: z.number().int(),
  sheet: mustSheetSchema,
  result: mustResultSchema,
  /** Newest first; what changed against the one before, in sentences. */
  versions: z.array(z.object({ id, version: z.number().int(), at: z.string(), by: byWhom, change_note: z.string().nullable(), changes: z.array(z.string()) })),
  copied_from: z.object({ id, name: z.string(), version: z.number().int() }).nullable(),
  /** What to do otherwise, from the tastings of what this sheet, or the one it was copied from, made. */
  next_time: z.array(nextTimeSchema),
  batches: z.array(z.object({ id, name: z.string(), version: z.number().int(), pitched_at: z.string().nullable() })),
  archived: z.boolean(),
  created_at: z.string(),
});
export type MustBody = z.infer<typeof mustSchema>;

export const mustSummary = z.object({
  id,
  version_id: id,
  version: z.number().int(),
  name: z.string(),
  kind: z.enum(DRINK_KINDS),
  changed_at: z.string(),
  change_note: z.string().nullable(),
  copied_from: z.object({ id, name: z.string(), version: z.number().int() }).nullable(),
  original_gravity: rangeSchema.nullable(),
  /** By Balling, % vol. */
  abv_percent: rangeSchema.nullable(),
  volume_l: rangeSchema.nullable(),
  vessel_l: z.number().nullable(),
  /** Lines that the figures come from, and the yeast that they end by. */
  lines: z.number().int(),
  yeast: z.string().nullable(),
  batches: z.number().int(),
  archived: z.boolean(),
});
export const mustList = z.object({ items: z.array(mustSummary), next_cursor: z.string().nullable() });
export type MustList = z.infer<typeof mustList>;
export const mustQuery = z.object({ q: z.string().max(80).optional(), archived: z.enum(['yes', 'no']).default('no'), cursor: z.string().max(200).optional(), limit: z.coerce.number().int().min(1).max(200).default(50) });
export const versionQuery = z.object({ version: z.coerce.number().int().min(1).optional() });

export const createMust = z.object({ sheet: mustSheetSchema });
/** `PATCH /api/v1/musts/{id}`: a new version. `base_version` is the one it was made from: a newer one is a conflict. */
export const updateMust = z.object({ sheet: mustSheetSchema, base_version: z.number().int().min(1), change_note: text(500).nullable().default(null) });
export type UpdateMust = z.infer<typeof updateMust>;
/** `POST /api/v1/musts/{id}/copy`: with one change noted. Without a sheet the copy is the same as its source. */
export const copyMust = z.object({ name: line(80), version: z.number().int().min(1).optional(), sheet: mustSheetSchema.optional(), change_note: text(500) });
export type CopyMust = z.infer<typeof copyMust>;

export const reckonMustForm = z.object({ sheet: mustSheetSchema });
export const scaleMustForm = z.object({ sheet: mustSheetSchema, fill_l: litres(0.05), vessel_l: litres(0.1).nullable().default(null) });
export const solveMustForm = z.object({
  sheet: mustSheetSchema,
  line: lineId,
  wanted: z.union([z.object({ original: gravity }), z.object({ abv_percent: z.number().min(0.1).max(25) })]),
});
/** A changed sheet with what it promises. */
export const reckonedMust = z.object({ sheet: mustSheetSchema, result: mustResultSchema });

/** `GET /api/v1/musts/{id}/batch-proposal`: what a batch from this sheet would be started with. */
export const proposalQuery = z.object({ version: z.coerce.number().int().min(1).optional(), vessel_l: z.coerce.number().min(0.1).max(2000).optional() });
export const batchProposal = z.object({
  must_version_id: id,
  name: z.string(),
  kind: z.enum(DRINK_KINDS),
  volume_l: z.number(),
  vessel_l: z.number(),
  fits: z.boolean(),
  neck: z.enum(['blow_off', 'airlock']),
  neck_reason: z.string(),
  expected_original_gravity: rangeFigure,
  expected_final_gravity: rangeFigure,
  yeast: z.string().nullable(),
  attenuation_min_percent: z.number().nullable(),
  attenuation_max_percent: z.number().nullable(),
  alcohol_tolerance_abv: z.number().nullable(),
  temperature_min_c: z.number().nullable(),
  temperature_max_c: z.number().nullable(),
});
export type BatchProposal = z.infer<typeof batchProposal>;

