'use client';

import { useId, type InputHTMLAttributes, type ReactNode, type SelectHTMLAttributes, type TextareaHTMLAttributes } from 'react';
import { StateMark } from './StateMark';

interface Around {
  label: ReactNode;
  /** The allowed span or what is wrong, in words. */
  error?: string | undefined;
  /** One line below, where there is no error. */
  hint?: ReactNode;
  /** Set where the label alone would not be understood. */
  className?: string;
}

/** Under 16 px a phone zooms into the field that is touched, and the page jumps. */
const EDGE = 'w-full rounded bg-lit text-ink outline-offset-2 border-[1.5px] max-strip:text-[1rem]!';
const edge = (error: string | undefined, held: boolean) => `${EDGE} ${error ? 'border-2 border-madder' : held ? 'border-dashed border-ink3 bg-transparent text-ink2' : 'border-ink2'}`;

/** What the description of a control points at. */
const described = (id: string, error: string | undefined, hint: ReactNode) => (error ? `${id}-error` : hint ? `${id}-hint` : undefined);

function Frame({ id, label, error, hint, className = '', children }: Around & { id: string; children: ReactNode }) {
  return (
    <div className={`flex min-w-0 flex-col gap-1 ${className}`}>
      <label htmlFor={id} className="type-label text-ink2">
        {label}
      </label>
      {children}
      {error ? (
        <p id={`${id}-error`} className="type-label flex items-start gap-1.5 text-madder" style={{ fontWeight: 600 }}>
          <StateMark state="Check" size={13} className="mt-[2px] text-madder!" />
          <span>{error}</span>
        </p>
      ) : (
        hint && (
          <p id={`${id}-hint`} className="type-label text-ink2">
            {hint}
          </p>
        )
      )}
    </div>
  );
}

interface FieldProps extends Around, Omit<InputHTMLAttributes<HTMLInputElement>, 'className'> {
  /** Shown inside at the right: `°C`, `L`, `by hand`. */
  unit?: ReactNode;
  /** Withheld: dashed, not to be filled in now. */
  held?: boolean;
  tall?: boolean;
}

/** A line to fill in: label above, unit inside at the right, the error in words below. */
export function Field({ label, error, hint, className, unit, held = false, tall = false, id: given, ...rest }: FieldProps) {
  const made = useId();
  const id = given ?? made;
  return (
    <Frame id={id} label={label} error={error} hint={hint} className={className}>
      <span className="relative block">
        <input
          id={id}
          aria-invalid={error ? true : undefined}
          aria-describedby={described(id, error, hint)}
          disabled={held || rest.disabled}
          className={`${edge(error, held)} font-mono text-[0.875rem] font-medium ${tall ? 'h-[46px]' : 'h-11 strip:h-9'} px-3 ${unit ? 'pr-16' : ''}`}
          {...rest}
        />
        {unit && <span className="type-label pointer-events-none absolute right-3 top-1/2 -translate-y-1/2 text-ink2">{unit}</span>}
      </span>
    </Frame>
  );
}

/** Several lines of prose. */
export function TextField({ label, error, hint, className, id: given, rows = 3, ...rest }: Around & Omit<TextareaHTMLAttributes<HTMLTextAreaElement>, 'className'>) {
  const made = useId();
  const id = given ?? made;
  return (
    <Frame id={id} label={label} error={error} hint={hint} className={className}>
      <textarea
        id={id}
        rows={rows}
        aria-invalid={error ? true : undefined}
        aria-describedby={described(id, error, hint)}
        className={`${edge(error, false)} type-body resize-y px-3 py-2`}
        {...rest}
      />
    </Frame>
  );
}

/** One of several. */
export function Select({ label, error, hint, className, id: given, children, ...rest }: Around & Omit<SelectHTMLAttributes<HTMLSelectElement>, 'className'>) {
  const made = useId();
  const id = given ?? made;
  return (
    <Frame id={id} label={label} error={error} hint={hint} className={className}>
      <span className="relative block">
        <select
          id={id}
          aria-invalid={error ? true : undefined}
          aria-describedby={described(id, error, hint)}
          className={`${edge(error, false)} h-11 appearance-none truncate pl-3 pr-9 font-mono text-[0.8125rem] font-medium strip:h-9`}
          {...rest}
        >
          {children}
        </select>
        <svg viewBox="0 0 12 12" width="12" height="12" aria-hidden className="pointer-events-none absolute right-3 top-1/2 -translate-y-1/2 text-ink2">
          <path d="m2 4 4 4 4-4" fill="none" stroke="currentColor" strokeWidth="1.6" />
        </svg>
      </span>
    </Frame>
  );
}
