import { z } from 'zod';
import { id, line } from './common';

/** What a photo hangs on: one of the three. */
export const photoTarget = z
  .object({ entry: id.optional(), lot: id.optional(), tasting: id.optional(), caption: line(120).optional() })
  .refine((target) => [target.entry, target.lot, target.tasting].filter(Boolean).length === 1, { error: 'a photo hangs on one entry, lot or tasting', path: ['entry'] });
export type PhotoTarget = z.infer<typeof photoTarget>;

/** Forms that are taken, by their content and not by what they are called. */
export const PHOTO_TYPES = ['image/jpeg', 'image/png', 'image/webp', 'image/avif'] as const;

/** As cameras make them; more is refused before it is read. */
export const PHOTO_LIMIT_BYTES = 15_000_000;

export const PHOTO_SIZES = ['small', 'large'] as const;
export type PhotoSize = (typeof PHOTO_SIZES)[number];

export const photoSchema = z.object({
  id,
  entry: id.nullable(),
  lot: id.nullable(),
  tasting: id.nullable(),
  caption: z.string().nullable(),
  width: z.number().int(),
  height: z.number().int(),
  by: z.string().nullable(),
  mine: z.boolean(),
  created_at: z.string(),
  /** Addresses that end by themselves, within half an hour. */
  small: z.string(),
  large: z.string(),
});
export type PhotoBody = z.infer<typeof photoSchema>;
export const photoList = z.object({ items: z.array(photoSchema) });

/** The address of a photo's file: who has it may look until it ends. */
export const photoFile = {
  params: z.object({ id, size: z.enum(PHOTO_SIZES) }),
  query: z.object({ until: z.coerce.number().int().min(0).max(99_999_999_999), key: z.string().regex(/^[A-Za-z0-9_-]{43}$/) }),
};
