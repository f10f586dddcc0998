import { z } from 'zod';
import { id, line, timestamp } from './common';

/** What people add: a float in the drink, a thermometer in the room, an eye on the foam. */
export const SENSOR_KINDS = ['float', 'room', 'foam'] as const;
export type SensorKindName = (typeof SENSOR_KINDS)[number];

export const createSensor = z.object({
  name: line(60),
  kind: z.enum(SENSOR_KINDS).default('float'),
  /** How often it is set to speak, s. */
  interval_s: z.number().int('must be whole seconds').min(10, 'must be at least 10 s').max(86_400, 'must be at most a day').default(900),
});
export type CreateSensor = z.infer<typeof createSensor>;

/** Put in a batch, taken out (null), renamed, switched off. */
export const updateSensor = z.object({
  name: line(60).optional(),
  interval_s: createSensor.shape.interval_s.unwrap().optional(),
  disabled: z.boolean().optional(),
  batch_id: id.nullable().optional(),
  /** Where a room probe hangs: the batches standing there share it. */
  place: line(80).nullable().optional(),
  /** Since when it is there, or out of there; absent: now. */
  since: timestamp.optional(),
});
export type UpdateSensor = z.infer<typeof updateSensor>;

export const sensorSchema = z.object({
  /** The identifier: MQTT user name and part of the topic. */
  id: z.string(),
  name: z.string(),
  kind: z.enum(SENSOR_KINDS),
  interval_s: z.number(),
  disabled: z.boolean(),
  /** Where a room probe hangs. */
  place: z.string().nullable(),
  created_at: z.string(),
  batch: z.object({ id, name: z.string(), since: z.string() }).nullable(),
  last: z
    .object({ measured_at: z.string(), received_at: z.string(), gravity: z.number().nullable(), temperature: z.number().nullable(), battery: z.number().nullable(), signal: z.number().nullable() })
    .nullable(),
  refused_24h: z.number().int(),
  /** Settings sent down to it; null: none were, it is as it was made. */
  settings: z.object({ version: z.number().int(), interval_s: z.number().int(), sent_at: z.string(), confirmed_at: z.string().nullable() }).nullable(),
  /** The calibration in force; null: it sends gravity itself, or waits for one. */
  calibration: z.object({ version: z.number().int(), applies_from: z.string() }).nullable(),
});
export type SensorBody = z.infer<typeof sensorSchema>;

/** The one answer that holds the secret. */
export const createdSensorSchema = sensorSchema.extend({ secret: z.string(), topic: z.string() });
export type CreatedSensorBody = z.infer<typeof createdSensorSchema>;

export const sensorList = z.object({ items: z.array(sensorSchema), next_cursor: z.string().nullable() });

export const refusedSchema = z.object({ id: z.string(), received_at: z.string(), road: z.enum(['mqtt', 'http']), reason: z.string(), body: z.string() });
export const refusedList = z.object({ items: z.array(refusedSchema) });

export const sensorSettingsForm = z.object({ interval_s: createSensor.shape.interval_s.unwrap() });

/** Where a sensor was, newest first; `to` null: it is there. */
export const stayList = z.object({ items: z.array(z.object({ batch: z.object({ id, name: z.string() }), from: z.string(), to: z.string().nullable(), readings: z.number().int() })) });

export const rawReadingSchema = z.object({
  measured_at: z.string(),
  received_at: z.string(),
  gravity: z.number().nullable(),
  /** What it sent, where a calibration put another gravity in its place. */
  gravity_sent: z.number().nullable(),
  inclination: z.number().nullable(),
  temperature: z.number().nullable(),
  battery: z.number().nullable(),
  signal: z.number().nullable(),
  foam: z.number().nullable(),
  sequence: z.number().nullable(),
});
export const rawReadingList = z.object({ items: z.array(rawReadingSchema) });
export const rawReadingQuery = z.object({ limit: z.coerce.number().int().min(1).max(500).default(20) });

export const sensorLimits = z.object({
  low_battery_days: z.number('must be a number').int('must be whole days').min(1, 'must be 1 to 180').max(180, 'must be 1 to 180'),
  empty_battery_v: z.number('must be a number').min(0.5, 'must be 0.5 to 15 V').max(15, 'must be 0.5 to 15 V'),
  weak_signal_dbm: z.number('must be a number').int('must be whole dBm').min(-130, 'must be −130 to −30').max(-30, 'must be −130 to −30'),
  missed_percent: z.number('must be a number').int('must be a whole per cent').min(1, 'must be 1 to 100').max(100, 'must be 1 to 100'),
  clock_offset_s: z.number('must be a number').int('must be whole seconds').min(10, 'must be 10 s to a day').max(86_400, 'must be 10 s to a day'),
});
export type SensorLimits = z.infer<typeof sensorLimits>;

const spread = z.object({ value: z.number(), lo: z.number().nullable(), hi: z.number().nullable() });

export const sensorHealthSchema = z.object({
  silent_for_s: z.number().nullable(),
  /** In the last 24 h. */
  heard_24h: z.number().int(),
  /** By its running numbers; null: it sends none. */
  gaps: z.object({ heard: z.number().int(), missed: z.number().int(), restarts: z.number().int() }).nullable(),
  battery: z.object({ volts: z.number(), per_day: z.number().nullable(), days: spread.nullable(), by_day: z.array(z.object({ at: z.string(), volts: z.number() })) }).nullable(),
  signal: z.object({ dbm: z.number(), weakest: z.number() }).nullable(),
  /** Its clock less ours, s; null: it sends no times. */
  clock_offset_s: z.number().nullable(),
  refused: z.array(z.object({ reason: z.string(), count: z.number().int(), last: z.string() })),
  /** What the judgement says of it, where it is in a batch. */
  call: z.object({ verdict: z.string(), kind: z.string().nullable(), headline: z.string(), reason: z.string() }).nullable(),
  findings: z.array(z.object({ of: z.enum(['silence', 'gaps', 'battery', 'signal', 'clock', 'refused', 'call', 'settings', 'calibration']), says: z.string(), act: z.string() })),
  limits: sensorLimits,
});
export type SensorHealthBody = z.infer<typeof sensorHealthSchema>;

/** `GET /api/v1/sensor-health`: of every sensor what is not as the cellar wants it, and the limits that say so. */
export const sensorHealthList = z.object({
  items: z.array(z.object({ sensor: z.string(), battery_days: spread.nullable(), findings: sensorHealthSchema.shape.findings })),
  limits: sensorLimits,
});
export type SensorHealthList = z.infer<typeof sensorHealthList>;
