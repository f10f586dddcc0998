import { z } from 'zod';
import { id, line, timestamp } from './common';

/** `id` is its own; `refers`: the id of something in the archive; a person stands there by name; a `key` is kept where it names something of the archive. */
type Is = 'id' | 'value' | 'time' | 'refers' | 'person' | 'people' | 'key';

export interface PartField {
  column: string;
  schema: z.ZodType;
  is: Is;
  needed: boolean;
}

export interface ArchivePart {
  table: string;
  fields: Readonly<Record<string, PartField>>;
  /** `t` is the table. Ties are settled by what comes back in the same order. */
  order: string;
  /** Which rows, besides that they are the cellar's. */
  where?: string;
  /** How its rows are the cellar's where they do not say so themselves, `$cellarId`. */
  ofCellar?: string;
  /** Which rows go with one batch, `$batchId`; null: none. */
  ofBatch: string | null;
  /** What the cellar has already stays as it is. */
  keepsOwn?: boolean;
}

export const field = (is: Is, column: string, schema: z.ZodType, needed = true): PartField => ({ is, column, needed, schema: needed ? schema : schema.nullable().default(null) });

const MOST_DEEP = 20;
const isDeeper = (value: unknown, than: number): boolean => typeof value === 'object' && value !== null && (than === 0 || Object.values(value).some((item) => isDeeper(item, than - 1)));

/** What is kept whole: held to its schema, with nothing dropped that the schema does not name. */
const asItIs = (schema: z.ZodType): z.ZodType => {
  const { $schema: _, ...written } = z.toJSONSchema(schema, { io: 'input' });
  return z
    .unknown()
    .superRefine((value, context) => {
      const parsed = schema.safeParse(value);
      if (isDeeper(value, MOST_DEEP)) context.addIssue({ code: 'custom', message: 'is nested too deep' });
      else if (!parsed.success) context.addIssue({ code: 'custom', path: parsed.error.issues[0]?.path ?? [], message: parsed.error.issues[0]?.message ?? 'is wrong' });
    })
    .meta(written);
};

export const own = field('id', 'id', id);
export const value = (column: string, schema: z.ZodType) => field('value', column, schema);
export const whole = (column: string, schema: z.ZodType) => field('value', column, asItIs(schema));
export const maybe = (column: string, schema: z.ZodType) => field('value', column, schema, false);
export const time = (column: string) => field('time', column, timestamp);
export const maybeTime = (column: string) => field('time', column, timestamp, false);
export const refers = (column: string) => field('refers', column, id);
export const mayRefer = (column: string) => field('refers', column, id, false);
export const person = (column: string) => field('person', column, line(200), false);
