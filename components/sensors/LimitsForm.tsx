'use client';

import { useState, type FormEvent } from 'react';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { Haze } from '@/components/ui/Haze';
import { ErrorState, FormError } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { sensorLimits, type SensorLimits } from '@/lib/contracts/sensors';
import { useMe } from '@/lib/client/me';
import { setSensorLimits, useSensorLimits } from '@/lib/client/sensors';
import { readNumber } from './numbers';
import { useAct } from '@/components/ui/use-act';
import { sentencesOf, firstOf } from '@/lib/contracts/issues';

const FIELDS: readonly { name: keyof SensorLimits; label: string; unit: string; hint: string }[] = [
  { name: 'low_battery_days', label: 'cell may be flat within', unit: 'days', hint: 'by the low end of the forecast' },
  { name: 'empty_battery_v', label: 'a cell is flat at', unit: 'V', hint: '3.3 V suits most lithium cells' },
  { name: 'weak_signal_dbm', label: 'signal at or below', unit: 'dBm', hint: 'median of a day' },
  { name: 'missed_percent', label: 'messages missing', unit: '%', hint: 'by their running numbers, in a day' },
  { name: 'clock_offset_s', label: 'its clock is off by', unit: 's', hint: 'against this house' },
];

function Form({ limits, mayChange }: { limits: SensorLimits; mayChange: boolean }) {
  const [values, setValues] = useState(() => Object.fromEntries(FIELDS.map(({ name }) => [name, String(limits[name])])) as Record<keyof SensorLimits, string>);
  const [kept, setKept] = useState(false);
  const { busy, failed, fields, act, setFields } = useAct('The limits were not kept. Try again.');
  async function submit(event: FormEvent) {
    event.preventDefault();
    setKept(false);
    const parsed = sensorLimits.safeParse(Object.fromEntries(FIELDS.map(({ name }) => [name, readNumber(values[name])])));
    if (!parsed.success) return setFields(firstOf(sentencesOf(parsed.error.issues)));
    setKept(await act(() => setSensorLimits(parsed.data)));
  }
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="flex flex-col gap-4 border-b bg-desk px-(--margin) py-4">
      {failed && <FormError>{failed}</FormError>}
      <div className="flex flex-wrap items-start gap-3">
        {FIELDS.map(({ name, label, unit, hint }) => (
          <Field key={name} label={label} unit={unit} hint={hint} inputMode="text" held={!mayChange} value={values[name]} onChange={(event) => setValues((before) => ({ ...before, [name]: event.target.value }))} error={fields[name]} className="w-56" />
        ))}
      </div>
      {mayChange && (
        <div className="flex items-center gap-3">
          <Button type="submit" look="first" disabled={busy}>
            Keep it so
          </Button>
          <span role="status" className="type-label text-ink2">
            {kept && 'kept'}
          </span>
        </div>
      )}
    </form>
  );
}

/** When the cellar wants to be told of its sensors. */
export function LimitsPage() {
  const { may } = useMe();
  const { data, loading, error, retry } = useSensorLimits();
  return (
    <section aria-label="When to be told">
      <GroupBar word="Say so when" note="on the list of sensors and on the sensor’s page" />
      {loading && <Haze height={80} label="Loading the limits" className="mx-(--margin) my-3" />}
      {error && !data && (
        <ErrorState title="The limits did not load" onRetry={retry}>
          {error.message}
        </ErrorState>
      )}
      {data && <Form limits={data} mayChange={may('sensors.manage')} />}
    </section>
  );
}
