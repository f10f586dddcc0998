import { z } from 'zod';
import { gravity, rfc3339, temperatureC } from './common';

/** More than this in one message is refused whole. */
export const MAX_READINGS_PER_MESSAGE = 500;
/** A reading may be this far ahead of the server: clocks drift. */
export const MAX_AHEAD_MS = 10 * 60_000;
/** Earlier than this is a clock that was never set. */
export const EARLIEST_MS = Date.UTC(2015, 0, 1);
/** What is kept of a refused message. */
export const REFUSED_BODY_BYTES = 2048;
export const REFUSED_KEPT_DAYS = 30;

/** A number inside its span, with one sentence for all that can be wrong with it. */
const span = (low: number, high: number) => z.number(`must be a number from ${low} to ${high}`).min(low, `must be ${low} to ${high}`).max(high, `must be ${low} to ${high}`);

const fields = z.object({
  at: rfc3339('at must be RFC 3339 with a zone, such as 2026-03-04T06:00:00Z').optional(),
  gravity: gravity.optional(),
  inclination: span(0, 90).optional(),
  temperature: temperatureC,
  battery: span(0, 15).optional(),
  signal: span(-130, 0).optional(),
  foam: span(0, 500).optional(),
  sequence: z.number('must be a whole number').int('must be a whole number').min(0, 'must not be negative').max(Number.MAX_SAFE_INTEGER, 'is too large').optional(),
  settings: z.number('must be a whole number').int('must be a whole number').min(0, 'must not be negative').max(2_147_483_647, 'is too large').optional(),
});

/** One reading as a float sends it. Unknown keys are dropped. */
export const reading = fields.refine((value) => value.gravity !== undefined || value.inclination !== undefined, { error: 'gravity or inclination is required', path: ['gravity'] });
export type TelemetryReading = z.infer<typeof reading>;
/** Of a room probe: temperature alone. */
export const roomReading = fields;
/** Of a foam probe. */
export const foamReading = fields.refine((value) => value.foam !== undefined, { error: 'foam is required', path: ['foam'] });

/** What goes down to a sensor, retained on its settings topic and in the answer over HTTP. It confirms by sending `settings: <version>` with its readings. */
export const sensorSettings = z.object({
  version: z.number().int(),
  /** How often to speak, s. */
  interval_s: z.number().int(),
});
export type SensorSettings = z.infer<typeof sensorSettings>;

/**
 * RFC 8428 (SenML JSON), the records that a float sensor uses. Base values (bn,
 * bt, bu, bv) hold for the records after them (section 4.1).
 */
export const senmlRecord = z.looseObject({
  bn: z.string().max(200).optional(),
  bt: z.number().optional(),
  bu: z.string().max(20).optional(),
  bv: z.number().optional(),
  bver: z.number().int().max(10, 'is a SenML version that is not known').optional(),
  n: z.string().max(200).optional(),
  u: z.string().max(20).optional(),
  v: z.number().optional(),
  t: z.number().optional(),
});

export const refusal = z.object({ index: z.number().int(), reason: z.string() });

/** Answer of `POST /api/v1/telemetry`. */
export const telemetryResult = z.object({
  stored: z.number().int(),
  duplicates: z.number().int(),
  refused: z.array(refusal),
  /** Where the cellar wants the sensor to be set otherwise than it was made. */
  settings: sensorSettings.optional(),
});
export type TelemetryResult = z.infer<typeof telemetryResult>;
