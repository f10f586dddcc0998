import { z } from 'zod';
import { DRINK_KINDS, NECKS } from '../core/types';
import { archivedParts } from './archive-parts';
import { BATCH_STATES, VESSEL_KINDS } from './batches';
import { POINT_SOURCES } from './calibration';
import { gravity, id, line, temperatureC, text, timestamp } from './common';

/**
 * What leaves as JSON and comes back as it was. Gravities SG at 20 °C/20 °C,
 * temperatures °C, volumes litres, times RFC 3339. An `id` says within one
 * archive what belongs to what: where it comes back, each thing gets a new one.
 */
const orNull = <T extends z.ZodType>(schema: T) => schema.nullable().default(null);
const number = (min: number, max: number) => z.number().min(min).max(max);

export const archivedEntry = z.object({
  id,
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

export const READING_COLUMNS = ['measured_at', 'received_at', 'gravity', 'gravity_sent', 'inclination', 'temperature', 'battery', 'signal', 'foam', 'sequence', 'calibration'] as const;
const figure = z.number().nullable();
/** In the order of READING_COLUMNS; `calibration` is the version that the gravity stands by. */
export const archivedReading = z.tuple([timestamp, timestamp, gravity.nullable(), gravity.nullable(), figure, temperatureC.nullable(), figure, figure, figure, z.number().int().nullable(), z.int32().nullable()]);

/** In a batch for this long (null: still), and as what: what its drink is judged by, or what only tells how warm its room is. */
export const archivedStay = z.object({ batch: id, as: z.enum(['float', 'probe']), from: timestamp, to: orNull(timestamp) });

export const archivedCalibration = z.object({
  version: z.int32().min(1),
  applies_from: timestamp,
  coefficients: orNull(z.array(z.number()).max(10)),
  low_deg: orNull(z.number()),
  high_deg: orNull(z.number()),
  offset_sg: number(-0.2, 0.2),
  corrects_temperature: z.boolean(),
  sigma: orNull(z.number()),
  points: z.array(z.object({ inclination: z.number(), gravity: z.number(), temperature: z.number() })).max(500),
  note: orNull(text(1000)),
  by: orNull(line(200)),
  created_at: timestamp,
  removed_at: orNull(timestamp),
  removed_by: orNull(line(200)),
});

export const archivedPoint = z.object({ at: timestamp, inclination: z.number(), gravity, temperature: z.number(), source: z.enum(POINT_SOURCES), sugar_g_per_l: orNull(z.number()), entry: orNull(id), by: orNull(line(200)), created_at: timestamp, removed_at: orNull(timestamp) });

const interval = z.int32().min(10).max(86_400);

/** A message that was not taken, as it came: its body in base64. */
export const archivedRefusal = z.object({ received_at: timestamp, road: z.enum(['mqtt', 'http']), reason: z.string().max(1000), body: z.string().max(4_000).regex(/^[A-Za-z0-9+/]*={0,2}$/, 'is no base64') });

/** The interval that was sent down last, and what the sensor itself said of it. */
export const archivedSettings = z.object({ version: z.int32().min(1), interval_s: orNull(interval), sent_at: orNull(timestamp), confirmed_version: orNull(z.int32().min(0)), confirmed_at: orNull(timestamp) });

/** A sensor without its address and its secret: where it comes back it is silent until a keeper gives it a new one. */
export const archivedSensor = z.object({
  name: line(60),
  /** `file`: what a log file brought. */
  kind: z.enum(['float', 'room', 'foam', 'file']).default('file'),
  place: orNull(line(80)),
  interval_s: interval.default(900),
  settings: orNull(archivedSettings),
  created_at: timestamp,
  disabled_at: orNull(timestamp),
  removed_at: orNull(timestamp),
  refused: z.array(archivedRefusal).max(100_000).default([]),
  stays: z.array(archivedStay).max(1_000),
  calibrations: z.array(archivedCalibration).max(1_000),
  points: z.array(archivedPoint).max(1_000),
  columns: z.tuple(READING_COLUMNS.map((name) => z.literal(name)) as unknown as [z.ZodLiteral<string>, ...z.ZodLiteral<string>[]]),
  readings: z.array(archivedReading).max(500_000),
});
export type ArchivedSensor = z.infer<typeof archivedSensor>;

/** A photo with its file; on an entry, a lot or a tasting note. */
export const archivedPhoto = z.object({
  id,
  entry: orNull(id),
  lot: orNull(id),
  tasting: orNull(id),
  caption: orNull(line(200)),
  by: orNull(line(200)),
  created_at: timestamp,
  /** In base64; null where its file was lost. */
  jpeg: orNull(z.string().max(14_000_000).regex(/^[A-Za-z0-9+/]+={0,2}$/, 'is no base64')),
}).refine((photo) => [photo.entry, photo.lot, photo.tasting].filter((on) => on !== null).length === 1, { error: 'hangs on nothing, or on several things', path: ['entry'] });
export type ArchivedPhoto = z.infer<typeof archivedPhoto>;

export const archivedBatch = z.object({
  id,
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
  /** The version of a must sheet that it was made from, and the part of that must that went into it. */
  must_version: orNull(id),
  must_share: number(0, 1).default(1),
  yeast: orNull(line(80)),
  attenuation_min_percent: orNull(number(0, 200)),
  attenuation_max_percent: orNull(number(0, 200)),
  alcohol_tolerance_abv: orNull(number(0, 30)),
  temperature_min_c: orNull(temperatureC),
  temperature_max_c: orNull(temperatureC),
  state: z.enum(BATCH_STATES),
  ended_at: orNull(timestamp),
  by: orNull(line(200)),
  created_at: timestamp,
  entries: z.array(archivedEntry).max(20_000),
}).refine((batch) => batch.vessel_l >= batch.volume_l, { error: 'is less than what is in it', path: ['vessel_l'] });
export type ArchivedBatch = z.infer<typeof archivedBatch>;

export const archiveSchema = z.object({
  format: z.literal('fallbright-archive', 'is no archive of this house'),
  version: z.literal(1, 'is of another version than this house knows'),
  exported_at: timestamp,
  cellar: z.object({ name: z.string().max(200), time_zone: z.string().max(60), /** What its costs are counted in. */ currency: z.string().max(3).nullish() }),
  batches: z.array(archivedBatch).max(2_000),
  ...archivedParts,
  sensors: z.array(archivedSensor).max(2_000).default([]),
  photos: z.array(archivedPhoto).max(10_000).default([]),
});
export type Archive = z.infer<typeof archiveSchema>;
