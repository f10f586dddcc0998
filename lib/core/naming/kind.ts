/** What a drink is called, from what is in it and how strong it is: a suggestion with its rule. */
import { practice, published } from '../how/sources';
import type { Source } from '../how/how';
import type { IngredientKind } from '../must/ingredients';

/** What fermentable things went in, by their share of the sugar, 0 to 1. */
export interface SugarFrom {
  apple: number;
  pear: number;
  grape: number;
  otherFruit: number;
  honey: number;
  malt: number;
  /** Sugar and syrup. */
  sugar: number;
}

export interface Makeup {
  from: SugarFrom;
  /** Spices, herbs, flowers, tea. */
  spiced: boolean;
  abvPercent: number;
}

export const DRINK_NAMES = ['cider', 'perry', 'apple wine', 'pear wine', 'mead', 'cyser', 'pyment', 'hippocras', 'melomel', 'metheglin', 'braggot', 'wine', 'fruit wine', 'beer', 'flower or herb wine', 'fermented drink'] as const;
export type DrinkName = (typeof DRINK_NAMES)[number];

export interface Suggestion extends Source {
  name: DrinkName;
  /** Finer words that may stand before it: `session`, `sack`, `spiced`. */
  style: string | null;
  rule: string;
  /** Always: the law of the place decides what may be written on a bottle for sale. */
  law: string;
}

/** The usual line between cider and wine, % vol: UK and US duty both draw it there. */
export const CIDER_BELOW_ABV = 8.5;
/** Honey has to bring at least this share of the sugar for a mead's name. Our own rule. */
const MEAD_HONEY = 0.3;
/** A second sugar source counts in the name from this share on. Our own rule. */
const COUNTS = 0.05;
/** Most other fruit in cider: Australia and New Zealand allow 25 % pear. */
const MOST_PEAR = 0.25;

const LAW = 'A suggestion. Law differs by country, and by whether the drink is sold: UK and US duty draw cider under 8.5 % vol; wine by EU law is from grapes alone.';

const TRADE = practice('names of the trade for honey drinks');
const CIDER_LAW = published('HMRC Cider Guidance CIDER11010 and 26 U.S.C. 5041(g): cider is below 8.5 % vol; Food Standards Code 2.7.3: not more than 25 % pear');
const WINE_LAW = published('Regulation (EU) 1308/2013, Annex VII Part II: wine is from grapes; Food Standards Code 2.7.3: fruit wine');
const BEER_LAW = published('HMRC alcoholic products technical guide, section 2.1');

/** Suggests a name. Shares need not add to 1; nothing fermentable gives the plainest word. */
export function suggestName({ from, spiced, abvPercent }: Makeup): Suggestion {
  const total = Object.values(from).reduce((a, b) => a + b, 0);
  const share = (part: keyof SugarFrom): number => (total > 0 ? from[part] / total : 0);
  const counts = (part: keyof SugarFrom): boolean => share(part) >= COUNTS;
  const suggest = (name: DrinkName, rule: string, source: Source, style: string | null = null): Suggestion => ({ name, rule, law: LAW, style, source: source.source, status: source.status });

  if (share('honey') >= MEAD_HONEY) {
    const strength = abvPercent < 7.5 ? 'session' : abvPercent > 14 ? 'sack' : null;
    const style = [spiced && (counts('apple') || counts('otherFruit') || counts('malt')) ? 'spiced' : null, strength].filter(Boolean).join(' ') || null;
    if (counts('malt')) return suggest('braggot', 'Honey and malt.', TRADE, style);
    const fruits = (['apple', 'pear', 'grape', 'otherFruit'] as const).filter(counts);
    if (fruits.length === 1 && fruits[0] === 'apple') return suggest('cyser', 'Honey and apple.', TRADE, style);
    if (fruits.length === 1 && fruits[0] === 'grape') return spiced ? suggest('hippocras', 'Honey, grape and spice.', TRADE, strength) : suggest('pyment', 'Honey and grape.', TRADE, style);
    if (fruits.length > 0) return suggest('melomel', 'Honey and fruit.', TRADE, style);
    return spiced ? suggest('metheglin', 'Honey and spice or herb.', TRADE, strength) : suggest('mead', 'Honey, water and yeast.', TRADE, strength);
  }
  if (share('malt') >= 0.5) return suggest('beer', 'Malt brings at least half of the sugar.', BEER_LAW, spiced ? 'spiced' : null);
  const pomes = share('apple') + share('pear');
  const style = spiced ? 'spiced' : null;
  if (pomes >= 0.5 && !counts('grape') && !counts('otherFruit')) {
    const perry = share('pear') > pomes * (1 - MOST_PEAR);
    const mixed = share('pear') > MOST_PEAR * pomes && !perry;
    if (abvPercent >= CIDER_BELOW_ABV) return suggest(perry ? 'pear wine' : 'apple wine', `From ${perry ? 'pears' : 'apples'}, at ${CIDER_BELOW_ABV} % vol or more.`, CIDER_LAW, style);
    return suggest(perry ? 'perry' : 'cider', perry ? 'Pears, under 8.5 % vol.' : mixed ? 'Apples with more than a quarter of pears, under 8.5 % vol: some call it cider and perry.' : 'Apples, under 8.5 % vol.', CIDER_LAW, style);
  }
  if (share('grape') >= 0.95) return suggest('wine', 'Grapes alone.', WINE_LAW, style);
  if (pomes + share('grape') + share('otherFruit') >= COUNTS) return suggest('fruit wine', 'Fruit, with or without sugar.', WINE_LAW, style);
  if (spiced && share('sugar') > 0.5) return suggest('flower or herb wine', 'Sugar with flowers, herbs or roots.', practice('country wine named after what gives its taste'));
  return suggest('fermented drink', 'Nothing in it gives it a name.', practice('no rule fits'));
}

/** Share keys by the kind of ingredient, where the kind alone decides. */
export const FROM_KIND: Partial<Record<IngredientKind, keyof SugarFrom>> = {
  honey: 'honey', sugar: 'sugar', syrup: 'sugar', malt_extract: 'malt', grain: 'malt', fruit: 'otherFruit', candied_fruit: 'otherFruit',
};
