/** A drink as the bench needs it: its strength and sugar at their upper ends. */
import { contentsOf } from '../family/contents';
import { abvBalling } from '../strength/strength';
import { ballingError } from '../strength/methods';
import type { DrinkForGas } from './co2';

/**
 * Strength and dissolved extract at their upper ends, for the pressure: more of
 * either holds less gas. The real extract (Balling) stands for the sugar; it also
 * counts what is not sugar, which is on the safe side.
 */
export function drinkForGas(originalGravity: number, gravity: number): DrinkForGas {
  const abv = abvBalling(originalGravity, gravity);
  const { extractG } = contentsOf({ volumeL: 1, originalGravity, gravity });
  return { abvPercent: abv + ballingError(abv), sugarGPerL: Math.max(0, extractG) };
}
