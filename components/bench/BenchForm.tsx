'use client';

import { Choice } from '@/components/ui/Choice';
import { Field, Select } from '@/components/ui/Field';
import { Sentence } from '@/components/ui/Sentence';
import { UnitField } from '@/components/units/UnitField';
import type { BenchFacts } from '@/lib/contracts/bench';
import { Bottles } from './Bottles';
import { Fizz } from './Fizz';
import type { BenchDraft, BenchErrors, SugarWay, WeighedSugar } from './draft';
import { SUGAR_WORDS } from './words';

const WAYS: readonly { value: SugarWay; name: string }[] = [
  { value: 'none', name: 'none' },
  { value: 'weighed', name: 'by weight' },
  { value: 'syrup', name: 'syrup' },
  { value: 'drops', name: 'drops' },
];

/** What is asked of the bench; all that is known from the log is not asked. */
export function BenchForm({ draft, errors, facts, onChange }: { draft: BenchDraft; errors: BenchErrors; facts: BenchFacts; onChange: (part: Partial<BenchDraft>) => void }) {
  const measured = facts.warmest_since_end_c;
  return (
    <div className="flex flex-col gap-4">
      <Bottles draft={draft} errors={errors} onChange={(bottles) => onChange({ bottles })} />
      <div className="grid grid-cols-2 gap-3 border-t pt-3">
        <UnitField measure="volume" label="in the vessel" value={draft.volume} error={errors.volume_l} onChange={(event) => onChange({ volume: event.target.value })} />
        <UnitField measure="volume" label="left on lees" value={draft.losses} error={errors.losses_l} onChange={(event) => onChange({ losses: event.target.value })} />
      </div>
      <div className="grid grid-cols-2 gap-3 border-t pt-3">
        <UnitField measure="temperature" label="cellar" value={draft.cellar} error={errors.cellar_c} onChange={(event) => onChange({ cellar: event.target.value })} />
        <UnitField measure="temperature" label="warmest they stand" value={draft.warmest} error={errors.warmest_store_c} onChange={(event) => onChange({ warmest: event.target.value })} />
        <UnitField
          measure="temperature"
          className="col-span-2"
          label="warmest since it finished"
          value={draft.warmestSinceEnd}
          // What nobody has been asked yet is no fault of theirs.
          error={draft.warmestSinceEnd === '' ? undefined : errors.warmest_since_end_c}
          hint={measured === null ? `${facts.done.gravity === null ? 'Since when it stands still is not known.' : 'No sensor measured it.'} If in doubt, say it colder: cold drink holds more gas.` : <Sentence>{`The sensor measured ${measured.toFixed(1)} °C; the colder of the two is used.`}</Sentence>}
          onChange={(event) => onChange({ warmestSinceEnd: event.target.value })}
        />
      </div>
      <div className="flex flex-col gap-3 border-t pt-3">
        <Choice label="sugar for fizz" value={draft.way} options={WAYS} onChoose={(way) => onChange({ way })} />
        {draft.way === 'weighed' && (
          <Select label="which sugar" value={draft.sugar} onChange={(event) => onChange({ sugar: event.target.value as WeighedSugar })}>
            {(Object.keys(SUGAR_WORDS) as WeighedSugar[]).map((sugar) => (
              <option key={sugar} value={sugar}>
                {SUGAR_WORDS[sugar]}
              </option>
            ))}
          </Select>
        )}
        {draft.way === 'syrup' && <Field label="sugar in the syrup, by weight" unit="%" inputMode="decimal" value={draft.syrupShare} error={errors['priming.syrup_share']} onChange={(event) => onChange({ syrupShare: event.target.value })} />}
        {draft.way === 'drops' && (
          <Field
            label="one drop weighs"
            unit="g"
            inputMode="decimal"
            placeholder="2 to 3"
            value={draft.dropGrams}
            error={errors['priming.grams_each.lo']}
            hint="Weigh ten of yours. One for 250 ml and three for 750 ml is usual."
            onChange={(event) => onChange({ dropGrams: event.target.value })}
          />
        )}
        {(draft.way === 'weighed' || draft.way === 'syrup') && <Fizz volumes={draft.volumes} onChange={(volumes) => onChange({ volumes })} />}
        {draft.way === 'none' && <p className="type-reason text-ink2">Dry and still: no sugar goes in.</p>}
      </div>
    </div>
  );
}
