import { z } from 'zod';
import { FOAMS } from '../core/types';
import { SENSOR_KINDS } from './sensors';

/** A probe beside a batch, or hanging in its place. */
export const surroundingsSchema = z.object({
  probes: z.array(
    z.object({
      sensor: z.string(),
      name: z.string(),
      kind: z.enum(SENSOR_KINDS),
      stands: z.enum(['vessel', 'place']),
      /** Null: it said nothing lately. */
      at: z.string().nullable(),
      /** Of the room, median of three hours. */
      temperature_c: z.number().nullable(),
      foam_mm: z.number().nullable(),
      foam: z.enum(FOAMS).nullable(),
    }),
  ),
});
export type SurroundingsBody = z.infer<typeof surroundingsSchema>;
export type ProbeBody = SurroundingsBody['probes'][number];
