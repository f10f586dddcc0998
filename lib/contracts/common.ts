import { z } from 'zod';
import { plainTime } from './time';
import { words } from './words';

z.config({ customError: words });

/** Nothing here happened before, or will after; outside PostgreSQL and JavaScript read years differently. */
const TIMES = { from: Date.UTC(1900, 0, 1), to: Date.UTC(2200, 0, 1) };

/** RFC 3339 with a zone, in any of its spellings. */
export const rfc3339 = (error: string) => z.string(error).overwrite(plainTime).check(z.iso.datetime({ offset: true, error, abort: true }));

export const timestamp = rfc3339('must be a time with a zone, such as 2026-03-04T06:00:00Z')
  .refine((value) => Date.parse(value) >= TIMES.from && Date.parse(value) < TIMES.to, 'must be a time between 1900 and 2200');

export const id = z.uuid('is not an identifier');

/** SG at 20 °C/20 °C; the span that a must or a drink can have. */
export const gravity = z.number('must be a number such as 1.048').min(0.97, 'must be between 0.970 and 1.200').max(1.2, 'must be between 0.970 and 1.200');

export const temperatureC = z.number('must be a number').min(-10, 'must be between -10 and 60 °C').max(60, 'must be between -10 and 60 °C');

/**
 * A line of text as people write it: trimmed, no control characters (PostgreSQL
 * refuses U+0000; the others forge log lines and mail headers), no lone surrogates.
 */
export const text = (max: number, min = 1) =>
  z
    .string('must be text')
    .trim()
    .min(min, min === 1 ? 'must not be empty' : `must have at least ${min} characters`)
    .max(max, `must have at most ${max} characters`)
    .refine((value) => value.isWellFormed() && !/[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f]/.test(value), 'holds characters that cannot be kept');

/** One line: as `text`, and no line breaks. */
export const line = (max: number, min = 1) => text(max, min).refine((value) => !/[\r\n\u2028\u2029]/.test(value), 'must be one line');

export const pageQuery = z.object({
  cursor: z.string().max(200).optional(),
  limit: z.coerce.number().int().min(1).max(200).default(50),
});

/** RFC 9457. */
export const problem = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  detail: z.string().optional(),
  errors: z.record(z.string(), z.array(z.string())).optional(),
});
export type Problem = z.infer<typeof problem>;
