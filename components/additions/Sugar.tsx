'use client';

import { useState } from 'react';
import { gravityText, points, typedNumber } from '@/components/batch/figures';
import { Choice } from '@/components/ui/Choice';
import { Field, Select } from '@/components/ui/Field';
import type { DrinkBody } from '@/lib/contracts/family';
import { effectOf, sugarForPoints } from '@/lib/core/additions/effect';
import { CATALOGUE, catalogued } from '@/lib/core/must/catalogue';
import { abvBalling } from '@/lib/core/strength/strength';
import { Dose, type Told } from './Dose';

const SWEET = CATALOGUE.filter((item) => item.kind === 'sugar' || item.kind === 'honey' || item.kind === 'syrup');
/** Where a drink ends when all of its sugar goes, as a round figure for what more it can reach. */
const DRY = 0.998;
/** Most that is told at once, g/L: over it no yeast here follows. */
const MOST_G_PER_L = 300;

/** Grams, as they are weighed: the dose is told and logged rounded. */
const rounded = (grams: number) => (grams >= 100 ? Math.round(grams) : Number(grams.toFixed(1)));

/** Sugar or honey into what works or stands, told by its weight or by the points that are wanted; what it does is told before it goes in. */
export function Sugar({ batchId, drink, mayLog }: { batchId: string; drink: DrinkBody; mayLog: boolean }) {
  const [key, setKey] = useState('table-sugar');
  const [by, setBy] = useState<'grams' | 'points'>('grams');
  const [typed, setTyped] = useState('');
  const ingredient = catalogued(key) ?? SWEET[0]!;
  const { effective_og: og, gravity } = drink;
  const vat = og === null || gravity === null ? null : { volumeL: drink.volume_l, originalGravity: Math.max(og, gravity), gravity };
  const value = typedNumber(typed);
  const wanted = value !== null && value > 0 ? value : null;
  const forPoints = vat && wanted !== null && by === 'points' ? sugarForPoints(vat, wanted) : null;
  const grams = wanted === null ? null : by === 'grams' ? wanted : forPoints === null ? null : rounded(forPoints / ingredient.extractShare.value);
  const most = MOST_G_PER_L * drink.volume_l;
  // As the log will reckon it: the sugar alone counts, the little water that comes with honey does not.
  const effect = vat && grams !== null && grams <= most ? effectOf(vat, { what: 'sugar', sugarG: grams * ingredient.extractShare.value, waterG: 0 }) : null;
  const end = drink.expected_final?.value ?? DRY;
  const reach = effect ? abvBalling(effect.after.effectiveOg, end) - abvBalling(effect.before.effectiveOg, end) : 0;
  const told: Told | null =
    effect && grams !== null
      ? {
          says: `${grams} g of ${ingredient.name}`,
          grams,
          substance: ingredient.kind === 'honey' ? 'honey' : 'sugar',
          name: ingredient.name,
          ingredient: ingredient.key,
          how: effect.how,
          facts: [
            `Gravity +${points(effect.gravityChangePoints)}, to ${gravityText(effect.after.gravity)}; as if it had begun at ${gravityText(effect.after.effectiveOg)}.`,
            drink.stabilised ? 'It is stabilised: the sugar should stay in it as sweetness.' : `Up to ${Math.max(0, reach).toFixed(1)} % more strength, if all of it ferments.`,
          ],
          cautions: effect.cautions,
          none: null,
        }
      : null;
  const needs = vat === null ? 'Log the original gravity and a reading first: then it tells what the sugar does.' : grams !== null && grams > most ? `More than ${MOST_G_PER_L} g/L at once: no yeast here follows that.` : 'Tell how much, or how many points it should rise.';
  return (
    <Dose title="Sugar and honey" batchId={batchId} mayLog={mayLog} told={told} needs={needs}>
      <Select label="Which" className="col-span-2" value={key} onChange={(event) => setKey(event.target.value)}>
        {SWEET.map((item) => (
          <option key={item.key} value={item.key}>
            {item.name}
          </option>
        ))}
      </Select>
      <Field label={by === 'grams' ? 'How much' : 'Should rise by'} unit={by === 'grams' ? 'g' : 'points'} inputMode="decimal" autoComplete="off" value={typed} onChange={(event) => setTyped(event.target.value)} hint={by === 'grams' ? undefined : 'One point is 0.001.'} />
      <Choice label="Told by" value={by} onChoose={setBy} options={[{ value: 'grams', name: 'weight' }, { value: 'points', name: 'points' }]} />
    </Dose>
  );
}
