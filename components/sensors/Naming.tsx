'use client';

import { useState, type FormEvent } from 'react';
import { Button } from '@/components/ui/Button';
import { Field, Select } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { updateSensor as updateSensorSchema, type SensorBody } from '@/lib/contracts/sensors';
import { IntervalOptions } from './Intervals';
import { useSensorChange } from './Placement';

/** Its name, and how often it is expected to speak: silence is measured by it. */
export function Naming({ sensor }: { sensor: SensorBody }) {
  const { busy, failed, change } = useSensorChange(sensor.id);
  const [error, setError] = useState<string | undefined>();
  const [kept, setKept] = useState(false);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const given = new FormData(event.currentTarget);
    const parsed = updateSensorSchema.safeParse({ name: given.get('name'), interval_s: Number(given.get('interval_s')) });
    setKept(false);
    setError(parsed.success ? undefined : parsed.error.issues[0]?.message);
    if (parsed.success) setKept(await change(parsed.data));
  }

  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="flex flex-col gap-3 border-b px-(--margin) py-4">
      {failed && <FormError>{failed}</FormError>}
      <div className="flex flex-wrap items-start gap-3">
        {/* Anew where it was changed elsewhere: a sensor that confirms its settings would be set back. */}
        <Field key={sensor.name} label="name" name="name" defaultValue={sensor.name} maxLength={60} autoComplete="off" error={error} className="min-w-40 flex-1" />
        <Select key={sensor.interval_s} label="expected every" name="interval_s" defaultValue={sensor.interval_s} className="w-32">
          <IntervalOptions given={sensor.interval_s} />
        </Select>
      </div>
      <div className="flex items-center gap-3">
        <Button type="submit" disabled={busy}>
          Keep it so
        </Button>
        <span role="status" className="type-label text-ink2">
          {kept && 'kept'}
        </span>
      </div>
    </form>
  );
}
