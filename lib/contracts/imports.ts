import { z } from 'zod';
import { BATCH_FIELDS } from '../core/importing/batches';
import { READING_FIELDS } from '../core/importing/readings';
import { id, line } from './common';

/** A log of years at 15 min has 35,000 lines a year. */
export const IMPORT_LIMIT_BYTES = 20_000_000;
export const IMPORT_LIMIT_ROWS = 100_000;

/** An archive holds photos; at some 0.5 MB each this is a hundred of them. */
export const ARCHIVE_LIMIT_BYTES = 60_000_000;

const column = z.number().int().min(0).max(199).nullable();
/** The file itself. */
const fileText = (limit: number) => z.string('must be text').min(1, 'is empty').max(limit, `must have at most ${limit / 1e6} MB`);
const file = { file_name: line(120), text: fileText(IMPORT_LIMIT_BYTES) };
const common = { time_zone: z.string().max(60).optional(), date_order: z.enum(['day', 'month']).optional() };

const readingsFile = z.object({
  kind: z.literal('readings'),
  ...file,
  columns: z.object(Object.fromEntries(READING_FIELDS.map((field) => [field, column])) as Record<(typeof READING_FIELDS)[number], typeof column>).optional(),
  gravity_unit: z.enum(['sg', 'points', 'plato']).optional(),
  temperature_unit: z.enum(['c', 'f']).optional(),
  ...common,
});
const batchesFile = z.object({
  kind: z.literal('batches'),
  ...file,
  columns: z.object(Object.fromEntries(BATCH_FIELDS.map((field) => [field, column])) as Record<(typeof BATCH_FIELDS)[number], typeof column>).optional(),
  ...common,
});
/** What this house exported as JSON. */
const archiveFile = z.object({ kind: z.literal('archive'), file_name: line(120), text: fileText(ARCHIVE_LIMIT_BYTES) });

/** A file to look at; nothing of it is kept. Columns and units left out are guessed; readings that name the batch they would go into are held against its pitch. */
export const importPreviewForm = z.discriminatedUnion('kind', [readingsFile.extend({ batch_id: id.optional() }), batchesFile, archiveFile]);
export type ImportPreviewForm = z.infer<typeof importPreviewForm>;
export type ReadingsFile = z.infer<typeof readingsFile>;
export type BatchesFile = z.infer<typeof batchesFile>;

/** The same file with what a person agreed to. */
export const importForm = z.discriminatedUnion('kind', [readingsFile.required({ columns: true }).extend({ batch_id: id }), batchesFile.required({ columns: true }), archiveFile]);
export type ImportForm = z.infer<typeof importForm>;

export const importPreviewSchema = z.object({
  kind: z.enum(['readings', 'batches', 'archive']),
  header: z.array(z.string()),
  /** The first rows as they stand in the file. */
  rows: z.array(z.array(z.string())),
  columns: z.record(z.string(), z.number().nullable()),
  gravity_unit: z.enum(['sg', 'points', 'plato']).nullable(),
  temperature_unit: z.enum(['c', 'f']).nullable(),
  time_zone: z.string(),
  date_order: z.enum(['day', 'month']),
  /** The first rows as they would be kept, in words. */
  read: z.array(z.object({ line: z.number().int(), says: z.string() })),
  good: z.number().int(),
  bad: z.number().int(),
  errors: z.array(z.object({ line: z.number().int(), says: z.string() })),
  /** What else is worth knowing before it is kept. */
  notes: z.array(z.string()),
  from: z.string().nullable(),
  to: z.string().nullable(),
});
export type ImportPreviewBody = z.infer<typeof importPreviewSchema>;

export const importSchema = z.object({
  id,
  kind: z.enum(['readings', 'batches', 'archive']),
  file_name: z.string(),
  counts: z.record(z.string(), z.number()),
  batch: z.object({ id, name: z.string() }).nullable(),
  by: z.string().nullable(),
  created_at: z.string(),
  undone_at: z.string().nullable(),
});
export type ImportBody = z.infer<typeof importSchema>;
export const importList = z.object({ items: z.array(importSchema) });
