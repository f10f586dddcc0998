import { QueryTypes } from 'sequelize';
import { describe, expect, it } from 'vitest';
import { Batch, Entry, Sensor } from '@/db/models';
import type { Actor } from '@/lib/auth/policies';
import { ManualClock } from '@/lib/clock';
import { archiveSchema, type Archive } from '@/lib/contracts/archive';
import { importForm, importPreviewForm } from '@/lib/contracts/imports';
import { exportArchive } from '@/lib/services/exports/archive';
import { exportTable, type ExportedTable } from '@/lib/services/exports/tables';
import { keepImport } from '@/lib/services/imports/keep';
import { listImports } from '@/lib/services/imports/list';
import { previewImport } from '@/lib/services/imports/preview';
import { undoImport } from '@/lib/services/imports/undo';
import { recordMessages } from '@/lib/services/readings/record';
import { readingsOfBatch } from '@/db/queries/batch-readings';
import { useDatabase } from '../support/database';
import { buildBatch, buildEntry, buildMember, buildSensor } from '../support/factories';

const db = useDatabase();
const NOW = Date.parse('2026-03-20T12:00:00Z');
const HOUR = 3_600_000;
const clock = new ManualClock(NOW);

async function textOf(stream: AsyncGenerator<string>): Promise<string> {
  let text = '';
  for await (const piece of stream) text += piece;
  return text;
}
const archiveOf = async (actor: Actor, batchId: string | null = null) => archiveSchema.parse(JSON.parse(await textOf(await exportArchive(actor, batchId, clock))));
const table = async (actor: Actor, name: ExportedTable, batchId: string | null = null) => textOf(await exportTable(actor, name, batchId, clock));
const preview = (actor: Actor, form: object) => previewImport(actor, importPreviewForm.parse({ kind: 'readings', file_name: 'log.csv', ...form }), clock);
const count = async (what: string) => (await db.sequelize.query<{ n: number }>(`select count(*)::int as n from ${what}`, { type: QueryTypes.SELECT }))[0]!.n;

const CSV = ['when;SG;temp', '2026-03-01 06:00;1,050;18,5', '2026-03-01 07:00;1,049;18,6', 'never;1,048;18', '2026-03-01 08:00;9;18'].join('\n');

describe('a log file', () => {
  it('is kept also where as many come at once as the house has connections, each into a month of its own', async () => {
    const actor = await buildMember('brewer');
    const forms = await Promise.all(
      Array.from({ length: 10 }, async (_, month) => {
        const batch = await buildBatch({ cellarId: actor.cellarId });
        return importForm.parse({ kind: 'readings', file_name: 'old.csv', text: `when;SG;temp\n2019-${String(month + 1).padStart(2, '0')}-03 06:00;1,050;18,5`, batch_id: batch.id, columns: { at: 0, gravity: 1, temperature: 2, battery: null, signal: null } });
      }),
    );
    const kept = await Promise.all(forms.map((form) => keepImport(actor, form, clock)));
    expect(kept.map(({ counts }) => counts.readings)).toEqual(Array(10).fill(1));
  });

  it('is looked at without anything being kept', async () => {
    const actor = await buildMember('brewer');
    const before = [await count('readings'), await count('sensors'), await count('imports')];
    const seen = await preview(actor, { text: CSV, time_zone: 'Europe/Berlin' });
    expect(seen).toMatchObject({ columns: { at: 0, gravity: 1, temperature: 2 }, good: 2, bad: 2, from: '2026-03-01T05:00:00.000Z', gravity_unit: 'sg' });
    expect(seen.errors).toEqual([{ line: 4, says: '“never” is no time' }, { line: 5, says: 'a gravity of 9.000 cannot be' }]);
    expect([await count('readings'), await count('sensors'), await count('imports')]).toEqual(before);
  });

  it('says how many of its readings are from before the pitch of the batch it would go into', async () => {
    const actor = await buildMember('brewer');
    const at = (pitchedAt: string | null) => buildBatch({ cellarId: actor.cellarId, name: 'Windfall', pitchedAt: pitchedAt === null ? null : new Date(pitchedAt) });
    const notes = async (batch: Batch) => (await preview(actor, { text: CSV, time_zone: 'UTC', batch_id: batch.id })).notes;
    expect((await preview(actor, { text: CSV, time_zone: 'UTC' })).notes).toEqual([]);
    expect(await notes(await at('2026-03-01T06:00:00Z'))).toEqual([]);
    expect(await notes(await at(null))).toEqual([]);
    expect(await notes(await at('2026-03-01T06:30:00Z'))).toEqual([expect.stringMatching(/^1 of 2 readings is from before Windfall was pitched, 2026-03-01 06:30 UTC\. Kept, it counts /)]);
    expect(await notes(await at('2026-03-02T06:30:00Z'))).toEqual([expect.stringMatching(/^2 of 2 readings are from before Windfall was pitched/)]);
    await expect(preview(await buildMember('brewer'), { text: CSV, batch_id: (await at(null)).id })).rejects.toThrow('no such batch');
  });

  it('goes into a batch when a person agrees, and out again in one step', async () => {
    const actor = await buildMember('brewer');
    const batch = await buildBatch({ cellarId: actor.cellarId });
    const { columns, date_order, gravity_unit, temperature_unit } = await preview(actor, { text: CSV });
    const form = importForm.parse({ kind: 'readings', file_name: 'log.csv', text: CSV, batch_id: batch.id, columns, date_order, gravity_unit, temperature_unit, time_zone: 'UTC' });
    const kept = await keepImport(actor, form, clock);
    expect(kept).toMatchObject({ counts: { readings: 2, doubled: 0, refused: 2 }, batch: { id: batch.id } });
    expect((await readingsOfBatch(batch.id)).map((reading) => reading.gravity)).toEqual([1.05, 1.049]);
    expect(await undoImport(actor, kept.id, clock)).toMatchObject({ undone_at: new Date(NOW).toISOString() });
    expect(await readingsOfBatch(batch.id)).toEqual([]);
    expect(await Sensor.count({ where: { cellarId: actor.cellarId } })).toBe(0);
    await expect(undoImport(actor, kept.id, clock)).rejects.toThrow('taken out already');
    expect((await listImports(actor)).items).toHaveLength(1);
  });

  it('never goes into another cellar’s batch, nor is its import another’s to undo', async () => {
    const [mine, theirs] = [await buildMember('brewer'), await buildMember('brewer')];
    const [own, foreign] = [await buildBatch({ cellarId: mine.cellarId }), await buildBatch({ cellarId: theirs.cellarId })];
    const form = (batchId: string) => importForm.parse({ kind: 'readings', file_name: 'log.csv', text: CSV, batch_id: batchId, columns: { at: 0, gravity: 1, temperature: 2, battery: null, signal: null } });
    await expect(keepImport(mine, form(foreign.id), clock)).rejects.toThrow('no such batch');
    const kept = await keepImport(mine, form(own.id), clock);
    await expect(undoImport(theirs, kept.id, clock)).rejects.toThrow('no such import');
    await expect(exportArchive(mine, foreign.id, clock)).rejects.toThrow('no such batch');
    await expect(previewImport(await buildMember('hand', { cellarId: mine.cellarId }), importPreviewForm.parse({ kind: 'readings', file_name: 'x', text: CSV }), clock)).rejects.toThrow('you cannot');
  });
});

describe('a list of old batches', () => {
  const LIST = 'Name,Kind,Pitched,Ended,OG,FG,Litres,Notes\nWindfall,cider,2024-09-01,2024-11-01,1.050,1.002,9,"tart, ""bright"""\n,beer,,,,,,\n';
  it('becomes ended batches with their pitch, their end and their notes, and goes again', async () => {
    const actor = await buildMember('brewer');
    const seen = await previewImport(actor, importPreviewForm.parse({ kind: 'batches', file_name: 'old.csv', text: LIST }), clock);
    expect(seen).toMatchObject({ good: 1, bad: 1, errors: [{ line: 3, says: 'the name is empty' }] });
    const kept = await keepImport(actor, importForm.parse({ kind: 'batches', file_name: 'old.csv', text: LIST, columns: seen.columns }), clock);
    const [batch] = await Batch.findAll({ where: { cellarId: actor.cellarId } });
    expect(batch).toMatchObject({ name: 'Windfall', kind: 'cider', state: 'ended', originalGravity: 1.05, volumeL: 9 });
    expect((await Entry.findAll({ where: { batchId: batch!.id }, order: [['at', 'ASC'], ['kind', 'ASC']] })).map((entry) => [entry.kind, entry.gravity, entry.text])).toEqual([['pitch', 1.05, null], ['note', null, 'tart, "bright"'], ['reading', 1.002, null]]);
    await undoImport(actor, kept.id, clock);
    expect(await Batch.count({ where: { cellarId: actor.cellarId } })).toBe(0);
  });
});

/** A batch with everything a log and a float can hold. */
async function fullBatch(actor: Actor & { person: { name: string } }): Promise<Batch> {
  const batch = await buildBatch({ cellarId: actor.cellarId, name: '=cmd|calc', kind: 'mead', drinkColour: '#8c2243', tag: 7, place: "'quoted", pitchedAt: new Date(NOW - 20 * 24 * HOUR), originalGravity: 1.0987654321, yeast: '@yeast', attenuationMinPercent: 80, attenuationMaxPercent: 101.5, temperatureMinC: -1.5, temperatureMaxC: 22 });
  await buildEntry(batch, { kind: 'reading', at: new Date(NOW - 10 * HOUR), gravity: 1.0300001, gravityRead: 1.03, temperatureC: 17.3, calibratedAtC: 15.6, personId: actor.personId, text: 'Two\nlines, "quotes", Ž and 🍏' });
  await buildEntry(batch, { kind: 'addition', at: new Date(NOW - 9 * HOUR), sugarG: 12.5, detail: { ingredient: 'honey', grams: 15, note: '-1+2' }, revisedAt: new Date(NOW - HOUR) });
  await buildEntry(batch, { kind: 'note', at: new Date(NOW - 8 * HOUR), text: 'taken back', removedAt: new Date(NOW) });
  const { sensor } = await buildSensor({ batch, fromAt: new Date(NOW - 15 * 24 * HOUR), name: '+float' });
  const body = Array.from({ length: 300 }, (_, index) => ({ at: new Date(NOW - (301 - index) * HOUR + 123).toISOString(), gravity: 1.05 - index / 12345, temperature: 18.3 + (index % 7) / 9, battery: 3.71, signal: -71.5, sequence: index, foam: index % 5, inclination: 33.333 }));
  await recordMessages([{ sensor: { id: sensor.id, cellarId: sensor.cellarId, identifier: sensor.identifier }, road: 'mqtt', body: Buffer.from(JSON.stringify(body)), arrivedAt: NOW - HOUR }]);
  return batch;
}

/** What two houses cannot have in common: when it was exported. */
const comparable = (archive: Archive) => {
  const batches = archive.batches.map((batch) => ({ ...batch, id: null, entries: batch.entries.map((entry) => ({ ...entry, id: null })) }));
  const sensors = archive.sensors.map((sensor) => ({ ...sensor, created_at: null, stays: sensor.stays.map((stay) => ({ ...stay, batch: null })) }));
  return { ...archive, exported_at: null, cellar: null, batches, sensors };
};

describe('an archive', () => {
  it('goes through another house and comes out with nothing lost', async () => {
    const keeper = await buildMember('keeper', { name: 'Ōlïve' });
    await fullBatch(keeper);
    await buildBatch({ cellarId: keeper.cellarId, name: 'Second' });
    const out = await archiveOf(keeper);
    expect(out.batches[0]!.entries).toHaveLength(2);
    expect(out.sensors[0]!.readings).toHaveLength(300);

    const other = await buildMember('keeper', { name: 'Ōlïve' });
    const kept = await keepImport(other, importForm.parse({ kind: 'archive', file_name: 'cellar.json', text: JSON.stringify(out) }), clock);
    expect(kept.counts).toEqual({ batches: 2, entries: 2, readings: 300 });
    expect(comparable(await archiveOf(other))).toEqual(comparable(out));
    await undoImport(other, kept.id, clock);
    expect((await archiveOf(other)).batches).toEqual([]);
    // Undoing the copy leaves the original as it was.
    expect(comparable(await archiveOf(keeper))).toEqual(comparable(out));
  });

  it('holds one batch alone where one is asked for, and nothing of another cellar', async () => {
    const keeper = await buildMember('keeper');
    const batch = await fullBatch(keeper);
    await buildBatch({ cellarId: keeper.cellarId });
    const foreign = await fullBatch(await buildMember('keeper'));
    const one = await archiveOf(keeper, batch.id);
    expect(one.batches).toHaveLength(1);
    expect(JSON.stringify(await archiveOf(keeper))).not.toContain(foreign.id);
  });

  it.each([
    ['no JSON', '{', /is not JSON/],
    ['another root', '[]', /must be an object/],
    ['another format', '{"format":"else","version":1}', /is no archive of this house/],
    ['another version', JSON.stringify({ format: 'fallbright-archive', version: 2, exported_at: '2026-01-01T00:00:00Z', cellar: { name: '', time_zone: '' }, batches: [] }), /another version/],
    ['deep nesting', `${'['.repeat(100_000)}${']'.repeat(100_000)}`, /./],
  ])('is refused where it is %s', async (_name, text, says) => {
    const keeper = await buildMember('keeper');
    await expect(keepImport(keeper, importForm.parse({ kind: 'archive', file_name: 'x.json', text }), clock)).rejects.toMatchObject({ code: 'invalid', fields: { text: [expect.stringMatching(says)] } });
    expect(await Batch.count({ where: { cellarId: keeper.cellarId } })).toBe(0);
  });

  it('keeps all of it or nothing', async () => {
    const keeper = await buildMember('keeper');
    await fullBatch(keeper);
    const out = await archiveOf(keeper);
    const spoilt = structuredClone(out);
    spoilt.sensors.push({ ...structuredClone(out.sensors[0]!), stays: [], readings: [['1970-01-01T00:00:00Z', '1970-01-01T00:00:00Z', 1.05, null, null, 20, null, null, null, null, null]] });
    const other = await buildMember('keeper');
    await expect(keepImport(other, importForm.parse({ kind: 'archive', file_name: 'x.json', text: JSON.stringify(spoilt) }), clock)).rejects.toThrow();
    expect(await Batch.count({ where: { cellarId: other.cellarId } })).toBe(0);
  });
});

describe('tables as CSV', () => {
  it('hold no cell that a spreadsheet would run', async () => {
    const keeper = await buildMember('keeper');
    await fullBatch(keeper);
    for (const name of ['batches', 'log', 'readings'] as const) {
      const text = await table(keeper, name);
      const cells = text.split('\r\n').slice(1).flatMap((row) => row.split(/,(?=(?:[^"]*"[^"]*")*[^"]*$)/)).map((cell) => cell.replace(/^"/, ''));
      expect(cells.filter((cell) => /^[=+@\t\r]/.test(cell) || (/^-/.test(cell) && !/^-\d+(\.\d+)?$/.test(cell)))).toEqual([]);
      expect(cells.length).toBeGreaterThan(5);
    }
  });

  it('bring readings back as they were', async () => {
    const keeper = await buildMember('keeper');
    const batch = await fullBatch(keeper);
    const text = await table(keeper, 'readings', batch.id);
    const copy = await buildBatch({ cellarId: keeper.cellarId });
    const seen = await preview(keeper, { text });
    expect(seen).toMatchObject({ good: 300, bad: 0 });
    await keepImport(keeper, importForm.parse({ kind: 'readings', file_name: 'r.csv', text, batch_id: copy.id, columns: seen.columns }), clock);
    const [before, after] = [await readingsOfBatch(batch.id), await readingsOfBatch(copy.id)];
    expect(after.map(({ at, gravity, battery }) => ({ at, gravity: gravity.toFixed(6), battery }))).toEqual(before.map(({ at, gravity, battery }) => ({ at, gravity: gravity.toFixed(6), battery })));
  });
});
