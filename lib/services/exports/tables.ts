import { stringify } from 'csv-stringify/sync';
import { Op } from 'sequelize';
import { Entry, type Batch } from '@/db/models';
import { floatStays, readingsOfStay } from '@/db/queries/archive';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import { READING_COLUMNS } from '@/lib/contracts/archive';
import { defuse } from '@/lib/core/importing/cells';
import { namesOf } from '../entries/names';
import { iso } from '../iso';
import { batchesToExport } from './archive';
import { rowOf } from './sensors';

export const EXPORTED_TABLES = ['readings', 'log', 'batches'] as const;
export type ExportedTable = (typeof EXPORTED_TABLES)[number];

type Cell = string | number | Date | null | undefined;

/** RFC 4180; texts that a spreadsheet would run are defused, numbers stay numbers. */
const lines = (rows: Cell[][]) =>
  stringify(rows.map((row) => row.map((cell) => (cell instanceof Date ? iso(cell) : typeof cell === 'string' ? defuse(cell) : cell))), { record_delimiter: 'windows', quoted_string: false });

const BATCH_COLUMNS = ['name', 'kind', 'tag', 'place', 'pitched', 'ended', 'original_gravity', 'volume_l', 'vessel_l', 'vessel_kind', 'neck', 'yeast', 'state'];
const LOG_COLUMNS = ['batch', 'at', 'kind', 'text', 'gravity', 'gravity_read', 'temperature_c', 'neck', 'volume_l', 'sugar_g', 'fruit_g', 'by', 'detail'];

async function* batchLines(batches: readonly Batch[]): AsyncGenerator<string> {
  yield lines([BATCH_COLUMNS]);
  yield lines(batches.map((b) => [b.name, b.kind, b.tag, b.place, b.pitchedAt, b.endedAt, b.originalGravity, b.volumeL, b.vesselL, b.vesselKind, b.neck, b.yeast, b.state]));
}

async function* logLines(batches: readonly Batch[]): AsyncGenerator<string> {
  yield lines([LOG_COLUMNS]);
  for (const batch of batches) {
    const rows = await Entry.findAll({ where: { batchId: batch.id, removedAt: { [Op.is]: null } }, order: [['at', 'ASC'], ['id', 'ASC']] });
    const names = await namesOf(rows.map((row) => row.personId));
    if (rows.length > 0) yield lines(rows.map((e) => [batch.name, e.at, e.kind, e.text, e.gravity, e.gravityRead, e.temperatureC, e.neck, e.volumeL, e.sugarG, e.fruitG, e.personId && names.get(e.personId), e.detail && JSON.stringify(e.detail)]));
  }
}

async function* readingLines(batches: readonly Batch[], now: number): AsyncGenerator<string> {
  yield lines([['batch', 'float', ...READING_COLUMNS]]);
  for (const batch of batches) {
    for (const stay of await floatStays(batch.id)) {
      for await (const page of readingsOfStay({ ...stay, to: stay.to ?? new Date(now) })) yield lines(page.map((reading) => [batch.name, stay.name, ...rowOf(reading)]));
    }
  }
}

/** One table as CSV, of one batch or of all, as a stream. */
export async function exportTable(actor: Actor, table: ExportedTable, batchId: string | null, clock: Clock = systemClock): Promise<AsyncGenerator<string>> {
  const batches = await batchesToExport(actor, batchId);
  if (table === 'batches') return batchLines(batches);
  return table === 'log' ? logLines(batches) : readingLines(batches, clock.now());
}
