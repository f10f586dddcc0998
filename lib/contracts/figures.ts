import { z } from 'zod';
import { HOW_STATUSES } from '../core/how/how';

/** An amount known only within limits: the least, the likely and the most. */
export const rangeSchema = z.object({ lo: z.number(), value: z.number(), hi: z.number() });

/** A range that somebody typed in. */
export const rangeWithin = (min: number, max: number) => {
  const part = z.number('must be a number').min(min, `must be between ${min} and ${max}`).max(max, `must be between ${min} and ${max}`);
  return z
    .object({ lo: part, value: part, hi: part })
    .refine((range) => range.lo <= range.value && range.value <= range.hi, 'the least, the likely and the most must be in this order');
};

/** How a figure came about: what the question "how?" is answered with. */
export const howSchema = z.object({
  formula: z.string(),
  inputs: z.array(z.object({ name: z.string(), value: z.union([z.number(), z.string()]).nullable(), unit: z.string() })),
  source: z.string(),
  status: z.enum(HOW_STATUSES),
});
export type HowBody = z.infer<typeof howSchema>;

const figureOf = <S extends z.ZodType>(value: S) => z.object({ value, unit: z.string(), how: howSchema });
export const numberFigure = figureOf(z.number());
export const rangeFigure = figureOf(rangeSchema);

/** The three strengths side by side. */
export const strengthSchema = z.object({
  simple: rangeFigure,
  excise: figureOf(rangeSchema.extend({ truncated: z.number() }).nullable()),
  balling: rangeFigure,
  difference: z.number(),
  why: z.string(),
});
