'use client';

import { useSyncExternalStore } from 'react';
import { Select } from '@/components/ui/Field';

const never = () => () => undefined;
let zones: readonly string[] | undefined;
/** Every zone that this browser knows, with UTC, which the list leaves out. */
const allZones = () => (zones ??= ['UTC', ...Intl.supportedValuesOf('timeZone').filter((zone) => zone !== 'UTC')]);
const NONE: readonly string[] = [];

const deviceZone = () => Intl.DateTimeFormat().resolvedOptions().timeZone;
/** Where this device is; the server does not know. */
export const useDeviceZone = () => useSyncExternalStore(never, deviceZone, () => 'UTC');

/** One of the IANA time zones. */
export function TimeZoneField({ label = 'time zone', value, onChoose, error, hint, className }: { label?: string; value: string; onChoose: (zone: string) => void; error?: string | undefined; hint?: string; className?: string }) {
  // The server need not send four hundred names.
  const known = useSyncExternalStore(never, allZones, () => NONE);
  const options = known.includes(value) ? known : [value, ...known];
  return (
    <Select label={label} value={value} error={error} hint={hint} className={className} onChange={(event) => onChoose(event.target.value)}>
      {options.map((zone) => (
        <option key={zone} value={zone}>
          {zone.replaceAll('_', ' ')}
        </option>
      ))}
    </Select>
  );
}
