import { DRINK_KINDS, type DrinkKind } from '../types';
import { numberIn } from './numbers';
import { timeIn, type DateOrder } from './times';

export const BATCH_FIELDS = ['name', 'kind', 'pitched', 'ended', 'original_gravity', 'final_gravity', 'volume', 'vessel', 'yeast', 'notes'] as const;
export type BatchField = (typeof BATCH_FIELDS)[number];

export interface BatchOptions {
  columns: Record<BatchField, number | null>;
  timeZone: string;
  dateOrder: DateOrder;
}

export interface ImportedBatch {
  name: string;
  kind: DrinkKind;
  /** ms since 1970. */
  pitchedAt: number | null;
  endedAt: number | null;
  originalGravity: number | null;
  finalGravity: number | null;
  volumeL: number;
  /** The file names no volume: a demijohn's is taken. */
  volumeTaken: boolean;
  vesselL: number;
  yeast: string | null;
  notes: string | null;
}

const NAMES: Record<BatchField, RegExp> = {
  name: /^(batch|name|title|beer|brew)( name)?$/i,
  kind: /^(kind|type|style|drink)$/i,
  pitched: /pitch|start|brew(ed|ing)?[ _]?(date|on|at)?$|^date$|made/i,
  ended: /end|bottl|keg|finish|pack/i,
  original_gravity: /^og$|original|starting[ _]gravity/i,
  final_gravity: /^fg$|final/i,
  volume: /volume|litre|liter|^l$|size|amount|gallon/i,
  vessel: /vessel|carboy|fermenter|demijohn/i,
  yeast: /yeast/i,
  notes: /note|comment|remark/i,
};

/** What people call what they make. */
const KINDS: [RegExp, DrinkKind][] = [
  [/cider|perry|cyser/i, 'cider'],
  [/mead|melomel|honey/i, 'mead'],
  [/wine|fruit|berry|elder/i, 'wine'],
  [/beer|ale|stout|porter|lager|bitter|ipa|pils|wheat|saison|mild/i, 'beer'],
];

export function guessBatches(header: readonly string[], timeZone: string): BatchOptions {
  const columns = Object.fromEntries(BATCH_FIELDS.map((field) => [field, null])) as BatchOptions['columns'];
  const taken = new Set<number>();
  for (const field of BATCH_FIELDS) {
    const index = header.findIndex((name, column) => !taken.has(column) && NAMES[field].test(name.trim()));
    if (index < 0) continue;
    columns[field] = index;
    taken.add(index);
  }
  return { columns, timeZone, dateOrder: 'day' };
}

/** NIST Handbook 44 (2024), appendix C: 1 gal of the US is 3.785 411 784 L, an imperial one 4.546 09 L. */
const LITRES: [RegExp, number][] = [
  [/^(l|lt|ltr|litres?|liters?)?$/i, 1],
  [/^ml$/i, 0.001],
  [/^us ?gal(lons?)?$/i, 3.785411784],
  [/^(imp(erial)?|uk) ?gal(lons?)?$/i, 4.54609],
];

/** Litres of `5 L`, `4,5`, `1 US gal`; null: not understood. */
function litresIn(cell: string): number | null {
  const [, figure = '', unit = ''] = /^([\d.,\s]+)\s*(.*)$/.exec(cell) ?? [];
  const value = numberIn(figure);
  const litres = LITRES.find(([words]) => words.test(unit.replace(/\./g, '').trim()))?.[1];
  return value === null || litres === undefined ? null : value * litres;
}

/** A demijohn's fill, L, where the file says nothing. */
const TAKEN_L = 4.5;

const gravityOk = (value: number | null) => value === null || (value >= 0.97 && value <= 1.2);
const CONTROL = /[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f]/;

/** One row as a batch, or what is wrong with it. */
export function batchIn(row: readonly string[], options: BatchOptions, latest: number): ImportedBatch | string {
  const cell = (field: BatchField) => (options.columns[field] === null ? '' : (row[options.columns[field]] ?? '').trim());
  const time = (field: 'pitched' | 'ended') => (cell(field) === '' ? null : timeIn(cell(field), options.timeZone, options.dateOrder));
  const gravity = (field: 'original_gravity' | 'final_gravity') => {
    const value = numberIn(cell(field));
    return value !== null && value > 500 ? value / 1000 : value;
  };
  const name = cell('name').replace(/\s+/g, ' ');
  if (name === '') return 'the name is empty';
  if (name.length > 80) return 'the name has more than 80 characters';
  for (const field of ['name', 'yeast', 'notes'] as const) if (CONTROL.test(cell(field)) || !cell(field).isWellFormed()) return `the ${field} holds characters that cannot be kept`;
  const [pitchedAt, endedAt] = [time('pitched'), time('ended')];
  if (cell('pitched') !== '' && pitchedAt === null) return `“${cell('pitched').slice(0, 40)}” is no time`;
  if (cell('ended') !== '' && endedAt === null) return `“${cell('ended').slice(0, 40)}” is no time`;
  if ((pitchedAt ?? 0) > latest || (endedAt ?? 0) > latest) return 'a time lies ahead';
  if (pitchedAt !== null && endedAt !== null && endedAt < pitchedAt) return 'it ended before it was pitched';
  for (const field of ['original_gravity', 'final_gravity'] as const) if (cell(field) !== '' && gravity(field) === null) return `“${cell(field).slice(0, 40)}” is no gravity`;
  const [originalGravity, finalGravity] = [gravity('original_gravity'), gravity('final_gravity')];
  if (!gravityOk(originalGravity) || !gravityOk(finalGravity)) return 'a gravity cannot be';
  const given = litresIn(cell('volume'));
  if (cell('volume') !== '' && given === null) return `“${cell('volume').slice(0, 40)}” is no volume: write litres, US gal or imp gal`;
  const volumeL = given ?? TAKEN_L;
  const vesselL = Math.max(volumeL, litresIn(cell('vessel')) ?? 0);
  if (!(volumeL >= 0.1 && vesselL <= 2_000)) return 'the volume must be 0.1 to 2000 L';
  const told = cell('kind');
  const kind = DRINK_KINDS.find((drink) => drink === told.toLowerCase()) ?? KINDS.find(([names]) => names.test(`${told} ${name}`))?.[1] ?? 'beer';
  return { name, kind, pitchedAt, endedAt, originalGravity, finalGravity, volumeL, volumeTaken: given === null, vesselL, yeast: cell('yeast').slice(0, 80) || null, notes: cell('notes').slice(0, 2_000) || null };
}
