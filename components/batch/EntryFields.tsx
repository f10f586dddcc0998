'use client';

import { Choice } from '@/components/ui/Choice';
import { Field, Select, TextField } from '@/components/ui/Field';
import { Sentence } from '@/components/ui/Sentence';
import { hydrometerMarks } from '@/components/ui/units';
import { UnitField } from '@/components/units/UnitField';
import { CLARITIES, SUBSTANCES } from '@/lib/contracts/batches';
import { FOAMS, NECKS } from '@/lib/core/types';
import { fieldsOf, type DraftErrors, type EntryDraft, type EntryField, type EntryKind } from './entry-form';
import { refractometerWords, type MustKnown } from './refractometer';
import { CLARITY_WORDS, FOAM_WORDS, NECK_WORDS, SUBSTANCE_WORDS } from './words';

interface EntryFieldsProps {
  draft: EntryDraft;
  errors: DraftErrors;
  /** Local time that it cannot lie after. */
  latest: string;
  known: MustKnown;
  onChange: (change: Partial<EntryDraft>) => void;
}

const NARROW: ReadonlySet<EntryField> = new Set<EntryField>(['temperature', 'calibratedAt', 'ph', 'bubbles', 'grams', 'name']);
const TEXT_LABEL: Partial<Record<EntryKind, string>> = { observation: 'In your own words', note: 'Note' };

/** Foam and clarity may also be left open. */
const open = <T extends string>(values: readonly T[], words: Record<T, string>) => [{ value: '' as const, name: '–' }, ...values.map((value) => ({ value, name: words[value] }))];

/** The fields that an entry of its kind asks for, one thumb wide on a phone. */
export function EntryFields({ draft, errors, latest, known, onChange }: EntryFieldsProps) {
  const set = (field: EntryField) => (event: { target: { value: string } }) => onChange({ [field]: event.target.value });
  const text = (field: EntryField) => ({ value: draft[field], onChange: set(field), error: errors[field], autoComplete: 'off' });
  const figure = (field: EntryField) => ({ ...text(field), inputMode: 'decimal' as const });
  const adds = draft.kind === 'addition' || draft.kind === 'top_up';
  const refracted = draft.instrument === 'refractometer' ? refractometerWords(draft, known) : null;

  const fields: Record<Exclude<EntryField, 'kind'>, React.ReactNode> = {
    instrument: (
      <Choice
        label="Read with"
        value={draft.instrument}
        onChoose={(instrument) => onChange({ instrument })}
        options={[
          { value: 'hydrometer', name: 'hydrometer' },
          { value: 'refractometer', name: 'refractometer' },
        ]}
      />
    ),
    gravity: <UnitField measure="gravity" label={adds ? 'Gravity of what went in' : 'Gravity as read'} placeholder="1.048" {...text('gravity')} />,
    brix: (
      <div>
        <Field label="It shows" unit="°Bx" placeholder="8.2" {...figure('brix')} />
        {refracted && (
          <p role="status" className="type-reason mt-2 border-l-[3px] border-rule2 pl-3">
            <Sentence>{refracted}</Sentence>
          </p>
        )}
      </div>
    ),
    temperature: (
      <UnitField
        measure="temperature"
        label="Sample temperature"
        hint={<Sentence>{draft.instrument === 'refractometer' ? 'Empty: the instrument corrects itself.' : 'Corrected to 20 °C. Empty: kept as read.'}</Sentence>}
        {...text('temperature')}
      />
    ),
    calibratedAt: <UnitField measure="temperature" label="Hydrometer made for" hint={`Printed on it: ${hydrometerMarks().join(', often ')} on older ones.`} {...text('calibratedAt')} />,
    ph: <Field label="pH, if measured" placeholder="3.4" {...figure('ph')} />,
    bubbles: <Field label="Bubbles a minute" placeholder="12" {...figure('bubbles')} />,
    foam: <Choice label="Foam" value={draft.foam} onChoose={(foam) => onChange({ foam })} options={open(FOAMS, FOAM_WORDS)} />,
    clarity: <Choice label="Clarity" value={draft.clarity} onChoose={(clarity) => onChange({ clarity })} options={open(CLARITIES, CLARITY_WORDS)} />,
    smell: <Field label="Smell" maxLength={300} {...text('smell')} />,
    taste: <Field label="Taste" maxLength={300} {...text('taste')} />,
    neck: (
      <Select label="The neck now" value={draft.neck} onChange={set('neck')} error={errors.neck}>
        <option value="">{draft.kind === 'neck' ? 'Choose' : 'As it was'}</option>
        {NECKS.map((name) => (
          <option key={name} value={name}>
            {NECK_WORDS[name]}
          </option>
        ))}
      </Select>
    ),
    volume: <UnitField measure="volume" label={adds ? 'How much went in' : 'Volume in the vessel now'} {...text('volume')} />,
    substance: (
      <Select label="What went in" value={draft.substance} onChange={set('substance')} error={errors.substance}>
        {SUBSTANCES.map((substance) => (
          <option key={substance} value={substance}>
            {SUBSTANCE_WORDS[substance]}
          </option>
        ))}
      </Select>
    ),
    name: <Field label="As the packet names it" maxLength={80} {...text('name')} />,
    grams: <Field label="Weight" unit="g" {...figure('grams')} />,
    text: <TextField label={TEXT_LABEL[draft.kind] ?? 'Note'} value={draft.text} onChange={set('text')} error={errors.text} rows={draft.kind === 'note' ? 5 : 2} maxLength={2000} />,
    at: <Field label="When" type="datetime-local" max={latest} {...text('at')} />,
  };

  return (
    <div className="grid grid-cols-2 gap-x-3 gap-y-4">
      {fieldsOf(draft).map((field) => (
        <div key={field} className={NARROW.has(field) ? '' : 'col-span-2'}>
          {field !== 'kind' && fields[field]}
        </div>
      ))}
    </div>
  );
}
