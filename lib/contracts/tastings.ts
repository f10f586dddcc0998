import { z } from 'zod';
import { id, line, text, timestamp } from './common';

/** Against what was planned. */
export const SPARKLES_FOUND = ['flat', 'less', 'as_planned', 'more', 'gushing'] as const;

const points = z.number('must be 1 to 5').int('must be 1 to 5').min(1, 'must be 1 to 5').max(5, 'must be 1 to 5').nullable().default(null);

const sheet = {
  look: points,
  smell: points,
  taste: points,
  balance: points,
  sparkle: z.enum(SPARKLES_FOUND).nullable().default(null),
  /** 1 to 10, halves allowed. */
  score: z.number('must be 1 to 10').min(1, 'must be 1 to 10').max(10, 'must be 1 to 10').multipleOf(0.5, 'must be in halves').nullable().default(null),
  words: text(1000).nullable().default(null),
  next_time: text(500).nullable().default(null),
};

const says = (value: Record<keyof typeof sheet, unknown>) => (Object.keys(sheet) as Array<keyof typeof sheet>).some((key) => value[key] !== null);
const SAYS = { path: ['words'], message: 'say something about it' };

/** `POST /api/v1/lots/{id}/tastings`. */
export const createTasting = z.object({ ...sheet, at: timestamp, /** The name may stand on the share page. */ show_name: z.boolean().default(false), client_id: z.uuid().nullable().default(null) }).refine(says, SAYS);
export type CreateTasting = z.infer<typeof createTasting>;

/** `POST /api/v1/share/{token}/tastings`: by somebody without an account. */
export const guestTasting = z.object({ ...sheet, lot_id: id, guest_name: line(40).nullable().default(null), client_id: z.uuid().nullable().default(null) }).refine(says, SAYS);
export type GuestTasting = z.infer<typeof guestTasting>;

export const tastingSchema = z.object({
  id,
  at: z.string(),
  /** A member, or the name that a guest wrote. */
  by: z.object({ id: id.nullable(), name: z.string().nullable(), guest: z.boolean() }),
  look: z.number().nullable(),
  smell: z.number().nullable(),
  taste: z.number().nullable(),
  balance: z.number().nullable(),
  sparkle: z.enum(SPARKLES_FOUND).nullable(),
  score: z.number().nullable(),
  words: z.string().nullable(),
  next_time: z.string().nullable(),
  show_name: z.boolean(),
  mine: z.boolean(),
});
export type TastingBody = z.infer<typeof tastingSchema>;

/** Of those who gave a figure; the spread is the standard deviation, null below two. */
const spread = z.object({ count: z.number().int(), mean: z.number(), spread: z.number().nullable(), lowest: z.number(), highest: z.number() }).nullable();
export const tastingSummary = z.object({ count: z.number().int(), score: spread, look: spread, smell: spread, taste: spread, balance: spread, sparkle: z.record(z.enum(SPARKLES_FOUND), z.number().int()) });
export type TastingSummary = z.infer<typeof tastingSummary>;

export const tastingList = z.object({ items: z.array(tastingSchema), summary: tastingSummary });
export type TastingList = z.infer<typeof tastingList>;
