'use client';

import { useSyncExternalStore } from 'react';
import { Select } from '@/components/ui/Field';

const never = () => () => undefined;
let codes: readonly string[] | undefined;
/** Every currency that this browser knows. */
const allCodes = () => (codes ??= Intl.supportedValuesOf('currency'));
const NONE: readonly string[] = [];

/** What costs are counted in (ISO 4217); none: figures alone. */
export function CurrencyField({ value, onChoose, error, className }: { value: string | null; onChoose: (currency: string | null) => void; error?: string | undefined; className?: string }) {
  // The server need not send three hundred names.
  const known = useSyncExternalStore(never, allCodes, () => NONE);
  const options = value === null || known.includes(value) ? known : [value, ...known];
  const names = new Intl.DisplayNames('en', { type: 'currency' });
  return (
    <Select label="currency" value={value ?? ''} error={error} hint="of the costs on must sheets and lots" className={className} onChange={(event) => onChoose(event.target.value || null)}>
      <option value="">none: figures alone</option>
      {options.map((code) => (
        <option key={code} value={code}>
          {code}, {names.of(code)}
        </option>
      ))}
    </Select>
  );
}
