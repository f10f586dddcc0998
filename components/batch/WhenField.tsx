'use client';

import { useState, type ReactNode } from 'react';
import { Field } from '@/components/ui/Field';
import { HALF_TYPED, toLocal } from './entry-form';

interface WhenFieldProps {
  label?: string;
  /** Local time as the browser writes it; empty: now. */
  value: string;
  onType: (value: string) => void;
  /** s since 1970. */
  now: number;
  timeZone: string;
  error?: string | undefined;
  hint?: ReactNode;
}

/** When something was done; empty is now. A date typed half way is told from none: the browser gives both as empty. */
export function WhenField({ label = 'When', value, onType, now, timeZone, error, hint = 'Empty: now.' }: WhenFieldProps) {
  const [left, setLeft] = useState(false);
  const half = value === HALF_TYPED;
  const look = (field: HTMLInputElement) => {
    const typed = field.validity.badInput ? HALF_TYPED : field.value;
    if (typed !== value) onType(typed);
  };
  return (
    <Field
      label={label}
      type="datetime-local"
      max={toLocal(now + 600, timeZone)}
      value={half ? '' : value}
      onFocus={() => setLeft(false)}
      onChange={(event) => look(event.target)}
      onKeyUp={(event) => look(event.currentTarget)}
      onBlur={(event) => {
        look(event.target);
        setLeft(true);
      }}
      hint={hint}
      error={half && (left || error) ? 'is not a whole day and time yet; clear it for now' : error}
    />
  );
}
