import { z } from 'zod';
import { VERDICTS } from '../core/types';
import { rangeSchema } from './figures';
import { lotSchema } from './lots';

/** What the archive keeps whole within a row. */
const number = z.number();

/** A call as an alert keeps it: the core's own words, times in ms. */
export const evidence = z.object({
  verdict: z.enum(VERDICTS),
  kind: z.string().nullable(),
  since: number.nullable(),
  expectedAt: number.nullable().optional(),
  headline: z.string(),
  reason: z.string(),
  act: z.string().nullable(),
  changesIt: z.string().nullable(),
  evidence: z.array(z.object({ name: z.string(), value: number, threshold: number.nullable(), unit: z.string() })),
});

const when = number.min(-1e15).max(1e15);
const whenOrNot = when.nullable();
const inHand = z.object({ lookAgainAt: whenOrNot }).nullable();
const up = { since: when, openedAt: when, toldAt: when, repeats: z.int32().min(0), inHand };
/** Where the alert machine stands, as `AlertState` has it; times in ms. */
export const standing = z.discriminatedUnion('phase', [
  z.object({ phase: z.literal('inactive'), openedAt: whenOrNot }),
  z.object({ phase: z.literal('pending'), since: when, interrupted: z.boolean(), openedAt: whenOrNot }),
  z.object({ phase: z.literal('open'), ...up }),
  z.object({ phase: z.literal('keeping'), goneSince: when, ...up }),
  z.object({ phase: z.literal('dismissed'), goneSince: whenOrNot, openedAt: when }),
]);

export const bench = z.object({ shown: lotSchema.shape.bench, drink: z.object({ abvPercent: number, sugarGPerL: number }) });
export const pressure = z.object({ volumes: number, worstVolumes: number, cellarBar: number, warmBar: number, worstBar: number });
export const cost = z.object({ must: rangeSchema.nullable().optional(), known: z.boolean().optional(), other: number.nullable().optional() });
