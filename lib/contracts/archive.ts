import { z } from 'zod';
import { DRINK_KINDS, NECKS } from '../core/types';
import { gravity, line, temperatureC, text, timestamp } from './common';
import { BATCH_STATES, VESSEL_KINDS } from './batches';

/**
 * What leaves as JSON and comes back as it was. Gravities SG at 20 °C/20 °C,
 * temperatures °C, volumes litres, times RFC 3339.
 */
const orNull = <T extends z.ZodType>(schema: T) => schema.nullable().default(null);
const number = (min: number, max: number) => z.number().min(min).max(max);

export const archivedEntry = z.object({
  kind: z.string().regex(/^[a-z_]{2,30}$/, 'is no kind of entry'),
  at: timestamp,
  text: orNull(text(10_000)),
  gravity: orNull(gravity),
  /** As the hydrometer showed it, before its correction to 20 °C. */
  gravity_read: orNull(number(0.5, 2)),
  temperature_c: orNull(number(-50, 150)),
  calibrated_at_c: orNull(number(0, 100)),
  neck: orNull(z.enum(NECKS)),
  volume_l: orNull(number(0, 10_000)),
  sugar_g: orNull(number(0, 1e7)),
  fruit_g: orNull(number(0, 1e7)),
  /** What else was measured or went in. */
  detail: orNull(z.record(z.string().max(60), z.union([z.string().max(10_000), z.number(), z.boolean(), z.null()])).refine((value) => Object.keys(value).length <= 60, 'has too many fields')),
  by: orNull(line(200)),
  created_at: timestamp,
  revised_at: orNull(timestamp),
});

export const READING_COLUMNS = ['measured_at', 'received_at', 'gravity', 'gravity_sent', 'inclination', 'temperature', 'battery', 'signal', 'foam', 'sequence'] as const;
const figure = z.number().nullable();
/** In the order of READING_COLUMNS. */
export const archivedReading = z.tuple([timestamp, timestamp, gravity.nullable(), gravity.nullable(), figure, temperatureC.nullable(), figure, figure, figure, z.number().int().nullable()]);

/** A float, for as long as it was in the batch. */
export const archivedFloat = z.object({ name: line(60), from: timestamp, to: timestamp, columns: z.tuple(READING_COLUMNS.map((name) => z.literal(name)) as unknown as [z.ZodLiteral<string>, ...z.ZodLiteral<string>[]]), readings: z.array(archivedReading).max(500_000) });

export const archivedBatch = z.object({
  name: line(80),
  kind: z.enum(DRINK_KINDS),
  drink_colour: z.string().regex(/^([a-z]{3,10}|#[0-9a-fA-F]{6})$/),
  vessel_kind: z.enum(VESSEL_KINDS),
  tag: orNull(z.number().int().min(1).max(999)),
  place: orNull(line(80)),
  volume_l: number(0.001, 10_000),
  vessel_l: number(0.001, 10_000),
  neck: z.enum(NECKS),
  pitched_at: orNull(timestamp),
  original_gravity: orNull(gravity),
  yeast: orNull(line(80)),
  attenuation_min_percent: orNull(number(0, 200)),
  attenuation_max_percent: orNull(number(0, 200)),
  alcohol_tolerance_abv: orNull(number(0, 30)),
  temperature_min_c: orNull(temperatureC),
  temperature_max_c: orNull(temperatureC),
  state: z.enum(BATCH_STATES),
  ended_at: orNull(timestamp),
  created_at: timestamp,
  entries: z.array(archivedEntry).max(20_000),
  floats: z.array(archivedFloat).max(100),
}).refine((batch) => batch.vessel_l >= batch.volume_l, { error: 'is less than what is in it', path: ['vessel_l'] });
export type ArchivedBatch = z.infer<typeof archivedBatch>;

export const archiveSchema = z.object({
  format: z.literal('fallbright-archive', 'is no archive of this house'),
  version: z.literal(1, 'is of a later version than this house knows'),
  exported_at: timestamp,
  cellar: z.object({ name: z.string().max(200), time_zone: z.string().max(60) }),
  batches: z.array(archivedBatch).max(2_000),
});
export type Archive = z.infer<typeof archiveSchema>;
