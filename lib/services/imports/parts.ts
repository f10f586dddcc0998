import { randomUUID } from 'node:crypto';
import { Op, type Transaction } from 'sequelize';
import { Lot, Place } from '@/db/models';
import { insertPart, type PartRow } from '@/db/queries/archive-parts';
import type { Archive } from '@/lib/contracts/archive';
import { ARCHIVE_PARTS, type ArchivedRow, type PartName } from '@/lib/contracts/archive-parts';
import type { MustSheetBody } from '@/lib/contracts/musts';
import { isUp, type AlertState } from '@/lib/core/alerts/machine';
import { ruleNamed, type RuleName } from '@/lib/core/alerts/rules';
import { InvalidError } from '@/lib/errors';
import { presentItem } from '../catalogue/present';
import { sketchOf } from '../musts/sheet';
import type { NewIds } from './ids';

export interface Bringing {
  cellarId: string;
  ids: NewIds;
  /** People of this cellar by their name. */
  people: ReadonlyMap<string, string>;
  transaction: Transaction;
}

export const refuseFile = (says: string) => new InvalidError('The file cannot be read.', { text: [says] });

/** A row as its table takes it; null: it is somebody's who is not here. */
function tableRow(name: PartName, row: ArchivedRow, { ids, people }: Bringing): PartRow | null {
  const made: PartRow = {};
  for (const [field, { column, is, needed }] of Object.entries(ARCHIVE_PARTS[name].fields)) {
    const value = row[field];
    switch (is) {
      case 'id':
        made[column] = ids.of(value as string);
        break;
      case 'refers':
        made[column] = value === null ? null : (ids.of(value as string) ?? null);
        if (needed && made[column] === null) throw refuseFile(`${name} refer to what is not in it`);
        break;
      case 'person':
        made[column] = value === null ? null : (people.get(value as string) ?? null);
        if (needed && made[column] === null) return null;
        break;
      case 'people':
        made[column] = (value as string[]).flatMap((one) => people.get(one) ?? []);
        break;
      case 'key':
        // A key that names nothing of the file could be another's.
        made[column] = value === null || ids.within(value) === value ? null : ids.within(value);
        break;
      default:
        made[column] = typeof value === 'object' ? ids.within(value) : value;
    }
  }
  return made;
}

/** A place that is here by this name is that place. */
async function placesHere(rows: readonly ArchivedRow[], { cellarId, ids, transaction }: Bringing): Promise<ArchivedRow[]> {
  const here = new Map((await Place.findAll({ where: { cellarId, removedAt: { [Op.is]: null } }, transaction })).map((place) => [place.name.toLowerCase(), place.id]));
  return rows.filter((row) => {
    const known = row.removed_at === null ? here.get((row.name as string).toLowerCase()) : undefined;
    if (known) ids.is(row.id as string, known);
    return !known;
  });
}

/** Two lots of a cellar never have the same code: one that comes in second gets a number. */
async function freeCodes(rows: readonly ArchivedRow[], { cellarId, transaction }: Bringing): Promise<ArchivedRow[]> {
  const taken = new Set((await Lot.findAll({ attributes: ['code'], where: { cellarId }, transaction, raw: true })).map(({ code }) => code.toLowerCase()));
  return rows.map((row) => {
    const wanted = row.code as string;
    let code = wanted;
    for (let turn = 2; taken.has(code.toLowerCase()); turn += 1) code = `${wanted}-${turn}`;
    taken.add(code.toLowerCase());
    return { ...row, code };
  });
}

function checkItem(row: ArchivedRow): void {
  try {
    presentItem({ id: row.id as string, sort: row.sort as 'ingredient' | 'yeast', body: row.body });
  } catch {
    throw refuseFile('ingredients are not what their sort says');
  }
}

/** What a part needs besides being written. */
async function prepared(name: PartName, rows: readonly ArchivedRow[], bringing: Bringing): Promise<readonly ArchivedRow[]> {
  if (name === 'places') return placesHere(rows, bringing);
  if (name === 'lots') return freeCodes(rows, bringing);
  if (name === 'ingredients') rows.forEach(checkItem);
  return rows;
}

/** What goes on has a rule that will end it, and a rule that has something up says what. */
export function checkStandings({ alerts, standings }: Archive): void {
  const goesOn = new Map(alerts.filter((alert) => alert.state !== 'resolved').map((alert) => [alert.id as string, alert]));
  const upOf = (row: ArchivedRow) => isUp(row.state as AlertState);
  for (const row of standings.filter(upOf)) {
    const alert = goesOn.get(row.alert as string);
    if (!alert || alert.batch !== row.batch || alert.call !== ruleNamed(row.rule as RuleName).call) throw refuseFile('standings refer to an alert that does not go on');
    goesOn.delete(row.alert as string);
  }
  if (goesOn.size > 0) throw refuseFile('alerts go on without an end');
}

/** Columns of a part that the archive does not hold: reckoned from what it does, never believed. */
const FURTHER: Partial<Record<PartName, (row: PartRow) => PartRow>> = {
  // What the list of sheets shows.
  must_versions: (row) => ({ sketch: sketchOf(row.body as MustSheetBody) }),
  // It went from another house: nothing of it is sent again, nor who heard it told what becomes of it.
  told: () => ({ dedupe_key: `brought:${randomUUID()}`, payload: {} }),
};

/** Gives everything that has an id a new one, in the archive's order. */
export function makeIds(archive: Archive, ids: NewIds): void {
  const make = (rows: readonly { id?: unknown }[]) => {
    for (const { id } of rows) if (typeof id === 'string') ids.make(id);
  };
  make(archive.batches);
  for (const batch of archive.batches) make(batch.entries);
  for (const name of Object.keys(ARCHIVE_PARTS) as PartName[]) make(archive[name]);
  make(archive.photos);
}

/** Writes one part. @returns the rows as they were written */
export async function bringPart(name: PartName, archive: Archive, bringing: Bringing): Promise<PartRow[]> {
  const rows = (await prepared(name, archive[name], bringing)).map((row) => tableRow(name, row, bringing)).filter((row) => row !== null);
  const further = FURTHER[name];
  const whole = further ? rows.map((row) => ({ ...row, ...further(row) })) : rows;
  await insertPart(ARCHIVE_PARTS[name], bringing.cellarId, whole, bringing.transaction, further && rows[0] ? Object.keys(further(rows[0])) : []);
  return rows;
}
