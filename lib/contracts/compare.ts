import { z } from 'zod';
import { batchSchema, ENTRY_KINDS } from './batches';
import { id } from './common';
import { howSchema } from './figures';

/** `GET /api/v1/compare?batches=a,b[&from_hour=&to_hour=]`. */
export const compareQuery = z.object({
  batches: z
    .string()
    .transform((value) => value.split(','))
    .pipe(z.array(id).min(1, 'name at least one batch').max(8, 'at most 8 batches lie over each other well')),
  points: z.coerce.number().int().min(10).max(2000).default(300),
  /** Readings of a part only, hours since the pitch of each: all the points for what is looked at closely. */
  from_hour: z.coerce.number().min(0).max(100_000).optional(),
  to_hour: z.coerce.number().min(0).max(100_000).optional(),
});

/** Batches laid over each other, aligned at their pitch. */
export const compareSchema = z.object({
  items: z.array(
    z.object({
      batch: batchSchema.pick({ id: true, name: true, kind: true, drink_colour: true, vessel_kind: true, tag: true, volume_l: true, state: true, pitched_at: true, original_gravity: true, yeast: true }),
      /** The time that hour 0 is. Null: not pitched, and nothing to align. */
      zero_at: z.string().nullable(),
      hours: z.array(z.number()),
      gravity: z.array(z.number().nullable()),
      temperature: z.array(z.number().nullable()),
      /** As judged, up to the last judgement; empty before the first. */
      curve: z.array(z.object({ hour: z.number(), gravity: z.number() })),
      by_hand: z.array(z.object({ hour: z.number(), gravity: z.number() })),
      posts: z.array(z.object({ hour: z.number(), kind: z.enum(ENTRY_KINDS) })),
      result: z.object({ gravity: z.number().nullable(), abv_percent: z.number().nullable(), /** Of the strength. */ how: howSchema.nullable(), attenuation_percent: z.number().nullable(), hours_to_terminal: z.number().nullable(), score: z.number().nullable(), lots: z.number().int() }),
    }),
  ),
});
export type CompareBody = z.infer<typeof compareSchema>;
