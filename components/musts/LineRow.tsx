'use client';

import { useId, useState } from 'react';
import { typedNumber } from '@/components/batch/figures';
import { Button } from '@/components/ui/Button';
import { Field, Select } from '@/components/ui/Field';
import { useMoney } from '@/components/ui/money';
import { camelKeys } from '@/lib/contracts/case';
import { bring, inputsOf } from '@/lib/core/must/line';
import { about, exactly } from '@/lib/core/units/range';
import { amountText } from './amount';
import { bareAmount, quantityOf, withAmount, withSugar, withUnit, type LineDraft } from './draft';
import { unitsFor } from './units-for';
import { PRESERVATIVE_WORDS, unitWord, weight } from './words';

/** What the line brings, in words; null while it cannot be weighed. */
function broughtBy(line: LineDraft): string | null {
  const quantity = quantityOf(line);
  if (!quantity) return null;
  try {
    const core = camelKeys({ id: line.id, ingredient: line.ingredient, amount: { quantity, unit: line.unit }, cost_per_unit: null });
    const inputs = inputsOf(core);
    const brought = bring(core.ingredient, {
      grams: inputs.grams.value,
      extractShare: inputs.extractShare.value,
      fermentableShare: inputs.fermentableShare.value,
      efficiency: inputs.efficiency.value,
      yanMgPerG: inputs.yanMgPerG.value,
      sulphiteMgPerG: inputs.sulphiteMgPerG.value,
    });
    const parts = [
      line.unit === 'g' || line.unit === 'kg' ? null : `about ${weight(inputs.grams.value)}`,
      brought.extractG >= 0.5 ? `sugar ${weight(brought.extractG)}` : null,
      brought.waterG >= 0.5 ? `water ${weight(brought.waterG)}` : brought.waterG <= -0.5 ? `keeps ${weight(-brought.waterG)} of water` : null,
    ].filter((part) => part !== null);
    return parts.join(', ') || null;
  } catch {
    return null; // the figures beside the form say why
  }
}

interface LineRowProps {
  line: LineDraft;
  error: string | undefined;
  first: boolean;
  last: boolean;
  onChange: (line: LineDraft) => void;
  onMove: (by: -1 | 1) => void;
  onRemove: () => void;
}

/** Name, amount, unit and two buttons; on a phone the name stands above the rest. */
export const LINE_COLUMNS = 'grid-cols-[minmax(0,1fr)_5.75rem_auto] strip:grid-cols-[minmax(0,1fr)_8.5rem_8rem_9rem]';
/** The name of the line, or the head of the column, stands for the label. */
const UNLABELLED = '[&>label]:heard-only gap-0.5!';

/** One line of the sheet: what, how much, what it brings; the rest behind a word. */
export function LineRow({ line, error, first, last, onChange, onMove, onRemove }: LineRowProps) {
  const [open, setOpen] = useState(false);
  const { currency } = useMoney();
  const details = useId();
  const { ingredient } = line;
  const quantity = quantityOf(line);
  const judged = quantity !== null && quantity.lo < quantity.hi;
  const sweet = ingredient.extract_share.hi > 0;
  const sugar = ingredient.extract_share;
  const [percent, setPercent] = useState('');
  const brings = broughtBy(line);
  const label = ingredient.kind === 'juice' ? '°Bx measured, or on the label' : 'Sugar by its label';
  const about100 = (value: number) => String(Number((100 * value).toFixed(1)));

  return (
    <li className="border-b border-rule py-2">
      <div className={`grid gap-x-2 gap-y-1 ${LINE_COLUMNS}`}>
        <div className="min-w-0 max-strip:col-span-full">
          <p className="type-name-low break-words">{ingredient.name}</p>
          {brings && <p className="type-label text-ink2">{brings}</p>}
        </div>
        <Field
          label={`Amount of ${ingredient.name}`}
          className={UNLABELLED}
          value={line.amount}
          onChange={(event) => onChange(withAmount(line, event.target.value))}
          onBlur={() => bareAmount(line) !== line.amount && onChange({ ...line, amount: bareAmount(line) })}
          error={error}
          inputMode="text"
          autoComplete="off"
          placeholder="how much"
        />
        <Select label={`Unit of ${ingredient.name}`} className={UNLABELLED} value={line.unit} onChange={(event) => onChange(withUnit(line, event.target.value as LineDraft['unit']))}>
          {unitsFor(ingredient).map((unit) => (
            <option key={unit} value={unit}>
              {unitWord(unit, ingredient)}
            </option>
          ))}
        </Select>
        <div className="flex gap-2 self-start max-strip:[&>*]:px-2.5 strip:pt-0.5">
          <Button
            look={judged ? 'first' : 'quiet'}
            aria-pressed={judged}
            disabled={!quantity}
            aria-label={`${ingredient.name}: about, good to a fifth`}
            onClick={() => quantity && onChange({ ...line, amount: amountText(judged ? exactly(quantity.value) : about(quantity.value)) })}
          >
            about
          </Button>
          <Button look="quiet" aria-expanded={open} aria-controls={details} aria-label={`${ingredient.name}: ${open ? 'less' : 'more'}`} onClick={() => setOpen(!open)}>
            {open ? 'less' : 'more'}
          </Button>
        </div>
      </div>
      {open && (
        <div id={details} className="mt-3 grid grid-cols-2 gap-3 border-l-[3px] border-rule2 pl-3 strip:grid-cols-3">
          {sweet && (
            <Field
              label={label}
              unit={ingredient.kind === 'juice' ? '°Bx' : '%'}
              inputMode="decimal"
              autoComplete="off"
              value={percent}
              placeholder={sugar.lo === sugar.hi ? about100(sugar.value) : `${about100(sugar.lo)} to ${about100(sugar.hi)}`}
              onChange={(event) => {
                setPercent(event.target.value);
                const value = typedNumber(event.target.value);
                if (value !== null && value >= 0 && value <= 100) onChange(withSugar(line, value));
              }}
              hint="Narrows the spread."
            />
          )}
          <Select
            label="Preservative in it"
            value={ingredient.preservative ?? ''}
            onChange={(event) => onChange({ ...line, ingredient: { ...ingredient, preservative: (event.target.value || null) as typeof ingredient.preservative } })}
          >
            {Object.entries(PRESERVATIVE_WORDS).map(([value, name]) => (
              <option key={value} value={value}>
                {name}
              </option>
            ))}
          </Select>
          <Field label={`Cost of one ${unitWord(line.unit, ingredient)}`} unit={currency} inputMode="decimal" autoComplete="off" value={line.cost} onChange={(event) => onChange({ ...line, cost: event.target.value })} />
          <Field className="col-span-full" label="Note" autoComplete="off" maxLength={300} value={line.note} onChange={(event) => onChange({ ...line, note: event.target.value })} />
          <p className="type-tick col-span-full text-ink2">
            {ingredient.source.toLowerCase().startsWith(ingredient.status) ? ingredient.source : `${ingredient.status}: ${ingredient.source}`}
            {ingredient.allergens.length > 0 && `. Holds ${ingredient.allergens.join(', ')}.`}
          </p>
          <div className="col-span-full flex flex-wrap gap-2">
            <Button look="quiet" disabled={first} onClick={() => onMove(-1)} aria-label={`${ingredient.name}: up`}>
              Up
            </Button>
            <Button look="quiet" disabled={last} onClick={() => onMove(1)} aria-label={`${ingredient.name}: down`}>
              Down
            </Button>
            <Button look="quiet" onClick={onRemove} aria-label={`Leave out ${ingredient.name}`}>
              Leave it out
            </Button>
          </div>
        </div>
      )}
    </li>
  );
}
