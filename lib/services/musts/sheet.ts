import { camelKeys, snakeKeys } from '@/lib/contracts/case';
import { mustResultSchema, mustSheetSchema, type MustResultBody, type MustSheetBody } from '@/lib/contracts/musts';
import { reckonMust } from '@/lib/core/must/outcome';
import type { MustOutcome, MustSheet } from '@/lib/core/must/sheet';
import type { Range } from '@/lib/core/units/range';

/** A sheet as the core takes it. */
export const sheetOf = (body: MustSheetBody): MustSheet => camelKeys(body);

/** A sheet that the core changed, with the words that only the wire has. */
export function bodyOf(sheet: MustSheet, before: MustSheetBody): MustSheetBody {
  const notes = new Map(before.lines.map((line) => [line.id, line.note]));
  const wire = snakeKeys(sheet);
  return mustSheetSchema.parse({ ...wire, method: before.method, lines: wire.lines.map((line) => ({ ...line, note: notes.get(line.id) ?? null })) });
}

/** What a kept version says; it was checked when it was written. */
export const keptSheet = (body: unknown): MustSheetBody => mustSheetSchema.parse(body);

export const outcomeOf = (body: MustSheetBody): MustOutcome | null => {
  const result = reckonMust(sheetOf(body));
  return result.ok ? result.outcome : null;
};

export const resultOf = (body: MustSheetBody): MustResultBody => mustResultSchema.parse(snakeKeys(reckonMust(sheetOf(body))));

/** What the list of sheets shows of a version. */
export interface Sketch {
  volume: Range | null;
  originalGravity: Range | null;
  abv: Range | null;
}

export function sketchOf(body: MustSheetBody): Sketch {
  const outcome = outcomeOf(body);
  return { volume: outcome?.volumeL.value ?? null, originalGravity: outcome?.originalGravity.value ?? null, abv: outcome?.strength.balling.value ?? null };
}
