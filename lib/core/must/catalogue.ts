/** The catalogue a cellar starts with. Typical ranges; the label on the packet wins. */
import { practice, SOURCES } from '../how/sources';
import { between, exactly, type Range } from '../units/range';
import type { Ingredient, IngredientKind, Yeast } from './ingredients';

/** As on the packets: common practice. That it needs a day is among the sheet's notes. */
const SULPHITE_HURTS = 'Its powder and gas hurt eyes and lungs, worst with asthma: air the room, never smell at it.';

const NONE = exactly(0);
const ALL = exactly(1);

function ingredient(key: string, name: string, kind: IngredientKind, typical: Partial<Ingredient>): Ingredient {
  return {
    key,
    name,
    kind,
    extractShare: NONE,
    insolubleShare: 0,
    fermentableShare: NONE,
    densityGPerMl: null,
    each: null,
    releasesOverDays: null,
    yanMgPerG: NONE,
    sulphiteMgPerG: NONE,
    allergens: [],
    preservative: null,
    mash: null,
    usualGPerL: null,
    caution: null,
    ...practice('typical range; the label or a measurement wins'),
    ...typical,
  };
}

/** A juice of known °Bx; apple and pear about 85 to 90 % fermentable. */
export function juice(key: string, name: string, brix: Range, fermentableShare: Range = between(0.85, 0.9), yanMgPerG: Range = between(0.04, 0.15)): Ingredient {
  return ingredient(key, name, 'juice', {
    extractShare: { lo: brix.lo / 100, value: brix.value / 100, hi: brix.hi / 100 },
    fermentableShare,
    yanMgPerG,
  });
}

/** Sugar of grape must over the extract of a sucrose solution of the same °Bx, 16 to 22 °Bx: OIV-MA-AS2-02 Table II against ICUMSA. */
export const GRAPE_FERMENTABLE: Range = { lo: 0.864, value: 0.884, hi: 0.896 };

const fruit = (key: string, name: string, sugar: Range, insoluble: number, grams?: Range): Ingredient =>
  ingredient(key, name, 'fruit', {
    // Acids and pectin dissolve too, about 2 g in 100 g.
    extractShare: { lo: sugar.lo + 0.015, value: sugar.value + 0.02, hi: sugar.hi + 0.03 },
    insolubleShare: insoluble,
    fermentableShare: between(0.75, 0.9),
    each: grams ? { name: 'piece', grams } : null,
    releasesOverDays: between(2, 5),
    yanMgPerG: between(0.05, 0.2),
  });

const spoon = (gPerMl: number): Range => between(0.85 * gPerMl, 1.15 * gPerMl);

export const CATALOGUE: readonly Ingredient[] = [
  juice('apple-juice', 'apple juice', between(10.5, 13.5)),
  juice('pear-juice', 'pear juice', between(10.5, 14), between(0.72, 0.85)),
  juice('grape-juice', 'grape juice', between(16, 22), GRAPE_FERMENTABLE, between(0.1, 0.3)),
  ingredient('juice-concentrate', 'juice concentrate', 'syrup', { extractShare: between(0.65, 0.72), fermentableShare: between(0.82, 0.9), densityGPerMl: between(1.3, 1.36), yanMgPerG: between(0.1, 0.5), caution: 'Read the label for sorbate, benzoate and sulphite.' }),
  ingredient('honey', 'honey', 'honey', {
    extractShare: between(0.8, 0.83),
    fermentableShare: between(0.94, 0.98),
    densityGPerMl: between(1.38, 1.45),
    each: { name: 'jar', grams: exactly(454) },
    yanMgPerG: between(0.05, 0.15),
  }),
  ingredient('table-sugar', 'table sugar', 'sugar', { extractShare: exactly(1), fermentableShare: ALL, densityGPerMl: between(0.8, 0.9) }),
  ingredient('brown-sugar', 'brown sugar', 'sugar', { extractShare: between(0.96, 0.985), fermentableShare: between(0.95, 0.98), densityGPerMl: between(0.72, 0.93) }),
  ingredient('grape-sugar', 'grape sugar (glucose monohydrate)', 'sugar', { extractShare: exactly(0.909), fermentableShare: ALL, densityGPerMl: between(0.6, 0.7), ...SOURCES.stoichiometry }),
  ingredient('invert-syrup', 'invert syrup', 'syrup', { extractShare: between(0.72, 0.8), fermentableShare: between(0.97, 1), densityGPerMl: between(1.36, 1.42) }),
  ingredient('treacle', 'treacle', 'syrup', { extractShare: between(0.72, 0.8), fermentableShare: between(0.6, 0.85), densityGPerMl: between(1.38, 1.44) }),
  ingredient('dry-malt-extract', 'dry malt extract', 'malt_extract', { extractShare: between(0.95, 0.97), fermentableShare: between(0.58, 0.7), densityGPerMl: between(0.5, 0.65), yanMgPerG: between(1, 2), allergens: ['gluten'] }),
  ingredient('liquid-malt-extract', 'liquid malt extract', 'malt_extract', { extractShare: between(0.77, 0.82), fermentableShare: between(0.58, 0.7), densityGPerMl: between(1.38, 1.44), yanMgPerG: between(0.8, 1.6), allergens: ['gluten'] }),
  ingredient('pale-malt', 'pale malt', 'grain', {
    extractShare: between(0.77, 0.81),
    fermentableShare: between(0.58, 0.7),
    yanMgPerG: between(0.8, 1.6),
    allergens: ['gluten'],
    mash: { efficiency: between(0.65, 0.8), absorbsLPerKg: 1 },
  }),
  ingredient('crystal-malt', 'crystal malt', 'grain', { extractShare: between(0.72, 0.77), fermentableShare: between(0.4, 0.55), yanMgPerG: between(0.5, 1.2), allergens: ['gluten'], mash: { efficiency: between(0.65, 0.8), absorbsLPerKg: 1 } }),
  ingredient('wheat-malt', 'wheat malt', 'grain', { extractShare: between(0.8, 0.84), fermentableShare: between(0.58, 0.7), yanMgPerG: between(0.8, 1.6), allergens: ['gluten'], mash: { efficiency: between(0.65, 0.8), absorbsLPerKg: 1 } }),
  ingredient('roasted-barley', 'roasted barley', 'grain', { extractShare: between(0.6, 0.7), fermentableShare: between(0.3, 0.5), yanMgPerG: between(0.3, 0.8), allergens: ['gluten'], mash: { efficiency: between(0.65, 0.8), absorbsLPerKg: 1 } }),
  ingredient('flaked-oats', 'flaked oats', 'grain', { extractShare: between(0.65, 0.74), fermentableShare: between(0.5, 0.65), yanMgPerG: between(0.5, 1.2), allergens: ['gluten'], mash: { efficiency: between(0.6, 0.78), absorbsLPerKg: 1 }, caution: 'Brings no enzymes of its own: mash it with at least as much pale malt.' }),
  fruit('damson', 'damsons', between(0.08, 0.12), 0.09),
  fruit('blackberry', 'blackberries', between(0.05, 0.08), 0.09),
  fruit('elderberry', 'elderberries', between(0.06, 0.09), 0.09),
  fruit('cherry', 'cherries', between(0.1, 0.14), 0.1, between(6, 9)),
  fruit('raspberry', 'raspberries', between(0.04, 0.07), 0.09),
  fruit('plum', 'plums', between(0.09, 0.12), 0.06, between(50, 80)),
  fruit('quince', 'quinces', between(0.07, 0.11), 0.1, between(150, 350)),
  fruit('gooseberry', 'gooseberries', between(0.05, 0.09), 0.08),
  fruit('strawberry', 'strawberries', between(0.05, 0.08), 0.06),
  fruit('rhubarb', 'rhubarb', between(0.01, 0.02), 0.06),
  fruit('raisins', 'raisins', between(0.6, 0.68), 0.08),
  ingredient('candied-peel', 'candied peel', 'candied_fruit', {
    extractShare: between(0.68, 0.78),
    insolubleShare: 0.06,
    fermentableShare: between(0.92, 0.98),
    releasesOverDays: between(5, 14),
    sulphiteMgPerG: between(0, 0.1),
    allergens: ['sulphites'],
    preservative: 'sulphite',
    caution: 'Often kept with sulphite. Read the packet.',
  }),
  ingredient('water', 'water', 'water', { densityGPerMl: exactly(0.9982), ...SOURCES.icumsa }),
  ingredient('black-tea', 'strong black tea', 'tannin', { densityGPerMl: exactly(0.9982), extractShare: exactly(0.003) }),
  ingredient('grape-tannin', 'grape tannin', 'tannin', { densityGPerMl: spoon(0.5), usualGPerL: between(0.1, 0.5) }),
  ingredient('tartaric-acid', 'tartaric acid', 'acid', { densityGPerMl: spoon(0.95), usualGPerL: between(0.5, 2) }),
  ingredient('malic-acid', 'malic acid', 'acid', { densityGPerMl: spoon(0.8), usualGPerL: between(0.5, 2) }),
  ingredient('citric-acid', 'citric acid', 'acid', { densityGPerMl: spoon(0.9), usualGPerL: between(0.3, 1), caution: 'EU wine may hold at most 1 g/L (from memory).' }),
  ingredient('pectic-enzyme', 'pectic enzyme', 'enzyme', { densityGPerMl: spoon(0.6), usualGPerL: between(0.1, 0.5), caution: 'Add early, before the alcohol, into a must under 40 °C.' }),
  ingredient('dap', 'diammonium phosphate (DAP)', 'nutrient', { densityGPerMl: spoon(0.95), yanMgPerG: exactly(212.1), usualGPerL: { lo: 0, value: 0.2, hi: 0.3 }, ...SOURCES.dapOiv, caution: 'Not with dry yeast in its water. Not after half the sugar is gone.' }),
  ingredient('complex-nutrient', 'complex yeast nutrient', 'nutrient', { densityGPerMl: spoon(0.7), yanMgPerG: between(80, 130), usualGPerL: between(0.2, 0.6) }),
  ingredient('yeast-autolysate', 'yeast autolysate', 'nutrient', { densityGPerMl: spoon(0.55), yanMgPerG: between(35, 60), usualGPerL: between(0.2, 0.5) }),
  ingredient('potassium-metabisulphite', 'potassium metabisulphite', 'preservative', { densityGPerMl: spoon(1.2), sulphiteMgPerG: between(500, 576.3), allergens: ['sulphites'], preservative: 'sulphite', usualGPerL: { lo: 0.03, value: 0.08, hi: 0.13 }, caution: SULPHITE_HURTS }),
  ingredient('sodium-metabisulphite', 'sodium metabisulphite', 'preservative', { densityGPerMl: spoon(1.2), sulphiteMgPerG: between(585, 674), allergens: ['sulphites'], preservative: 'sulphite', usualGPerL: { lo: 0.03, value: 0.07, hi: 0.11 }, caution: `${SULPHITE_HURTS} It brings sodium: many countries do not allow it in wine.` }),
  ingredient('sulphite-tablet', 'sulphite tablet', 'preservative', { each: { name: 'tablet', grams: between(0.42, 0.55) }, sulphiteMgPerG: between(500, 576.3), allergens: ['sulphites'], preservative: 'sulphite', caution: `Crush it. ${SULPHITE_HURTS}` }),
  ingredient('potassium-sorbate', 'potassium sorbate', 'preservative', { densityGPerMl: spoon(0.45), preservative: 'sorbate', usualGPerL: between(0.13, 0.26), caution: 'Keeps yeast from growing: only for a finished drink.' }),
  ingredient('lactose', 'lactose', 'sweetener', { extractShare: exactly(0.95), fermentableShare: NONE, densityGPerMl: between(0.6, 0.75), allergens: ['milk'] }),
  ingredient('erythritol', 'erythritol', 'sweetener', { extractShare: exactly(1), fermentableShare: NONE, densityGPerMl: between(0.8, 0.95) }),
  ingredient('spice', 'spice or herb', 'spice', { insolubleShare: 0.9, usualGPerL: between(0.5, 5) }),
];

/** An entry by its key; undefined where there is none. */
export const catalogued = (key: string): Ingredient | undefined => CATALOGUE.find((i) => i.key === key);

const yeast = (name: string, attenuation: Range | null, tolerance: Range, min: number, max: number, nitrogenNeed: Yeast['nitrogenNeed'], diastatic = false): Yeast => ({
  name,
  attenuation,
  toleranceAbv: tolerance,
  temperatureC: { min, max },
  nitrogenNeed,
  diastatic,
  status: 'common practice',
});

/** Types of yeast rather than makers' strains: enter the strain's own sheet where you have it. */
export const YEASTS: readonly Yeast[] = [
  yeast('ale yeast', between(0.71, 0.79), between(8, 10), 16, 22, 'low'),
  yeast('lager yeast', between(0.74, 0.8), between(8, 10), 8, 14, 'low'),
  yeast('farmhouse ale yeast, diastatic', between(0.85, 0.98), between(10, 14), 20, 28, 'medium', true),
  yeast('cider yeast', null, between(10, 12), 12, 22, 'low'),
  yeast('white wine yeast', null, between(13, 15), 12, 20, 'medium'),
  yeast('sparkling wine yeast', null, between(16, 18), 10, 28, 'low'),
  yeast('red wine yeast', null, between(13, 15), 20, 30, 'high'),
  yeast('mead yeast', null, between(14, 16), 16, 22, 'medium'),
  yeast('bread yeast', null, between(7, 10), 18, 28, 'medium'),
];
