import { randomUUID } from 'node:crypto';
import type { Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Batch, Cellar, Entry, ImportRun, Membership, Person } from '@/db/models';
import type { ArchiveReading } from '@/db/queries/archive';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { ArchivedBatch } from '@/lib/contracts/archive';
import type { ImportBody, ImportForm } from '@/lib/contracts/imports';
import type { ImportedBatch } from '@/lib/core/importing/batches';
import type { ImportedReading } from '@/lib/core/importing/readings';
import { InvalidError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { loadBatch } from '../batches/load';
import { notifyChange } from '../changes';
import { ensureMonths, importedFloat } from './float';
import { loadImport } from './list';
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
});

async function keepReadings(actor: Actor, form: Extract<ImportForm, { kind: 'readings' }>, timeZone: string, now: number, transaction: Transaction) {
  const batch = await loadBatch(actor.cellarId, form.batch_id, transaction);
  const { good, errors } = readReadings(form, timeZone, now);
  const readings = good.map(({ value }) => value);
  if (readings.length === 0) throw nothing();
  const [from, to] = readings.reduce(([low, high], { at }) => [Math.min(low, at), Math.max(high, at)], [Infinity, -Infinity]);
  await ensureMonths(readings.map(({ at }) => at), now);
  const { sensorId, stored } = await importedFloat(batch, { name: `from ${form.file_name}`.slice(0, 60), from: new Date(from), to: new Date(to + 1) }, readings.map(asRow(now)), transaction);
  return { counts: { readings: stored, doubled: readings.length - stored, refused: errors.length }, sensorId, batchId: batch.id, touched: [batch.id] };
}

async function keepBatch(actor: Actor, importId: string, batch: ImportedBatch, transaction: Transaction): Promise<string> {
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
  if (batch.notes !== null) await entry('note', end ?? Date.now(), { text: batch.notes });
  return row.id;
}

const date = (at: string | null) => (at === null ? null : new Date(at));

/** People of this cellar by their name: the log keeps its authors where they are here too. */
async function peopleByName(cellarId: string, transaction: Transaction): Promise<Map<string, string>> {
  const members = await Membership.findAll({ where: { cellarId }, transaction });
  const people = await Person.findAll({ where: { id: members.map((member) => member.personId) }, transaction });
  return new Map(people.map((person) => [person.name, person.id]));
}

async function keepArchived(actor: Actor, importId: string, batch: ArchivedBatch, people: ReadonlyMap<string, string>, transaction: Transaction): Promise<{ id: string; entries: number; readings: number }> {
  const row = await Batch.create(
    {
      cellarId: actor.cellarId,
      importId,
      name: batch.name,
      kind: batch.kind,
      drinkColour: batch.drink_colour,
      vesselKind: batch.vessel_kind,
      tag: batch.tag,
      place: batch.place,
      volumeL: batch.volume_l,
      vesselL: batch.vessel_l,
      neck: batch.neck,
      pitchedAt: date(batch.pitched_at),
      originalGravity: batch.original_gravity,
      yeast: batch.yeast,
      attenuationMinPercent: batch.attenuation_min_percent,
      attenuationMaxPercent: batch.attenuation_max_percent,
      alcoholToleranceAbv: batch.alcohol_tolerance_abv,
      temperatureMinC: batch.temperature_min_c,
      temperatureMaxC: batch.temperature_max_c,
      state: batch.state,
      endedAt: date(batch.ended_at),
      createdBy: actor.personId,
      createdAt: new Date(batch.created_at),
    },
    { transaction },
  );
  await Entry.bulkCreate(
    batch.entries.map((entry) => ({
      id: randomUUID(),
      cellarId: actor.cellarId,
      batchId: row.id,
      kind: entry.kind,
      at: new Date(entry.at),
      text: entry.text,
      gravity: entry.gravity,
      gravityRead: entry.gravity_read,
      temperatureC: entry.temperature_c,
      calibratedAtC: entry.calibrated_at_c,
      neck: entry.neck,
      volumeL: entry.volume_l,
      sugarG: entry.sugar_g,
      fruitG: entry.fruit_g,
      detail: entry.detail,
      personId: (entry.by !== null && people.get(entry.by)) || null,
      createdAt: new Date(entry.created_at),
      revisedAt: date(entry.revised_at),
    })),
    { transaction },
  );
  let readings = 0;
  for (const float of batch.floats) {
    const rows = float.readings.map(([measuredAt, receivedAt, gravity, gravitySent, inclination, temperature, battery, signal, foam, sequence]) => ({ measuredAt, receivedAt, gravity, gravitySent, inclination, temperature, battery, signal, foam, sequence }));
    readings += (await importedFloat(row, { name: float.name, from: new Date(float.from), to: new Date(float.to) }, rows, transaction)).stored;
  }
  return { id: row.id, entries: batch.entries.length, readings };
}

/** Keeps a file that a person has looked at: all of it in one step, which one step undoes. */
export async function keepImport(actor: Actor, form: ImportForm, clock: Clock = systemClock): Promise<ImportBody> {
  authorize(actor, 'data.import');
  const now = clock.now();
  const { timeZone } = await Cellar.findByPk(actor.cellarId, { rejectOnEmpty: true });
  const archive = form.kind === 'archive' ? readArchive(form) : null;
  if (archive) {
    if (archive.batches.length === 0) throw nothing();
    for (const batch of archive.batches) for (const float of batch.floats) await ensureMonths(float.readings.map(([measuredAt]) => measuredAt), now);
  }
  const id = randomUUID();
  return inTransaction(async (transaction) => {
    const run = await ImportRun.create({ id, cellarId: actor.cellarId, kind: form.kind, fileName: form.file_name, counts: {}, createdBy: actor.personId, createdAt: new Date(now) }, { transaction });
    let counts: Record<string, number>;
    let touched: string[] = [];
    let into: { sensorId: number; batchId: string } | null = null;
    if (form.kind === 'readings') {
      const kept = await keepReadings(actor, form, timeZone, now, transaction);
      ({ counts, touched } = kept);
      into = { sensorId: kept.sensorId, batchId: kept.batchId };
    } else if (archive) {
      const people = await peopleByName(actor.cellarId, transaction);
      counts = { batches: 0, entries: 0, readings: 0 };
      for (const batch of archive.batches) {
        const kept = await keepArchived(actor, id, batch, people, transaction);
        counts = { batches: counts.batches! + 1, entries: counts.entries! + kept.entries, readings: counts.readings! + kept.readings };
        touched.push(kept.id);
      }
    } else {
      const { good, errors } = readBatches(form as Extract<ImportForm, { kind: 'batches' }>, timeZone, now);
      if (good.length === 0) throw nothing();
      for (const { value } of good) touched.push(await keepBatch(actor, id, value, transaction));
      counts = { batches: good.length, refused: errors.length };
    }
    await run.update({ counts, ...into }, { transaction });
    await auditBy(actor, 'import.kept', id, { kind: form.kind, file: form.file_name, ...counts }, transaction);
    for (const batch of touched) await notifyChange({ cellar: actor.cellarId, kind: 'batch', batch }, transaction);
    return loadImport(actor, id, transaction);
  });
}
