/** What changed between two sheets: "one change noted". */
import type { Amount, MustLine } from './ingredients';
import { gramsOf } from './line';
import type { MustSheet } from './sheet';

export interface SheetChange {
  kind: 'added' | 'left_out' | 'more' | 'less' | 'figures' | 'other_ingredient' | 'yeast' | 'vessel' | 'kind' | 'boil';
  /** The line, or null for the sheet itself. */
  line: string | null;
  sentence: string;
}

const number = (value: number): string => String(Number(value.toPrecision(3)));

/** `340 g`, `0.5 jar (0.4 to 0.6)`. */
export function amountText(line: MustLine): string {
  const { quantity, unit } = line.amount;
  const name = unit === 'each' ? (line.ingredient.each?.name ?? 'piece') : unit;
  const spread = quantity.lo === quantity.hi ? '' : ` (${number(quantity.lo)} to ${number(quantity.hi)})`;
  return `${number(quantity.value)} ${name}${spread}`;
}

const same = (a: Amount, b: Amount): boolean =>
  a.unit === b.unit && a.quantity.value === b.quantity.value && a.quantity.lo === b.quantity.lo && a.quantity.hi === b.quantity.hi;

function lineChange(before: MustLine, after: MustLine): SheetChange[] {
  if (before.ingredient.key !== after.ingredient.key) {
    return [{ kind: 'other_ingredient', line: after.id, sentence: `${after.ingredient.name} in place of ${before.ingredient.name}.` }];
  }
  const { name } = after.ingredient;
  if (same(before.amount, after.amount)) {
    return sameFigures(before, after) ? [] : [{ kind: 'figures', line: after.id, sentence: `${name}: other figures for its sugar, nitrogen or sulphite.` }];
  }
  // Grams, so that a change of unit alone is not called more or less.
  const less = gramsOf(after.amount, after.ingredient).value < gramsOf(before.amount, before.ingredient).value;
  return [{ kind: less ? 'less' : 'more', line: after.id, sentence: `${less ? 'Less' : 'More'} ${after.ingredient.name}: ${amountText(before)} → ${amountText(after)}.` }];
}

const FIGURES = ['extractShare', 'fermentableShare', 'yanMgPerG', 'sulphiteMgPerG', 'densityGPerMl'] as const;

const sameFigures = (a: MustLine, b: MustLine): boolean =>
  FIGURES.every((key) => (['lo', 'value', 'hi'] as const).every((end) => a.ingredient[key]?.[end] === b.ingredient[key]?.[end]));

/** All changes from one version of a sheet to another; lines are known by their id. Names and notes do not count. */
export function compareSheets(before: MustSheet, after: MustSheet): SheetChange[] {
  const old = new Map(before.lines.map((line) => [line.id, line]));
  const kept = new Set(after.lines.map((line) => line.id));
  const changes: SheetChange[] = [];
  for (const line of after.lines) {
    const was = old.get(line.id);
    if (was) changes.push(...lineChange(was, line));
    else changes.push({ kind: 'added', line: line.id, sentence: `Added ${line.ingredient.name}: ${amountText(line)}.` });
  }
  for (const line of before.lines) {
    if (!kept.has(line.id)) changes.push({ kind: 'left_out', line: line.id, sentence: `Left out ${line.ingredient.name}.` });
  }
  const say = (kind: SheetChange['kind'], sentence: string): void => void changes.push({ kind, line: null, sentence });
  if (before.yeast?.name !== after.yeast?.name) say('yeast', `Yeast: ${before.yeast?.name ?? 'none'} → ${after.yeast?.name ?? 'none'}.`);
  if (before.vesselL !== after.vesselL) say('vessel', `Vessel: ${before.vesselL ?? 'none'} → ${after.vesselL ?? 'none'} L.`);
  if (before.kind !== after.kind) say('kind', `Kind: ${before.kind} → ${after.kind}.`);
  if (before.boiledAwayL !== after.boiledAwayL) say('boil', `Boiled away: ${number(before.boiledAwayL)} → ${number(after.boiledAwayL)} L.`);
  return changes;
}
