import { z } from 'zod';
import { gravity, temperatureC } from './common';

/** More than this in one message is refused whole. */
export const MAX_READINGS_PER_MESSAGE = 500;
/** A reading may be this far ahead of the server: clocks drift. */
export const MAX_AHEAD_MS = 10 * 60_000;
/** Earlier than this is a clock that was never set. */
export const EARLIEST_MS = Date.UTC(2015, 0, 1);
/** What is kept of a refused message. */
export const REFUSED_BODY_BYTES = 2048;
export const REFUSED_KEPT_DAYS = 30;

/** One reading as a sensor sends it. Unknown keys are dropped. */
export const reading = z
  .object({
    at: z.iso.datetime({ offset: true, error: 'at must be RFC 3339 with a zone' }).optional(),
    gravity: gravity.optional(),
    inclination: z.number().min(0, 'must be 0 to 90').max(90, 'must be 0 to 90').optional(),
    temperature: temperatureC,
    battery: z.number().min(0, 'must be 0 to 15').max(15, 'must be 0 to 15').optional(),
    signal: z.number().min(-130, 'must be -130 to 0').max(0, 'must be -130 to 0').optional(),
    foam: z.number().min(0, 'must be 0 to 500').max(500, 'must be 0 to 500').optional(),
    sequence: z.number().int('must be a whole number').min(0, 'must not be negative').max(Number.MAX_SAFE_INTEGER).optional(),
  })
  .refine((value) => value.gravity !== undefined || value.inclination !== undefined, { error: 'gravity or inclination is required', path: ['gravity'] });
export type TelemetryReading = z.infer<typeof reading>;

/** RFC 8428 (SenML JSON), the records that a float sensor uses. */
export const senmlRecord = z.object({
  bn: z.string().max(200).optional(),
  bt: z.number().optional(),
  bu: z.string().max(20).optional(),
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
});
export type TelemetryResult = z.infer<typeof telemetryResult>;
