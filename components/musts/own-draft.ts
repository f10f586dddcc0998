import { typedNumber } from '@/components/batch/figures';
import type { CatalogueBody, IngredientForm, YeastForm } from '@/lib/contracts/catalogue';
import { CATALOGUE } from '@/lib/core/must/catalogue';
import type { Allergen, IngredientKind, NitrogenNeed, Preservative } from '@/lib/core/must/ingredients';
import { exactly, times, type Range } from '@/lib/core/units/range';
import { amountOf, amountText } from './amount';

/** An own ingredient as it is typed; shares as percentages, any figure also as `10 to 14`. */
export interface IngredientDraft {
  name: string;
  kind: IngredientKind;
  sugar: string;
  fermentable: string;
  insoluble: string;
  density: string;
  pieceName: string;
  pieceGrams: string;
  days: string;
  nitrogen: string;
  sulphite: string;
  efficiency: string;
  preservative: Preservative | '';
  allergens: readonly Allergen[];
  caution: string;
}

type Own = Omit<CatalogueBody['ingredients'][number], 'id' | 'key' | 'source' | 'status'>;

const percentText = (share: Range) => amountText(times(share, 100));
const textOf = (range: Range | null) => (range ? amountText(range) : '');

export function draftOfIngredient(own: Own): IngredientDraft {
  return {
    name: own.name,
    kind: own.kind,
    sugar: percentText(own.extract_share),
    fermentable: percentText(own.fermentable_share),
    insoluble: String(Number((100 * own.insoluble_share).toFixed(2))),
    density: textOf(own.density_g_per_ml),
    pieceName: own.each?.name ?? '',
    pieceGrams: textOf(own.each?.grams ?? null),
    days: textOf(own.releases_over_days),
    nitrogen: amountText(own.yan_mg_per_g),
    sulphite: amountText(own.sulphite_mg_per_g),
    efficiency: own.mash ? percentText(own.mash.efficiency) : '75',
    preservative: own.preservative ?? '',
    allergens: own.allergens,
    caution: own.caution ?? '',
  };
}

/** The usual figures of a kind, to be written over by what the label says: those of the first of that kind in the catalogue. */
export function draftOfKind(kind: IngredientKind, name: string): IngredientDraft {
  const usual = CATALOGUE.find((item) => item.kind === kind);
  return {
    name,
    kind,
    sugar: usual ? percentText(usual.extractShare) : '0',
    fermentable: usual ? percentText(usual.fermentableShare) : '0',
    insoluble: usual ? String(Number((100 * usual.insolubleShare).toFixed(2))) : '0',
    density: textOf(usual?.densityGPerMl ?? null),
    pieceName: '',
    pieceGrams: '',
    days: textOf(usual?.releasesOverDays ?? null),
    nitrogen: usual ? amountText(usual.yanMgPerG) : '0',
    sulphite: '0',
    efficiency: usual?.mash ? percentText(usual.mash.efficiency) : '75',
    preservative: '',
    allergens: usual?.allergens ?? [],
    caution: '',
  };
}

/** Not a number is left for the schema to refuse, beside its field. */
const NOT_A_RANGE = exactly(NaN);
const range = (text: string): Range => (text.trim() === '' ? exactly(0) : (amountOf(text) ?? NOT_A_RANGE));
const rangeOrNull = (text: string): Range | null => (text.trim() === '' ? null : (amountOf(text) ?? NOT_A_RANGE));
const share = (text: string): Range => times(range(text), 0.01);

export function ingredientOf(draft: IngredientDraft): IngredientForm {
  const piece = rangeOrNull(draft.pieceGrams);
  return {
    name: draft.name,
    kind: draft.kind,
    extract_share: share(draft.sugar),
    insoluble_share: (typedNumber(draft.insoluble) ?? 0) / 100,
    fermentable_share: share(draft.fermentable),
    density_g_per_ml: rangeOrNull(draft.density),
    each: piece ? { name: draft.pieceName.trim() || 'piece', grams: piece } : null,
    releases_over_days: rangeOrNull(draft.days),
    yan_mg_per_g: range(draft.nitrogen),
    sulphite_mg_per_g: range(draft.sulphite),
    allergens: [...draft.allergens],
    preservative: draft.preservative || null,
    mash: draft.kind === 'grain' ? { efficiency: share(draft.efficiency), absorbs_l_per_kg: 1 } : null,
    usual_g_per_l: null,
    caution: draft.caution.trim() || null,
  };
}

/** An own yeast as it is typed. */
export interface YeastDraft {
  name: string;
  /** Empty: it takes all the sugar. */
  attenuation: string;
  tolerance: string;
  coldest: string;
  warmest: string;
  need: NitrogenNeed;
  diastatic: boolean;
}

export const emptyYeast = (): YeastDraft => ({ name: '', attenuation: '', tolerance: '', coldest: '', warmest: '', need: 'medium', diastatic: false });

export const draftOfYeast = (own: Omit<CatalogueBody['yeasts'][number], 'id' | 'status'>): YeastDraft => ({
  name: own.name,
  attenuation: own.attenuation ? percentText(own.attenuation) : '',
  tolerance: amountText(own.tolerance_abv),
  coldest: String(own.temperature_c.min),
  warmest: String(own.temperature_c.max),
  need: own.nitrogen_need,
  diastatic: own.diastatic,
});

export const yeastOf = (draft: YeastDraft): YeastForm => ({
  name: draft.name,
  attenuation: draft.attenuation.trim() === '' ? null : share(draft.attenuation),
  tolerance_abv: rangeOrNull(draft.tolerance) ?? NOT_A_RANGE,
  temperature_c: { min: typedNumber(draft.coldest) ?? NaN, max: typedNumber(draft.warmest) ?? NaN },
  nitrogen_need: draft.need,
  diastatic: draft.diastatic,
});
