import type { Transaction } from 'sequelize';
import type { Actor } from '@/lib/auth/policies';
import type { CreateEntry } from '@/lib/contracts/batches';
import { asSugar } from '@/lib/core/additions/effect';
import { InvalidError } from '@/lib/errors';
import { ingredientNamed, ownIngredients } from '../drink/load';

type Weighed = Pick<CreateEntry, 'kind' | 'sugar_g' | 'fruit_g' | 'detail'>;

/** Sugar or fruit that a weighed ingredient brings, where the person did not tell the sugar itself. */
export async function broughtBy(actor: Actor, input: Weighed, transaction: Transaction): Promise<{ sugarG: number | null; fruitG: number | null }> {
  const told = { sugarG: input.sugar_g, fruitG: input.fruit_g };
  const { ingredient: key, grams } = input.detail ?? {};
  if (input.kind !== 'addition' || !key || !grams || told.sugarG !== null || told.fruitG !== null) return told;
  const ingredient = ingredientNamed(key, await ownIngredients(actor.cellarId, [key], transaction));
  if (!ingredient) throw new InvalidError('There is no such ingredient.', { 'detail.ingredient': ['is not in the catalogue'] });
  if (ingredient.kind === 'fruit') return { sugarG: null, fruitG: grams };
  const brought = asSugar(ingredient, grams);
  return { sugarG: brought.what === 'sugar' && brought.sugarG > 0 ? brought.sugarG : null, fruitG: null };
}
