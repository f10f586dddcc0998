/** From the lines of a must sheet to what it promises. */
import { figure, how, spell, type How, type RangeFigure, type Source } from '../how/how';
import { SOURCES } from '../how/sources';
import { sucroseDensity } from '../gravity/density';
import { fermented, shareForStrength, type Outcome } from '../strength/expected';
import { strengthByMethodsOf } from '../strength/methods';
import { sum, times, type Range } from '../units/range';
import { pointsOf } from '../units/convert';
import type { MustLine, Yeast } from './ingredients';
import { bring, inputsOf, UnweighableLine, type Brought, type LineInputs } from './line';
import { neckForecast } from './neck';
import { nitrogenSheet } from './nitrogen';
import { notesOf, sweetnessOf } from './notes';
import type { MustOutcome, MustResult, MustSheet } from './sheet';
import { spreadOf } from './spread';

const KEYS = ['grams', 'extractShare', 'fermentableShare', 'efficiency', 'yanMgPerG', 'sulphiteMgPerG'] as const satisfies readonly (keyof LineInputs)[];
/** Share of the extract that malt yields to a yeast: real from apparent attenuation (Balling, 0.8192). */
const REAL_OF_APPARENT = 0.8192;
/** Stands for the yeast's tolerance and attenuation where none are told; the two come after the inputs of the lines. */
const UNTOLD: Range = { lo: 0, value: 0, hi: 0 };

/** The must at one set of values. */
interface At {
  lines: readonly Brought[];
  extractG: number;
  fermentableG: number;
  waterG: number;
  tolerance: number;
}

/** Reckons a sheet. Lines that cannot be weighed, or a must without water, are told as problems. */
export function reckonMust(sheet: MustSheet): MustResult {
  const problems: { line: string | null; sentence: string }[] = [];
  const inputs: Range[] = [];
  for (const line of sheet.lines) {
    try {
      const own = inputsOf(line);
      inputs.push(...KEYS.map((key) => own[key]));
    } catch (error) {
      if (!(error instanceof UnweighableLine)) throw error;
      problems.push({ line: line.id, sentence: `${error.message}.` });
    }
  }
  if (problems.length > 0) return { ok: false, problems };
  inputs.push(sheet.yeast?.toleranceAbv ?? UNTOLD, sheet.yeast?.attenuation ?? UNTOLD);
  const must = new Must(sheet, inputs);
  const middle = must.at(inputs.map((r) => r.value));
  if (!(middle.waterG > 0)) return { ok: false, problems: [{ line: null, sentence: sheet.lines.length === 0 ? 'Nothing in it yet.' : 'No water in it: it cannot ferment.' }] };
  if (middle.extractG / (middle.extractG + middle.waterG) > 0.6) return { ok: false, problems: [{ line: null, sentence: 'Over 60 °Bx: too strong for any yeast. Add water.' }] };
  return { ok: true, outcome: must.outcome() };
}

class Must {
  constructor(
    private readonly sheet: MustSheet,
    private readonly inputs: readonly Range[],
  ) {}

  at(values: readonly number[]): At {
    const tolerance = values.at(-2) ?? 0;
    const attenuation = values.at(-1) ?? 0;
    const lines = this.sheet.lines.map((line, i) => {
      const own = (k: number): number => values[i * KEYS.length + k] ?? 0;
      const fermentableShare = byYeast(line, own(2), attenuation, this.sheet.yeast);
      return bring(line.ingredient, { grams: own(0), extractShare: own(1), fermentableShare, efficiency: own(3), yanMgPerG: own(4), sulphiteMgPerG: own(5) });
    });
    const total = (pick: (b: Brought) => number): number => lines.reduce((all, line) => all + pick(line), 0);
    return {
      lines,
      extractG: total((b) => b.extractG),
      fermentableG: total((b) => b.fermentableG),
      waterG: total((b) => b.waterG) - this.sheet.boiledAwayL * 998.2,
      tolerance,
    };
  }

  private spread(f: (at: At) => number): Range {
    return spreadOf(this.inputs, (values) => f(this.at(values)));
  }

  outcome(): MustOutcome {
    const { sheet } = this;
    const liquid = (at: At): number => litres(at.extractG, at.waterG);
    const volumeL = this.spread(liquid);
    const fill = this.spread((at) => liquid(at) + pulp(at));
    const og = this.spread((at) => gravityOf(at.extractG, at.waterG));
    const slow = sheet.lines.map((line) => line.ingredient.releasesOverDays !== null);
    const atPitch = this.spread((at) => {
      const held = at.lines.reduce((all, b, i) => (slow[i] ? { e: all.e + b.extractG, w: all.w + b.waterG } : all), { e: 0, w: 0 });
      return gravityOf(at.extractG - held.e, Math.max(1, at.waterG - held.w));
    });
    const end = (at: At): Outcome => ending(at, sheet.yeast);
    const fg = this.spread((at) => end(at).finalGravity);
    const dry = (at: At): number => fermented(gravityOf(at.extractG, at.waterG), fermentableShareOf(at)).finalGravity;
    const driest = this.spread(dry);
    const left = this.spread((at) => sugarLeft(at, sheet.yeast));
    const sugarGPerL = this.spread((at) => at.fermentableG / liquid(at));
    const yan = this.spread((at) => at.lines.reduce((all, b) => all + b.yanMg, 0) / liquid(at));
    const sulphite = this.spread((at) => at.lines.reduce((all, b) => all + b.sulphiteMg, 0) / liquid(at));
    const middle = this.at(this.inputs.map((r) => r.value));
    const dap = sheet.lines.reduce((all, line) => all + (line.ingredient.key === 'dap' ? inputsOf(line).grams.value : 0), 0) / volumeL.value;
    const outcome: Omit<MustOutcome, 'notes'> = {
      volumeL: this.figure(volumeL, 'L', 'mass of water and extract ÷ density of a sugar solution of that strength at 20 °C', SOURCES.icumsa, middle),
      fillL: this.figure(fill, 'L', 'liquid + pulp at 1.5 kg/L', SOURCES.icumsa, middle),
      sugarG: this.figure(this.spread((at) => at.extractG), 'g', 'grams × share of dissolved solids × mash efficiency', SOURCES.practice, middle),
      originalGravity: this.figure(og, 'SG', 'density of a sugar solution of that strength over that of water, 20 °C', SOURCES.icumsa, middle),
      gravityAtPitch: this.figure(atPitch, 'SG', 'the same, without pieces that release their sugar over days', SOURCES.icumsa, middle),
      fermentableShare: this.figure(this.spread(fermentableShareOf), '', 'fermentable extract ÷ extract, malt by the yeast’s attenuation', SOURCES.practice, middle),
      finalGravity: this.figure(fg, 'SG', 'Balling run forwards, to the end of the sugar or to the yeast’s tolerance, whichever comes first', SOURCES.balling, middle),
      strength: strengthByMethodsOf(og, fg, (f) => this.spread((at) => f(gravityOf(at.extractG, at.waterG), end(at).finalGravity))),
      potential: strengthByMethodsOf(og, driest, (f) => this.spread((at) => f(gravityOf(at.extractG, at.waterG), dry(at)))),
      sugarLeftGPerL: this.figure(left, 'g/L', 'fermentable extract less what Balling says has fermented', SOURCES.balling, middle),
      sweetness: { from: sweetnessOf(left.lo), to: sweetnessOf(left.hi) },
      nitrogen: nitrogenSheet(sugarGPerL, sheet.yeast?.nitrogenNeed ?? null, yan, dap),
      neck: sheet.vesselL === null ? null : neckForecast(sheet.kind, fill, sheet.vesselL, drop(og, fg)),
      releases: sheet.lines.flatMap((line, i) => {
        const { releasesOverDays: overDays, name } = line.ingredient;
        return overDays ? [{ line: line.id, name, sugarG: middle.lines[i]?.extractG ?? 0, overDays }] : [];
      }),
      sulphiteMgPerL: this.figure(sulphite, 'mg/L', 'sulphite of each line ÷ volume; yeast itself makes some 10 to 30 more', SOURCES.practice, middle),
      allergens: [...new Set(sheet.lines.flatMap((line) => line.ingredient.allergens))],
      cost: costOf(sheet.lines),
    };
    return { ...outcome, notes: notesOf(sheet, outcome) };
  }

  private figure(value: Range, unit: string, formula: string, source: Source, middle: At): RangeFigure {
    const origin: How = how(formula, source, [
      ['extract', Math.round(middle.extractG), 'g'],
      ['water', Math.round(middle.waterG), 'g'],
      ...(this.sheet.yeast ? ([['yeast bears', spell(this.sheet.yeast.toleranceAbv, 0), '% vol']] as const) : []),
    ]);
    return figure(value, unit, origin);
  }
}

/** Malt ferments as far as the yeast goes; fruit and sugar as far as they are sugar. */
function byYeast(line: MustLine, share: number, attenuation: number, yeast: Yeast | null): number {
  const malt = line.ingredient.kind === 'grain' || line.ingredient.kind === 'malt_extract';
  return malt && yeast?.attenuation ? attenuation * REAL_OF_APPARENT : share;
}

const fraction = (extractG: number, waterG: number): number => extractG / (extractG + waterG);
const litres = (extractG: number, waterG: number): number => (extractG + waterG) / sucroseDensity(fraction(extractG, waterG), 20);
const gravityOf = (extractG: number, waterG: number): number => sucroseDensity(fraction(extractG, waterG), 20) / sucroseDensity(0, 20);
const pulp = (at: At): number => at.lines.reduce((all, b) => all + b.pulpL, 0);
const fermentableShareOf = (at: At): number => (at.extractG > 0 ? at.fermentableG / at.extractG : 0);

function shareFermented(at: At, yeast: Yeast | null): number {
  const most = fermentableShareOf(at);
  return yeast ? Math.min(most, shareForStrength(gravityOf(at.extractG, at.waterG), at.tolerance)) : most;
}

const ending = (at: At, yeast: Yeast | null): Outcome => fermented(gravityOf(at.extractG, at.waterG), shareFermented(at, yeast));

const sugarLeft = (at: At, yeast: Yeast | null): number => ((fermentableShareOf(at) - shareFermented(at, yeast)) * at.extractG) / litres(at.extractG, at.waterG);

const drop = (og: Range, fg: Range): Range => ({
  lo: Math.max(0, pointsOf(og.lo) - pointsOf(fg.hi)),
  value: Math.max(0, pointsOf(og.value) - pointsOf(fg.value)),
  hi: Math.max(0, pointsOf(og.hi) - pointsOf(fg.lo)),
});

function costOf(lines: readonly MustLine[]): MustOutcome['cost'] {
  const costs = lines.filter((line) => line.costPerUnit !== null).map((line) => times(line.amount.quantity, line.costPerUnit ?? 0));
  return { ...figure(sum(costs), '', how('amount × cost of a unit, all lines', SOURCES.told, [['lines with a cost', costs.length, ''], ['lines', lines.length, '']])), known: costs.length === lines.length };
}
