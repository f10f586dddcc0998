import { z } from 'zod';
import { gravity, id, line, temperatureC, timestamp } from './common';

const inclination = z.number('must be a number').min(0, 'must be 0 to 90°').max(90, 'must be 0 to 90°');

export const POINT_SOURCES = ['water', 'sugar', 'hydrometer'] as const;

/** The float in a liquid whose gravity is known. */
export const calibrationPointForm = z
  .object({
    source: z.enum(POINT_SOURCES),
    inclination,
    /** Known gravity at 20 °C; for sugar in water the grams may be told instead. */
    gravity: gravity.nullable().default(null),
    /** Table sugar in a litre of the finished solution, g. */
    sugar_g_per_l: z.number('must be a number').min(0, 'must be 0 to 400 g/L').max(400, 'must be 0 to 400 g/L').nullable().default(null),
    temperature: temperatureC.default(20),
    at: timestamp.optional(),
  })
  .refine((value) => value.source === 'water' || value.gravity !== null || value.sugar_g_per_l !== null, { error: 'is needed: the gravity, or the sugar in a litre', path: ['gravity'] });
export type CalibrationPointForm = z.infer<typeof calibrationPointForm>;

export const calibrationPointSchema = z.object({
  id,
  at: z.string(),
  source: z.enum(POINT_SOURCES),
  inclination: z.number(),
  gravity: z.number(),
  temperature: z.number(),
  sugar_g_per_l: z.number().nullable(),
  entry_id: id.nullable(),
  by: z.string().nullable(),
});
export type CalibrationPointBody = z.infer<typeof calibrationPointSchema>;

export const calibrationVersionSchema = z.object({
  version: z.number().int(),
  applies_from: z.string(),
  /** Null: the gravity it sends, moved by the offset. */
  curve: z
    .object({ degree: z.number().int(), coefficients: z.array(z.number()), low: z.number(), high: z.number(), sigma: z.number(), corrects_temperature: z.boolean(), points: z.array(z.object({ inclination: z.number(), gravity: z.number(), temperature: z.number() })) })
    .nullable(),
  offset: z.number(),
  note: z.string().nullable(),
  by: z.string().nullable(),
  created_at: z.string(),
  removed_at: z.string().nullable(),
});
export type CalibrationVersionBody = z.infer<typeof calibrationVersionSchema>;

/** Readings by hand of the batch that could be points: what the float leaned like then. */
const candidate = z.object({ entry_id: id, at: z.string(), batch: z.string(), gravity: z.number(), inclination: z.number(), temperature: z.number() });

export const calibrationSchema = z.object({
  points: z.array(calibrationPointSchema),
  candidates: z.array(candidate),
  /** Newest first; taken back ones too. */
  versions: z.array(calibrationVersionSchema),
  /** Readings that wait for a calibration. */
  waiting: z.number().int(),
  waiting_since: z.string().nullable(),
  /** Readings are being turned right now. */
  turning: z.boolean(),
  suggestion: z.object({ offset: z.number(), since: z.string(), spread: z.number(), pairs: z.array(z.object({ at: z.string(), hand: z.number(), float: z.number() })) }).nullable(),
  last: z.object({ at: z.string(), inclination: z.number(), temperature: z.number().nullable() }).nullable(),
});
export type CalibrationBody = z.infer<typeof calibrationSchema>;

export const calibrationForm = z.object({
  degree: z.union([z.literal(1), z.literal(2), z.literal(3)]),
  corrects_temperature: z.boolean().default(true),
  /** Points that it is made from; the others stay in the notebook. */
  points: z.array(id).min(2, 'needs two points or more').max(200),
  /** Readings measured from then on stand by it. */
  applies_from: timestamp,
  note: line(200).nullable().default(null),
});
export type CalibrationForm = z.infer<typeof calibrationForm>;

export const offsetForm = z.object({
  /** Added to what it shows, SG. */
  offset: z.number('must be a number').min(-0.05, 'must be within 50 points').max(0.05, 'must be within 50 points'),
  applies_from: timestamp,
  note: line(200).nullable().default(null),
});
export type OffsetForm = z.infer<typeof offsetForm>;

/** A hydrometer reading of the log as a point. */
export const pairForm = z.object({ entry_id: id });
