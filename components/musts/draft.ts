import { camelKeys } from '@/lib/contracts/case';
import type { IngredientBody, YeastBody } from '@/lib/contracts/catalogue';
import { mustSheetSchema, type MustSheetBody } from '@/lib/contracts/musts';
import type { MustSheet } from '@/lib/core/must/sheet';
import { exactly, type Range } from '@/lib/core/units/range';
import type { MeasureUnit } from '@/lib/core/units/measures';
import type { DrinkKind } from '@/lib/core/types';
import { typedNumber } from '@/components/batch/figures';
import { amountText } from './amount';
import { written } from './written';

export interface LineDraft {
  id: string;
  ingredient: IngredientBody;
  /** As it is typed: `340`, `about 0.5`, `300 to 380`. */
  amount: string;
  unit: MeasureUnit;
  cost: string;
  note: string;
}

/** A must sheet as it is typed: every figure text. */
export interface SheetDraft {
  name: string;
  kind: DrinkKind;
  yeast: YeastBody | null;
  vessel: string;
  boiled: string;
  method: string;
  lines: readonly LineDraft[];
}

/** The sheet in the core's names. */
export const coreSheet = (body: MustSheetBody): MustSheet => camelKeys(body);

/** What an ingredient is usually measured in. */
const usualUnit = (ingredient: IngredientBody): MeasureUnit => (ingredient.kind === 'juice' || ingredient.kind === 'water' ? 'L' : ingredient.kind === 'grain' ? 'kg' : ingredient.key === 'sulphite-tablet' ? 'each' : 'g');

export const newLine = (ingredient: IngredientBody): LineDraft => ({ id: crypto.randomUUID(), ingredient, amount: '', unit: usualUnit(ingredient), cost: '', note: '' });

export const emptyDraft = (): SheetDraft => ({ name: '', kind: 'cider', yeast: null, vessel: '', boiled: '', method: '', lines: [] });

const text = (value: number | null) => (value === null ? '' : String(value));

export function draftOf(body: MustSheetBody): SheetDraft {
  return {
    name: body.name,
    kind: body.kind,
    yeast: body.yeast,
    vessel: text(body.vessel_l),
    boiled: body.boiled_away_l === 0 ? '' : text(body.boiled_away_l),
    method: body.method ?? '',
    lines: body.lines.map((line) => ({ id: line.id, ingredient: line.ingredient, amount: amountText(line.amount.quantity), unit: line.amount.unit, cost: text(line.cost_per_unit), note: line.note ?? '' })),
  };
}

/** Sentences by field; a line's stand under its id. */
export type SheetErrors = Record<string, string>;

/** The line's amount in its unit; null while none is written, or one in another unit than the line's. */
export function quantityOf({ amount, unit, ingredient }: LineDraft): Range | null {
  const read = written(amount, ingredient);
  return read && (read.unit === null || read.unit === unit) ? read.quantity : null;
}

/** The line with an amount as it is typed: a unit written behind it becomes the line's. */
export const withAmount = (line: LineDraft, amount: string): LineDraft => ({ ...line, amount, unit: written(amount, line.ingredient)?.unit ?? line.unit });
/** The unit is chosen beside it: what is written keeps its number alone. */
export const withUnit = (line: LineDraft, unit: MeasureUnit): LineDraft => ({ ...line, unit, amount: bareAmount(line) });
export const bareAmount = ({ amount, ingredient }: LineDraft): string => written(amount, ingredient)?.bare ?? amount;

/** The sheet without what is not filled in yet, for the figures beside the form; and what is still missing. */
export function bodyOf(draft: SheetDraft): { body: MustSheetBody; errors: SheetErrors } {
  const errors: SheetErrors = {};
  const words = (value: string) => (value.trim() === '' ? null : value.trim());
  const litres = (field: 'vessel' | 'boiled') => {
    const value = typedNumber(draft[field]);
    if (value === null || (value >= 0 && value <= 2000)) return value;
    errors[field] = 'must be a number of litres, at most 2000';
    return null;
  };
  if (draft.name.trim() === '') errors.name = 'give the sheet a name';
  const lines = draft.lines.flatMap((line) => {
    const quantity = quantityOf(line);
    if (!quantity) {
      errors[line.id] = line.amount.trim() === '' ? 'how much?' : 'write 340, about 340, or 300 to 380';
      return [];
    }
    const cost = typedNumber(line.cost);
    return [{ id: line.id, ingredient: line.ingredient, amount: { quantity, unit: line.unit }, cost_per_unit: cost !== null && cost >= 0 ? cost : null, note: words(line.note) }];
  });
  const vessel = litres('vessel');
  return {
    body: { name: draft.name.trim() || 'Must', kind: draft.kind, lines, yeast: draft.yeast, boiled_away_l: litres('boiled') ?? 0, vessel_l: vessel !== null && vessel >= 0.1 ? vessel : null, method: words(draft.method) },
    errors,
  };
}

/** What is kept, or what is wrong with it. */
export function checked(draft: SheetDraft): { sheet: MustSheetBody; errors: null } | { sheet: null; errors: SheetErrors } {
  const { body, errors } = bodyOf(draft);
  if (Object.keys(errors).length > 0) return { sheet: null, errors };
  const parsed = mustSheetSchema.safeParse(body);
  return parsed.success ? { sheet: parsed.data, errors: null } : { sheet: null, errors: Object.fromEntries(parsed.error.issues.map((issue) => [String(issue.path[0] ?? 'sheet'), issue.message])) };
}

/** The same line with the sugar that its label or a refractometer tells, % by mass (°Bx); null: typical again is not known here, so nothing changes. */
export function withSugar(line: LineDraft, percent: number): LineDraft {
  const { ingredient } = line;
  const share = exactly(Math.min(1 - ingredient.insoluble_share, Math.max(0, percent / 100)));
  return { ...line, ingredient: { ...ingredient, extract_share: share, source: 'told by the person or measured', status: 'told' } };
}
