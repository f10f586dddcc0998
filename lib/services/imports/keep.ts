import { randomUUID } from 'node:crypto';
import type { Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Batch, Cellar, Entry, ImportRun } from '@/db/models';
import type { ArchiveReading } from '@/db/queries/archive';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { ImportBody, ImportForm } from '@/lib/contracts/imports';
import type { ImportedBatch } from '@/lib/core/importing/batches';
import type { ImportedReading } from '@/lib/core/importing/readings';
import { InvalidError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { loadBatch } from '../batches/load';
import { notifyChange } from '../changes';
import { bringArchive, peopleByName } from './archive';
import { ensureMonths, importedFloat } from './float';
import { NewIds } from './ids';
import { loadImport } from './list';
import { makeIds, refuseFile } from './parts';
import { storePhotos } from './photos';
import { readArchive, readBatches, readReadings } from './read';

const nothing = () => new InvalidError('Nothing of the file can be kept.', { text: ['holds no row that can be kept'] });

const asRow = (now: number) => ({ at, gravity, temperature, battery, signal }: ImportedReading): ArchiveReading => ({
  measuredAt: new Date(at).toISOString(),
  // It is known from now on, and counts for all time: the past can be judged with it.
  receivedAt: new Date(Math.min(at, now)).toISOString(),
  gravity,
  gravitySent: null,
  inclination: null,
  temperature,
  battery,
  signal,
  foam: null,
  sequence: null,
  calibration: null,
});

/** What keeps a file, in the transaction of its import. */
type Keep = (transaction: Transaction) => Promise<{ counts: Record<string, number>; touched: string[]; sensorId?: number; batchId?: string }>;

/** The months' tables are made first, each in a moment of its own: within the import they would take a second connection, and it might wait for one that another import holds. */
async function keepReadings(actor: Actor, form: Extract<ImportForm, { kind: 'readings' }>, timeZone: string, now: number): Promise<Keep> {
  await loadBatch(actor.cellarId, form.batch_id);
  const { good, errors } = readReadings(form, timeZone, now);
  const readings = good.map(({ value }) => value);
  if (readings.length === 0) throw nothing();
  const [from, to] = readings.reduce(([low, high], { at }) => [Math.min(low, at), Math.max(high, at)], [Infinity, -Infinity]);
  await ensureMonths(readings.map(({ at }) => at), now);
  return async (transaction) => {
    const batch = await loadBatch(actor.cellarId, form.batch_id, transaction);
    const { sensorId, stored } = await importedFloat(batch, { name: `from ${form.file_name}`.slice(0, 60), from: new Date(from), to: new Date(to + 1) }, readings.map(asRow(now)), transaction);
    return { counts: { readings: stored, doubled: readings.length - stored, refused: errors.length }, sensorId, batchId: batch.id, touched: [batch.id] };
  };
}

function keepBatches(actor: Actor, importId: string, form: Extract<ImportForm, { kind: 'batches' }>, timeZone: string, now: number): Keep {
  const { good, errors } = readBatches(form, timeZone, now);
  if (good.length === 0) throw nothing();
  return async (transaction) => {
    const touched: string[] = [];
    for (const { value } of good) touched.push(await keepBatch(actor, importId, value, now, transaction));
    return { counts: { batches: good.length, refused: errors.length }, touched };
  };
}

async function keepBatch(actor: Actor, importId: string, batch: ImportedBatch, now: number, transaction: Transaction): Promise<string> {
  const row = await Batch.create(
    {
      cellarId: actor.cellarId,
      importId,
      name: batch.name,
      kind: batch.kind,
      drinkColour: 'gold',
      vesselKind: 'demijohn',
      volumeL: batch.volumeL,
      vesselL: batch.vesselL,
      neck: 'airlock',
      pitchedAt: batch.pitchedAt === null ? null : new Date(batch.pitchedAt),
      originalGravity: batch.originalGravity,
      yeast: batch.yeast,
      state: 'ended',
      endedAt: new Date(batch.endedAt ?? batch.pitchedAt ?? Date.UTC(2000, 0, 1)),
      createdBy: actor.personId,
    },
    { transaction },
  );
  const entry = (kind: string, at: number, more: Partial<Entry>) => Entry.create({ cellarId: actor.cellarId, batchId: row.id, kind, at: new Date(at), personId: actor.personId, ...more }, { transaction });
  if (batch.pitchedAt !== null) await entry('pitch', batch.pitchedAt, { gravity: batch.originalGravity, gravityRead: batch.originalGravity, volumeL: batch.volumeL });
  const end = batch.endedAt ?? batch.pitchedAt;
  if (batch.finalGravity !== null && end !== null) await entry('reading', end, { gravity: batch.finalGravity, gravityRead: batch.finalGravity });
  if (batch.notes !== null) await entry('note', end ?? now, { text: batch.notes });
  return row.id;
}

/** One archive unfolds in memory at a time. */
let bringing: Promise<unknown> = Promise.resolve();
function alone<T>(work: () => Promise<T>): Promise<T> {
  const done = bringing.then(work, work);
  bringing = done.catch(() => undefined);
  return done;
}

/** Keeps a file that a person has looked at: all of it in one step, which one step undoes. */
export async function keepImport(actor: Actor, form: ImportForm, clock: Clock = systemClock): Promise<ImportBody> {
  authorize(actor, 'data.import');
  const now = clock.now();
  const { timeZone } = await Cellar.findByPk(actor.cellarId, { rejectOnEmpty: true });
  const id = randomUUID();
  if (form.kind === 'archive') return alone(() => keepArchive(actor, id, form, now));
  const keep = form.kind === 'readings' ? await keepReadings(actor, form, timeZone, now) : keepBatches(actor, id, form, timeZone, now);
  return inTransaction(async (transaction) => {
    const run = await ImportRun.create({ id, cellarId: actor.cellarId, kind: form.kind, fileName: form.file_name, counts: {}, createdBy: actor.personId, createdAt: new Date(now) }, { transaction });
    const { touched, ...kept } = await keep(transaction);
    await run.update(kept, { transaction });
    return finish(actor, run, touched, transaction);
  });
}

async function finish(actor: Actor, run: ImportRun, touched: readonly string[], transaction: Transaction): Promise<ImportBody> {
  await auditBy(actor, 'import.kept', run.id, { kind: run.kind, file: run.fileName, ...run.counts }, transaction);
  for (const batch of touched) await notifyChange({ cellar: actor.cellarId, kind: 'batch', batch }, transaction);
  return loadImport(actor, run.id, transaction);
}

async function keepArchive(actor: Actor, id: string, form: Extract<ImportForm, { kind: 'archive' }>, now: number): Promise<ImportBody> {
  const archive = readArchive(form);
  const { cellarId } = actor;
  for (const sensor of archive.sensors) await ensureMonths(sensor.readings.map(([measuredAt]) => measuredAt), now);
  const ids = new NewIds(now);
  makeIds(archive, ids);
  const stored = await storePhotos(cellarId, archive.photos, ids);
  try {
    return await inTransaction(async (transaction) => {
      const run = await ImportRun.create({ id, cellarId, kind: 'archive', fileName: form.file_name, counts: {}, createdBy: actor.personId, createdAt: new Date(now) }, { transaction });
      const people = await peopleByName({ cellarId, transaction });
      const { counts, touched, made } = await bringArchive(archive, stored, id, { cellarId, ids, people, transaction });
      await run.update({ counts, made }, { transaction });
      if (made.sensors.length > 0) await notifyChange({ cellar: cellarId, kind: 'sensor', batch: null }, transaction);
      return finish(actor, run, touched, transaction);
    });
  } catch (error) {
    // What the tables do not take (classes 22 and 23 of SQLSTATE) contradicts itself in the file.
    const code = (error as { original?: { code?: unknown } }).original?.code;
    throw typeof code === 'string' && /^2[23]/.test(code) ? refuseFile('holds parts that contradict each other') : error;
  }
}
