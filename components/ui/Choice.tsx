'use client';

import type { ReactNode } from 'react';

interface ChoiceProps<T extends string> {
  /** Said to those who hear the page, drawn above as a field's label unless `bare`. */
  label: string;
  bare?: boolean;
  value: T;
  onChoose: (value: T) => void;
  options: readonly { value: T; name: ReactNode }[];
  className?: string;
}

/** A few options side by side, one of them filled: for choices short enough to see at once. */
export function Choice<T extends string>({ label, bare = false, value, onChoose, options, className = '' }: ChoiceProps<T>) {
  return (
    <fieldset className={`min-w-0 ${className}`}>
      <legend className={bare ? 'heard-only' : 'type-label mb-1 text-ink2'}>{label}</legend>
      <div className="flex flex-wrap gap-px rounded border-[1.5px] border-ink2 bg-ink3">
        {options.map((option) => (
          <label
            key={option.value}
            className={`type-label relative flex min-h-11 flex-1 items-center justify-center px-3 text-center [overflow-wrap:normal] strip:min-h-[33px] ${option.value === value ? 'bg-ink text-on' : 'bg-lit text-ink hover:bg-desk'}`}
            style={{ fontWeight: option.value === value ? 600 : 500 }}
          >
            <input type="radio" className="absolute inset-0 appearance-none" name={label} value={option.value} checked={option.value === value} onChange={() => onChoose(option.value)} />
            <span className="pointer-events-none">{option.name}</span>
          </label>
        ))}
      </div>
    </fieldset>
  );
}
