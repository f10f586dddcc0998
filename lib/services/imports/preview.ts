import { Cellar } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { ImportPreviewBody, ImportPreviewForm } from '@/lib/contracts/imports';
import type { ImportedBatch } from '@/lib/core/importing/batches';
import type { ImportedReading } from '@/lib/core/importing/readings';
import { loadBatch } from '../batches/load';
import { iso } from '../iso';
import { previewArchive } from './preview-archive';
import { readArchive, readBatches, readReadings } from './read';

const ROWS_SHOWN = 8;
const ERRORS_SHOWN = 100;

const day = (at: number | null) => (at === null ? '–' : iso(at).slice(0, 10));

const minute = (at: number) => `${iso(at).slice(0, 16).replace('T', ' ')} UTC`;

const readingWords = (reading: ImportedReading) => `${minute(reading.at)}, ${reading.gravity.toFixed(3)}${reading.temperature === null ? '' : `, ${reading.temperature.toFixed(1)} °C`}`;
const batchWords = (batch: ImportedBatch) => `${batch.name}, ${batch.kind}, ${day(batch.pitchedAt)} to ${day(batch.endedAt)}, ${batch.originalGravity?.toFixed(3) ?? '–'} to ${batch.finalGravity?.toFixed(3) ?? '–'}, ${Number(batch.volumeL.toFixed(2))} L${batch.volumeTaken ? ', as the file names no volume' : ''}`;

/** Readings from before the pitch count for the curve like the rest: another must's, or a float's on the bench, would bend it. */
async function notesOf(actor: Actor, batchId: string, times: readonly number[]): Promise<string[]> {
  const { name, pitchedAt } = await loadBatch(actor.cellarId, batchId);
  const early = pitchedAt === null ? 0 : times.filter((at) => at < pitchedAt.getTime()).length;
  if (pitchedAt === null || early === 0) return [];
  return [`${early} of ${times.length} ${times.length === 1 ? 'reading' : 'readings'} ${early === 1 ? 'is' : 'are'} from before ${name} was pitched, ${minute(pitchedAt.getTime())}. Kept, ${early === 1 ? 'it counts' : 'they count'} for its curve like any other: if ${early === 1 ? 'it is' : 'they are'} not of this must, cut ${early === 1 ? 'it' : 'them'} from the file, or choose another batch.`];
}

/** Looks at a file: what it would bring, and what is wrong with it, line by line. Nothing is kept. */
export async function previewImport(actor: Actor, form: ImportPreviewForm, clock: Clock = systemClock): Promise<ImportPreviewBody> {
  authorize(actor, 'data.import');
  const { timeZone } = await Cellar.findByPk(actor.cellarId, { rejectOnEmpty: true });
  if (form.kind === 'archive') return previewArchive(actor, readArchive(form), timeZone);
  const file = form.kind === 'readings' ? readReadings(form, timeZone, clock.now()) : readBatches(form, timeZone, clock.now());
  const { table, good, errors } = file;
  const times = form.kind === 'readings' ? good.map(({ value }) => (value as ImportedReading).at) : good.flatMap(({ value }) => (value as ImportedBatch).pitchedAt ?? []);
  const span = times.reduce<{ low: number; high: number } | null>((held, at) => ({ low: Math.min(held?.low ?? at, at), high: Math.max(held?.high ?? at, at) }), null);
  return {
    kind: form.kind,
    header: table.header.map((name) => name.slice(0, 80)),
    rows: table.rows.slice(0, ROWS_SHOWN).map((row) => row.cells.map((cell) => cell.slice(0, 80))),
    columns: file.options.columns,
    gravity_unit: 'gravityUnit' in file.options ? file.options.gravityUnit : null,
    temperature_unit: 'temperatureUnit' in file.options ? file.options.temperatureUnit : null,
    time_zone: file.options.timeZone,
    date_order: file.options.dateOrder,
    read: good.slice(0, ROWS_SHOWN).map(({ line, value }) => ({ line, says: form.kind === 'readings' ? readingWords(value as ImportedReading) : batchWords(value as ImportedBatch) })),
    good: good.length,
    bad: errors.length,
    errors: errors.slice(0, ERRORS_SHOWN),
    notes: form.kind === 'readings' && form.batch_id !== undefined ? await notesOf(actor, form.batch_id, times) : [],
    from: span && iso(span.low),
    to: span && iso(span.high),
  };
}
