'use client';

import { useState, type ComponentProps } from 'react';
import { Field } from '@/components/ui/Field';
import { complaintIn, keptText, shownText, unitOf, type Measure } from './typed';

interface UnitFieldProps extends Omit<ComponentProps<typeof Field>, 'unit' | 'value' | 'onChange' | 'type'> {
  measure: Measure;
  /** As text, in what is kept: SG, °C, litres. */
  value: string;
  /** Told what is kept, never what was typed; the same form as an input's event. */
  onChange: (event: { target: { value: string } }) => void;
}

/**
 * A figure in the unit that the person reads, for a form that keeps SG, °C and litres.
 * What it holds is text, so that what is no number stays and can be complained about.
 * `60 F`, `12.5 P` or `1.048` are understood whatever the usual unit is.
 */
export function UnitField({ measure, value, onChange, placeholder, error, ...rest }: UnitFieldProps) {
  const [last, setLast] = useState({ typed: '', kept: '' });
  // Somebody else changed what is kept: show that. Otherwise leave alone what is being typed.
  const text = last.kept === value ? last.typed : shownText(value, measure);
  return (
    <Field
      inputMode="decimal"
      autoComplete="off"
      {...rest}
      unit={unitOf(text, measure)}
      value={text}
      placeholder={placeholder === undefined ? undefined : shownText(placeholder, measure)}
      error={error === undefined ? undefined : complaintIn(error, measure)}
      onChange={(event) => {
        const typed = event.target.value;
        const kept = keptText(typed, measure);
        setLast({ typed, kept });
        onChange({ target: { value: kept } });
      }}
    />
  );
}
