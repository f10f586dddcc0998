/** A must at one set of values: what is in it and where it ends. */
import { sucroseDensity } from '../gravity/density';
import { fermented, shareForStrength } from '../strength/expected';
import { exactly, type Range } from '../units/range';
import type { MustLine, Yeast } from './ingredients';
import { bring, inputsOf, type Brought, type LineInputs } from './line';
import type { MustSheet } from './sheet';

const KEYS = ['grams', 'extractShare', 'fermentableShare', 'efficiency', 'yanMgPerG', 'sulphiteMgPerG'] as const satisfies readonly (keyof LineInputs)[];
/** Share of the extract that malt yields to a yeast: real from apparent attenuation (Balling, 0.8192). */
const REAL_OF_APPARENT = 0.8192;
/** Stands for the yeast's tolerance and attenuation where none are told. */
const UNTOLD = exactly(0);

/** A sheet as uncertain numbers: six a line, then the yeast's tolerance and attenuation. Throws UnweighableLine. */
export function inputsOfSheet(sheet: MustSheet): Range[] {
  const inputs = sheet.lines.flatMap((line) => {
    const own = inputsOf(line);
    return KEYS.map((key) => own[key]);
  });
  return [...inputs, sheet.yeast?.toleranceAbv ?? UNTOLD, sheet.yeast?.attenuation ?? UNTOLD];
}

export interface MustState {
  lines: readonly Brought[];
  extractG: number;
  waterG: number;
  volumeL: number;
  pulpL: number;
  originalGravity: number;
  /** Without what pieces release over days. */
  gravityAtPitch: number;
  fermentableGPerL: number;
  /** Share of the extract that yeast can use, and that this yeast does. */
  fermentable: number;
  ferments: number;
  finalGravity: number;
  /** Were all that is fermentable gone. */
  driestGravity: number;
}

const fraction = (extractG: number, waterG: number): number => extractG / (extractG + waterG);
const gravityOf = (extractG: number, waterG: number): number => sucroseDensity(fraction(extractG, waterG), 20) / sucroseDensity(0, 20);

/** Mass of extract in the liquid, 0 to 1. */
export const strengthOf = (state: Pick<MustState, 'extractG' | 'waterG'>): number => fraction(state.extractG, state.waterG);

/** What is in the must, by its lines. */
function gather(sheet: MustSheet, values: readonly number[]): Pick<MustState, 'lines' | 'extractG' | 'waterG'> & { fermentableG: number } {
  const attenuation = values.at(-1) ?? 0;
  const lines = sheet.lines.map((line, i) => {
    const own = (k: number): number => values[i * KEYS.length + k] ?? 0;
    return bring(line.ingredient, {
      grams: own(0),
      extractShare: own(1),
      fermentableShare: byYeast(line, own(2), attenuation, sheet.yeast),
      efficiency: own(3),
      yanMgPerG: own(4),
      sulphiteMgPerG: own(5),
    });
  });
  const total = (pick: (b: Brought) => number): number => lines.reduce((all, line) => all + pick(line), 0);
  return { lines, extractG: total((b) => b.extractG), waterG: total((b) => b.waterG) - sheet.boiledAwayL * 998.2, fermentableG: total((b) => b.fermentableG) };
}

/** Masses alone, before it is known whether they make a must. */
export const massesAt = (sheet: MustSheet, values: readonly number[]): { extractG: number; waterG: number } => gather(sheet, values);

/** The must at one set of values, in the order of {@link inputsOfSheet}. It has to hold water. */
export function stateAt(sheet: MustSheet, values: readonly number[]): MustState {
  const { lines, extractG, waterG, fermentableG } = gather(sheet, values);
  const volumeL = (extractG + waterG) / sucroseDensity(fraction(extractG, waterG), 20);
  const originalGravity = gravityOf(extractG, waterG);
  const fermentable = extractG > 0 ? fermentableG / extractG : 0;
  const ferments = sheet.yeast ? Math.min(fermentable, shareForStrength(originalGravity, values.at(-2) ?? 0)) : fermentable;
  const held = lines.reduce((all, b, i) => (sheet.lines[i]?.ingredient.releasesOverDays ? { e: all.e + b.extractG, w: all.w + b.waterG } : all), { e: 0, w: 0 });
  return {
    lines,
    extractG,
    waterG,
    volumeL,
    pulpL: lines.reduce((all, b) => all + b.pulpL, 0),
    originalGravity,
    gravityAtPitch: gravityOf(extractG - held.e, Math.max(1, waterG - held.w)),
    fermentableGPerL: fermentableG / volumeL,
    fermentable,
    ferments,
    finalGravity: fermented(originalGravity, ferments).finalGravity,
    driestGravity: fermented(originalGravity, fermentable).finalGravity,
  };
}

/** Malt ferments as far as the yeast goes; fruit and sugar as far as they are sugar. */
function byYeast(line: MustLine, share: number, attenuation: number, yeast: Yeast | null): number {
  const malt = line.ingredient.kind === 'grain' || line.ingredient.kind === 'malt_extract';
  return malt && yeast?.attenuation ? attenuation * REAL_OF_APPARENT : share;
}
