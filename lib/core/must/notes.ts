/** What a must sheet has to say beside its figures. */
import { inputsOf } from './line';
import type { MustNote, MustOutcome, MustSheet, Sweetness } from './sheet';

/** Sweetness by sugar left, g/L (OIV International Standard for the Labelling of Wines 3.1.6, without its allowance for acid). */
export function sweetnessOf(sugarGPerL: number): Sweetness {
  if (sugarGPerL <= 4) return 'dry';
  if (sugarGPerL <= 12) return 'medium_dry';
  return sugarGPerL <= 45 ? 'semi_sweet' : 'sweet';
}

/** Sulphite that has to be told on a label, mg/L (Regulation (EU) 1169/2011, Annex II point 12). */
const SULPHITE_TOLD_MG_L = 10;
/** Added sulphite above which a yeast started the same day is held back: common practice. */
const SULPHITE_HOLDS_MG_L = 50;

const HOLDS_BACK: Record<'sorbate' | 'benzoate' | 'sulphite' | 'unknown', string> = {
  sorbate: 'sorbate keeps yeast from growing: it may never start',
  benzoate: 'benzoate keeps yeast from growing: it may never start',
  sulphite: 'sulphite holds yeast back: wait a day, stir well, then pitch',
  unknown: 'a preservative nobody has named may hold the yeast back: try a glass of it with yeast first',
};

export function notesOf(sheet: MustSheet, outcome: Omit<MustOutcome, 'notes'>): MustNote[] {
  const notes: MustNote[] = [];
  const say = (kind: MustNote['kind'], line: string | null, sentence: string): void => void notes.push({ kind, line, sentence });
  const litres = outcome.volumeL.value.value;
  for (const { id, ingredient, ...line } of sheet.lines) {
    if (ingredient.preservative) say('preservative', id, `${ingredient.name}: ${HOLDS_BACK[ingredient.preservative]}.`);
    if (ingredient.caution) say('caution', id, `${ingredient.name}: ${ingredient.caution}`);
    const usual = ingredient.usualGPerL;
    if (!usual || !(litres > 0)) continue;
    const gPerL = inputsOf({ id, ingredient, ...line }).grams.value / litres;
    if (gPerL > usual.hi * 1.0001) say('dose', id, `${ingredient.name}: ${gPerL.toFixed(2)} g/L is over the usual ${usual.lo} to ${usual.hi}.`);
  }
  const sulphite = outcome.sulphiteMgPerL.value;
  if (sulphite.hi > SULPHITE_TOLD_MG_L) say('sulphite', null, `Up to ${Math.ceil(sulphite.hi)} mg/L of sulphite: the label has to say so over ${SULPHITE_TOLD_MG_L} mg/L.`);
  if (sulphite.value > SULPHITE_HOLDS_MG_L) say('preservative', null, `${Math.round(sulphite.value)} mg/L of sulphite: give it a day before the yeast.`);
  if (outcome.allergens.length > 0) say('allergen', null, `Holds ${outcome.allergens.join(', ')}.`);
  for (const release of outcome.releases) {
    say('release', release.line, `${release.name}: ${Math.round(release.sugarG)} g of sugar over ${release.overDays.lo} to ${release.overDays.hi} days. The gravity may rise at first.`);
  }
  if (!outcome.neck?.fits && outcome.neck) say('volume', null, outcome.neck.sentence);
  if (outcome.sugarLeftGPerL.value.value > 4 && sheet.yeast) {
    say('tolerance', null, `The yeast bears ${sheet.yeast.toleranceAbv.lo} to ${sheet.yeast.toleranceAbv.hi} % vol: about ${Math.round(outcome.sugarLeftGPerL.value.value)} g/L of sugar stays. It is not safe in closed bottles unless stabilised.`);
  }
  if (sheet.yeast?.diastatic) say('diastatic', null, 'This yeast eats what others leave: wait longer, and reckon with 1.000 or drier in the bottle.');
  return notes;
}
