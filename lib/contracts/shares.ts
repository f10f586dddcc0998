import { z } from 'zod';
import { DRINK_KINDS } from '../core/types';
import { ENTRY_KINDS, seriesSchema } from './batches';
import { curvePointSchema } from './assessment';
import { id } from './common';
import { howSchema, rangeSchema } from './figures';
import { linkToken } from './jobs';
import { LOT_SPARKLES } from './lots';
import { SPARKLES_FOUND, tastingSummary } from './tastings';

/** `POST /api/v1/batches/{id}/shares`. Strict, as all that gives access: a limit that was mistyped must not become the widest. */
export const createShare = z.strictObject({
  expires_in_days: z.number('must be a number of days').int().min(1, 'must be at least a day').max(1825, 'must be at most five years').default(365),
  /** The sharer's own name, and those of tasters who chose it. */
  show_people: z.boolean().default(false),
  takes_tastings: z.boolean().default(true),
});
export type CreateShare = z.infer<typeof createShare>;

export const shareSchema = z.object({
  id,
  batch: z.object({ id, name: z.string() }),
  /** The address; whoever has it can look. Null once it no longer opens anything. */
  url: z.string().nullable(),
  created_at: z.string(),
  created_by: z.object({ id, name: z.string() }).nullable(),
  expires_at: z.string(),
  revoked_at: z.string().nullable(),
  open: z.boolean(),
  show_people: z.boolean(),
  takes_tastings: z.boolean(),
  looked_at: z.number().int(),
  last_looked_at: z.string().nullable(),
});
export type ShareBody = z.infer<typeof shareSchema>;
export const shareList = z.object({ items: z.array(shareSchema) });

export const byToken = z.object({ token: linkToken });

/** `GET /api/v1/share/{token}`: one batch, read only. No address, no text of the log, no name that its owner did not give. */
export const sharedBatch = z.object({
  name: z.string(),
  kind: z.enum(DRINK_KINDS),
  /** As a drink of this make and strength is called. */
  called: z.string(),
  drink_colour: z.string(),
  vessel_kind: z.string(),
  pitched_at: z.string().nullable(),
  ended_at: z.string().nullable(),
  original_gravity: z.number().nullable(),
  gravity: z.number().nullable(),
  abv_percent: rangeSchema.nullable(),
  /** Of the strength. */
  how: howSchema.nullable(),
  series: seriesSchema,
  curve: z.array(curvePointSchema),
  entries: z.array(z.object({ kind: z.enum(ENTRY_KINDS), at: z.string(), gravity: z.number().nullable() })),
  lots: z.array(
    z.object({
      id,
      code: z.string(),
      name: z.string(),
      bottled_at: z.string(),
      ready_from: z.string(),
      ready: z.boolean(),
      sparkle: z.enum(LOT_SPARKLES),
      abv_percent: rangeSchema.nullable(),
      how: howSchema,
      allergens: z.string().nullable(),
      caution: z.boolean(),
      tastings: tastingSummary,
      words: z.array(z.object({ at: z.string(), by: z.string().nullable(), words: z.string(), score: z.number().nullable(), sparkle: z.enum(SPARKLES_FOUND).nullable() })),
    }),
  ),
  /** The sharer's name, where they chose to show it. */
  by: z.string().nullable(),
  cautions: z.array(z.string()),
  takes_tastings: z.boolean(),
  expires_at: z.string(),
});
export type SharedBatch = z.infer<typeof sharedBatch>;
/** `again`: the open page asks by itself, which is no look of anybody. */
export const sharedQuery = z.object({ again: z.literal('true', 'is true or left out').optional() });
export const tastingTaken = z.object({ id });
