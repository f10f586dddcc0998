'use client';

import { useEffect } from 'react';
import { gravityText, litres, percent } from '@/components/batch/figures';
import { Button } from '@/components/ui/Button';
import { Select } from '@/components/ui/Field';
import { UnitField } from '@/components/units/UnitField';
import { useDrink } from '@/lib/client/cellarwork';
import type { BatchBody } from '@/lib/contracts/batches';
import type { DrinkBody } from '@/lib/contracts/family';

/** A part of a blend as it is typed. */
export interface BlendPartDraft {
  key: number;
  batchId: string;
  litres: string;
}

interface BlendPartProps {
  part: BlendPartDraft;
  batches: readonly BatchBody[];
  errors: { batch: string | undefined; litres: string | undefined };
  onChange: (part: Partial<BlendPartDraft>) => void;
  onDrink: (drink: DrinkBody) => void;
  /** Null: the last one stays. */
  onRemove: (() => void) | null;
}

/** One part of a blend, with what stands in its vessel by the log. */
export function BlendPart({ part, batches, errors, onChange, onDrink, onRemove }: BlendPartProps) {
  const { drink } = useDrink(part.batchId || null);
  useEffect(() => {
    if (drink) onDrink(drink);
  });
  const known = drink && drink.gravity !== null && drink.effective_og !== null;
  return (
    <div className="grid grid-cols-[minmax(0,1fr)_7rem_auto] items-start gap-2">
      <Select
        label="Batch"
        value={part.batchId}
        onChange={(event) => {
          const chosen = batches.find((item) => item.id === event.target.value);
          // All of another batch was not typed: it goes with that batch.
          const untouched = part.litres === '' || part.litres === String(batches.find((item) => item.id === part.batchId)?.volume_l);
          onChange({ batchId: event.target.value, litres: !untouched ? part.litres : chosen ? String(chosen.volume_l) : '' });
        }}
        error={errors.batch}
        hint={drink && (known ? `${litres(drink.volume_l)} at ${gravityText(drink.gravity!)}${drink.strength ? `, ${percent(drink.strength.balling.value.value)}` : ''}` : 'needs an original gravity and a reading first')}
      >
        <option value="">Choose</option>
        {batches.map((item) => (
          <option key={item.id} value={item.id}>
            {item.name}
          </option>
        ))}
      </Select>
      <UnitField measure="volume" label="How much" value={part.litres} onChange={(event) => onChange({ litres: event.target.value })} error={errors.litres} />
      {onRemove && (
        <Button look="quiet" className="mt-[22px]" aria-label="Leave this part out" onClick={onRemove}>
          out
        </Button>
      )}
    </div>
  );
}
