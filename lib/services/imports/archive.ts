import { Op } from 'sequelize';
import { Batch, Entry, Membership, Person } from '@/db/models';
import type { Archive, ArchivedBatch } from '@/lib/contracts/archive';
import { PART_NAMES, type PartName } from '@/lib/contracts/archive-parts';
import { bringPhotos, type StoredPhotos } from './photos';
import { bringPart, checkStandings, refuseFile, type Bringing } from './parts';
import { bringSensor } from './sensors';

const date = (at: string | null) => (at === null ? null : new Date(at));

/** People of this cellar by their name: what they wrote stays theirs where they are here too. A name that two have is nobody's. */
export async function peopleByName({ cellarId, transaction }: Pick<Bringing, 'cellarId' | 'transaction'>): Promise<Map<string, string>> {
  const members = await Membership.findAll({ where: { cellarId }, transaction });
  const people = await Person.findAll({ where: { id: { [Op.in]: members.map((member) => member.personId) } }, transaction });
  const names = people.map((person) => person.name);
  return new Map(people.filter((person) => names.filter((name) => name === person.name).length === 1).map((person) => [person.name, person.id]));
}

async function bringBatch(batch: ArchivedBatch, importId: string, { cellarId, ids, people, transaction }: Bringing): Promise<string> {
  const row = await Batch.create(
    {
      id: ids.make(batch.id),
      cellarId,
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
      mustVersionId: batch.must_version === null ? null : (ids.of(batch.must_version) ?? null),
      mustShare: batch.must_share,
      attenuationMinPercent: batch.attenuation_min_percent,
      attenuationMaxPercent: batch.attenuation_max_percent,
      alcoholToleranceAbv: batch.alcohol_tolerance_abv,
      temperatureMinC: batch.temperature_min_c,
      temperatureMaxC: batch.temperature_max_c,
      state: batch.state,
      endedAt: date(batch.ended_at),
      createdBy: batch.by === null ? null : (people.get(batch.by) ?? null),
      createdAt: new Date(batch.created_at),
    },
    { transaction },
  );
  await Entry.bulkCreate(
    batch.entries.map((entry) => ({
      id: ids.make(entry.id),
      cellarId,
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
      detail: ids.within(entry.detail),
      personId: entry.by === null ? null : (people.get(entry.by) ?? null),
      createdAt: new Date(entry.created_at),
      revisedAt: date(entry.revised_at),
    })),
    { transaction },
  );
  return row.id;
}

/** Before the batches, which are made from them. */
const BEFORE_BATCHES: ReadonlySet<PartName> = new Set(['places', 'musts', 'must_versions', 'ingredients']);
/** What no batch takes along when it goes. */
const STANDS_ALONE = { places: 'places', musts: 'must_sheets', ingredients: 'catalogue_items', jobs: 'jobs' } as const;
const COUNTED: ReadonlyArray<readonly [PartName, string]> = [['musts', 'must sheets'], ['lots', 'lots'], ['tastings', 'tasting notes'], ['jobs', 'jobs'], ['places', 'places']];

export interface Made {
  /** Ids by table, for the step that takes it out again. */
  tables: Record<string, string[]>;
  sensors: number[];
}

/** Writes all that an archive holds into a cellar, as its own from now on. */
export async function bringArchive(archive: Archive, stored: StoredPhotos, importId: string, bringing: Bringing): Promise<{ counts: Record<string, number>; touched: string[]; made: Made }> {
  const made: Made = { tables: {}, sensors: [] };
  const written: Partial<Record<PartName, number>> = {};
  const bring = async (name: PartName) => {
    const rows = await bringPart(name, archive, bringing);
    written[name] = rows.length;
    if (name in STANDS_ALONE) made.tables[STANDS_ALONE[name as keyof typeof STANDS_ALONE]] = rows.map((row) => row.id as string);
  };
  for (const name of PART_NAMES) if (BEFORE_BATCHES.has(name)) await bring(name);
  checkStandings(archive);
  const touched: string[] = [];
  for (const batch of archive.batches) touched.push(await bringBatch(batch, importId, bringing));
  for (const name of PART_NAMES) if (!BEFORE_BATCHES.has(name)) await bring(name);
  let readings = 0;
  for (const sensor of archive.sensors) {
    const kept = await bringSensor(sensor, bringing);
    made.sensors.push(kept.id);
    readings += kept.readings;
  }
  const photos = await bringPhotos(archive.photos, stored, bringing);
  const more = [...COUNTED.map(([name, word]) => [word, written[name] ?? 0] as const), ['photos', photos] as const].filter(([, count]) => count > 0);
  return { counts: { batches: touched.length, entries: archive.batches.reduce((sum, batch) => sum + batch.entries.length, 0), readings, ...Object.fromEntries(more) }, touched, made };
}

/** A file that names one thing twice says nothing certain about either. */
export function checkNames(archive: Archive): void {
  const all = [...archive.batches, ...archive.batches.flatMap((batch) => batch.entries), ...PART_NAMES.flatMap((name) => archive[name]), ...archive.photos].flatMap((row) => (typeof row.id === 'string' ? row.id.toLowerCase() : []));
  if (new Set(all).size !== all.length) throw refuseFile('names two things by the same id');
}
