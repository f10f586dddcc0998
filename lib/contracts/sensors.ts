import { z } from 'zod';
import { id, line } from './common';

export const SENSOR_KINDS = ['float'] as const;

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
});
export type UpdateSensor = z.infer<typeof updateSensor>;

export const sensorSchema = z.object({
  /** The identifier: MQTT user name and part of the topic. */
  id: z.string(),
  name: z.string(),
  kind: z.enum(SENSOR_KINDS),
  interval_s: z.number(),
  disabled: z.boolean(),
  created_at: z.string(),
  batch: z.object({ id, name: z.string(), since: z.string() }).nullable(),
  last: z
    .object({ measured_at: z.string(), received_at: z.string(), gravity: z.number().nullable(), temperature: z.number().nullable(), battery: z.number().nullable(), signal: z.number().nullable() })
    .nullable(),
  refused_24h: z.number().int(),
});
export type SensorBody = z.infer<typeof sensorSchema>;

/** The one answer that holds the secret. */
export const createdSensorSchema = sensorSchema.extend({ secret: z.string(), topic: z.string() });
export type CreatedSensorBody = z.infer<typeof createdSensorSchema>;

export const sensorList = z.object({ items: z.array(sensorSchema), next_cursor: z.string().nullable() });

export const refusedSchema = z.object({ id: z.string(), received_at: z.string(), road: z.enum(['mqtt', 'http']), reason: z.string(), body: z.string() });
export const refusedList = z.object({ items: z.array(refusedSchema) });
export type RefusedBody = z.infer<typeof refusedSchema>;
