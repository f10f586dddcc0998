/** From the lines of a must sheet to what it promises. */
import { figure, how, spell, type RangeFigure, type Source } from '../how/how';
import { SOURCES } from '../how/sources';
import { strengthByMethodsOf } from '../strength/methods';
import { pointsOf } from '../units/convert';
import { sum, times, type Range } from '../units/range';
import type { MustLine } from './ingredients';
import { inputsOf, UnweighableLine } from './line';
import { neckForecast } from './neck';
import { nitrogenSheet } from './nitrogen';
import { notesOf, sweetnessOf } from './notes';
import type { MustOutcome, MustProblem, MustResult, MustSheet } from './sheet';
import { readSpread, swing, type Swings } from './spread';
import { inputsOfSheet, massesAt, stateAt, strengthOf, type MustState } from './state';

/** Strongest must that is reckoned, mass of extract: 45 °Bx, about 1.204. */
const STRONGEST = 0.45;

/** What stops a sheet from being reckoned; empty where nothing does. */
export function problemsOf(sheet: MustSheet): MustProblem[] {
  const unweighable = sheet.lines.flatMap((line): MustProblem[] => {
    try {
      inputsOf(line);
      return [];
    } catch (error) {
      if (!(error instanceof UnweighableLine)) throw error;
      return [{ line: line.id, sentence: `${error.message}.` }];
    }
  });
  if (unweighable.length > 0) return unweighable;
  const masses = massesAt(sheet, inputsOfSheet(sheet).map((r) => r.value));
  if (sheet.lines.length === 0) return [{ line: null, sentence: 'Nothing in it yet.' }];
  if (!(masses.waterG > 0)) return [{ line: null, sentence: 'No water in it: it cannot ferment.' }];
  if (strengthOf(masses) > STRONGEST) return [{ line: null, sentence: 'Over 45 °Bx: no yeast starts in it, and no formula here holds. Add water.' }];
  return [];
}

/** Reckons a sheet: two evaluations for each input with a spread. Lines that cannot be weighed, or a must without water, are told as problems. */
export function reckonMust(sheet: MustSheet): MustResult {
  const problems = problemsOf(sheet);
  if (problems.length > 0) return { ok: false, problems };
  return { ok: true, outcome: outcomeOf(sheet, swing(inputsOfSheet(sheet), (values) => stateAt(sheet, values))) };
}

function outcomeOf(sheet: MustSheet, swings: Swings<MustState>): MustOutcome {
  const { middle } = swings;
  const read = (pick: (state: MustState) => number): Range => readSpread(swings, pick);
  const told = (value: Range, unit: string, formula: string, source: Source): RangeFigure =>
    figure(
      value,
      unit,
      how(formula, source, [
        ['extract', Math.round(middle.extractG), 'g'],
        ['water', Math.round(middle.waterG), 'g'],
        ...(sheet.yeast ? ([['yeast bears', spell(sheet.yeast.toleranceAbv, 0), '% vol']] as const) : []),
      ]),
    );
  const volumeL = read((s) => s.volumeL);
  const fill = read((s) => s.volumeL + s.pulpL);
  const og = read((s) => s.originalGravity);
  const fg = read((s) => s.finalGravity);
  const left = read((s) => ((s.fermentable - s.ferments) * s.extractG) / s.volumeL);
  const total = (s: MustState, key: 'yanMg' | 'sulphiteMg'): number => s.lines.reduce((all, b) => all + b[key], 0) / s.volumeL;
  const dapG = sheet.lines.reduce((all, line) => all + (line.ingredient.key === 'dap' ? inputsOf(line).grams.value : 0), 0);
  const outcome: Omit<MustOutcome, 'notes'> = {
    volumeL: told(volumeL, 'L', 'mass of water and extract ÷ density of a sugar solution of that strength at 20 °C', SOURCES.icumsa),
    fillL: told(fill, 'L', 'liquid + pulp at 1.5 kg/L', SOURCES.icumsa),
    sugarG: told(read((s) => s.extractG), 'g', 'grams × share of dissolved solids × mash efficiency', SOURCES.practice),
    originalGravity: told(og, 'SG', 'density of a sugar solution of that strength over that of water, 20 °C', SOURCES.icumsa),
    gravityAtPitch: told(read((s) => s.gravityAtPitch), 'SG', 'the same, without pieces that release their sugar over days', SOURCES.icumsa),
    fermentableShare: told(read((s) => s.fermentable), '', 'fermentable extract ÷ extract, malt by the yeast’s attenuation', SOURCES.practice),
    finalGravity: told(fg, 'SG', 'Balling run forwards, to the end of the sugar or to the yeast’s tolerance, whichever comes first', SOURCES.balling),
    strength: strengthByMethodsOf(og, fg, (f) => read((s) => f(s.originalGravity, s.finalGravity))),
    potential: strengthByMethodsOf(og, read((s) => s.driestGravity), (f) => read((s) => f(s.originalGravity, s.driestGravity))),
    sugarLeftGPerL: told(left, 'g/L', 'fermentable extract less what Balling says has fermented', SOURCES.balling),
    sweetness: { from: sweetnessOf(left.lo), to: sweetnessOf(left.hi), how: how('sugar left: dry to 4 g/L, medium dry to 12, semi-sweet to 45, sweet above', SOURCES.oivSweetness, [['sugar left', spell(left, 0), 'g/L']]) },
    nitrogen: nitrogenSheet(read((s) => s.fermentableGPerL), sheet.yeast?.nitrogenNeed ?? null, read((s) => total(s, 'yanMg')), dapG / volumeL.value),
    neck: sheet.vesselL === null ? null : neckForecast(sheet.kind, fill, sheet.vesselL, dropOf(og, fg)),
    releases: sheet.lines.flatMap((line, i) => {
      const { releasesOverDays: overDays, name } = line.ingredient;
      return overDays ? [{ line: line.id, name, sugarG: middle.lines[i]?.extractG ?? 0, overDays }] : [];
    }),
    sulphiteMgPerL: told(read((s) => total(s, 'sulphiteMg')), 'mg/L', 'sulphite of each line ÷ volume; yeast itself makes some 10 to 30 more', SOURCES.practice),
    allergens: [...new Set(sheet.lines.flatMap((line) => line.ingredient.allergens))],
    cost: costOf(sheet.lines),
  };
  return { ...outcome, notes: notesOf(sheet, outcome) };
}

const dropOf = (og: Range, fg: Range): Range => ({
  lo: Math.max(0, pointsOf(og.lo) - pointsOf(fg.hi)),
  value: Math.max(0, pointsOf(og.value) - pointsOf(fg.value)),
  hi: Math.max(0, pointsOf(og.hi) - pointsOf(fg.lo)),
});

function costOf(lines: readonly MustLine[]): MustOutcome['cost'] {
  const costs = lines.filter((line) => line.costPerUnit !== null).map((line) => times(line.amount.quantity, line.costPerUnit ?? 0));
  return { ...figure(sum(costs), '', how('amount × cost of a unit, all lines', SOURCES.told, [['lines with a cost', costs.length, ''], ['lines', lines.length, '']])), known: costs.length === lines.length };
}
