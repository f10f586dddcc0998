/** What an addition does to gravity, effective original gravity, strength and volume. */
import { how, type How } from '../how/how';
import { SOURCES } from '../how/sources';
import { blend, contentsOf, readContents, sweetened, unfermented, water, type Contents, type Readout } from '../family/contents';
import type { Ingredient } from '../must/ingredients';
import type { Range } from '../units/range';

/** A drink in its vessel. */
export interface Vat {
  volumeL: number;
  /** Effective original gravity so far, SG. */
  originalGravity: number;
  gravity: number;
}

export type Addition =
  | { what: 'sugar'; /** Dissolved sugar and the water that comes with it, g. */ sugarG: number; waterG: number }
  | { what: 'must'; volumeL: number; gravity: number }
  | { what: 'drink'; volumeL: number; originalGravity: number; gravity: number }
  | { what: 'water'; volumeL: number };

export interface Effect {
  before: Readout;
  after: Readout;
  /** Points the effective original gravity moves by. */
  ogChangePoints: number;
  gravityChangePoints: number;
  abvChangePercent: number;
  contents: Contents;
  cautions: readonly string[];
  how: How;
}

const contentsAdded = (addition: Addition): Contents => {
  switch (addition.what) {
    case 'sugar':
      return sweetened(addition.sugarG, addition.waterG);
    case 'must':
      return unfermented(addition.volumeL, addition.gravity);
    case 'drink':
      return contentsOf(addition);
    case 'water':
      return water(addition.volumeL);
  }
};

/** Sugar and water in so many grams of honey, syrup or fruit, at the middle of its range. Fruit releases it over days. */
export function asSugar(ingredient: Ingredient, grams: number): Addition {
  const { value } = ingredient.extractShare;
  return { what: 'sugar', sugarG: grams * value, waterG: grams * (1 - value - ingredient.insolubleShare) };
}

/**
 * A batch before and after an addition, by conservation of mass, extract and
 * alcohol (Balling). Gravity is what stands there once stirred in and before any
 * of the new sugar ferments; the effective original gravity holds all sugar ever
 * put in. As good as Balling: 0.2 to 0.5 % vol, 0.3 points. Null for an empty vessel.
 */
export function effectOf(vat: Vat, addition: Addition): Effect | null {
  const added = contentsAdded(addition);
  const contents = blend([contentsOf(vat), added]);
  const [before, after] = [readContents(contentsOf(vat)), readContents(contents)];
  if (!before || !after) return null;
  const fed = added.extractG > 1;
  return {
    before,
    after,
    ogChangePoints: 1000 * (after.effectiveOg - before.effectiveOg),
    gravityChangePoints: 1000 * (after.gravity - before.gravity),
    abvChangePercent: after.abvPercent - before.abvPercent,
    contents,
    cautions: [
      ...(fed && before.gravity < before.effectiveOg - 0.005 ? ['Add it slowly: a drink full of gas foams over when sugar goes in. Leave room.'] : []),
      ...(fed ? ['It is not done again until five days and two equal readings later.'] : []),
    ],
    how: how('masses of liquid, extract and alcohol add; gravities by Balling’s relation backwards', SOURCES.massBalance, [
      ['volume', vat.volumeL, 'L'],
      ['effective original gravity', vat.originalGravity, 'SG'],
      ['gravity', vat.gravity, 'SG'],
      ['sugar added', Math.round(added.extractG), 'g'],
      ['mass added', Math.round(added.massG), 'g'],
    ]),
  };
}

/** Sugar, g, that lifts the gravity by so many points: bisection on {@link effectOf}, to 0.01 g. Null where it cannot be done (over 2 kg a litre). */
export function sugarForPoints(vat: Vat, points: number): number | null {
  const lifted = (grams: number): number => effectOf(vat, { what: 'sugar', sugarG: grams, waterG: 0 })?.gravityChangePoints ?? NaN;
  let [lo, hi] = [0, 2000 * vat.volumeL];
  if (!(points >= 0) || !(lifted(hi) >= points)) return null;
  for (let i = 0; i < 60 && hi - lo > 0.005; i += 1) {
    const mid = (lo + hi) / 2;
    if (lifted(mid) < points) lo = mid;
    else hi = mid;
  }
  return hi;
}

/** The usual range of a dose in g/L, and where a dose stands in it. */
export function doseStanding(gPerL: number, usual: Range): 'below' | 'usual' | 'above' {
  if (gPerL > usual.hi * (1 + 1e-9)) return 'above';
  return gPerL < usual.lo * (1 - 1e-9) ? 'below' : 'usual';
}
