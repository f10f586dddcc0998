'use client';

import { useState, type FormEvent } from 'react';
import { Button, LinkButton } from '@/components/ui/Button';
import { Field, Select } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { PageHead } from '@/components/ui/Page';
import { createSensor } from '@/lib/client/sensors';
import { ClientError } from '@/lib/client/fetcher';
import { createSensor as createSensorSchema, type CreatedSensorBody } from '@/lib/contracts/sensors';
import { ConnectLines, CopyLine, type Doors } from './ConnectLines';

const INTERVALS = [
  { seconds: 60, name: '1 min' },
  { seconds: 300, name: '5 min' },
  { seconds: 900, name: '15 min' },
  { seconds: 1_800, name: '30 min' },
  { seconds: 3_600, name: '1 h' },
];

/** The secret, this one time, and the lines that use it. */
function Shown({ sensor, doors }: { sensor: CreatedSensorBody; doors: Doors }) {
  return (
    <>
      <PageHead title={sensor.name} meta={`sensor ${sensor.id}`} />
      <div className="flex max-w-[860px] flex-col gap-5 px-(--margin) py-5">
        <div className="border-l-[3px] border-ink bg-lit py-3 pl-4 pr-3">
          <h2 className="type-verdict-now">The secret is shown this one time</h2>
          <p className="type-body text-ink2">Write it into the sensor now. Only its fingerprint is kept here: a lost secret means adding the sensor anew.</p>
        </div>
        <CopyLine label="identifier, also the MQTT user name" text={sensor.id} />
        <CopyLine label="secret, also the MQTT password" text={sensor.secret} />
        <ConnectLines sensor={sensor.id} secret={sensor.secret} doors={doors} />
        <div>
          <LinkButton href={`/sensors/${sensor.id}`} look="first">
            It is in the sensor
          </LinkButton>
        </div>
      </div>
    </>
  );
}

/** Gives a sensor its identifier and its secret. */
export function NewSensor({ doors }: { doors: Doors }) {
  const [errors, setErrors] = useState<Record<string, string[]>>({});
  const [failed, setFailed] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  const [created, setCreated] = useState<CreatedSensorBody | null>(null);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const given = new FormData(event.currentTarget);
    const parsed = createSensorSchema.safeParse({ name: given.get('name'), interval_s: Number(given.get('interval_s')) });
    setFailed(null);
    if (!parsed.success) {
      setErrors({ name: parsed.error.issues.filter((issue) => issue.path[0] === 'name').map((issue) => issue.message) });
      return;
    }
    setErrors({});
    setBusy(true);
    try {
      setCreated(await createSensor(parsed.data));
    } catch (error) {
      if (error instanceof ClientError) setErrors(error.fields);
      setFailed(error instanceof ClientError ? error.message : 'The sensor was not added. Try again.');
    } finally {
      setBusy(false);
    }
  }

  if (created) return <Shown sensor={created} doors={doors} />;
  return (
    <>
      <PageHead title="Add a sensor" />
      <form noValidate onSubmit={(event) => void submit(event)} className="flex max-w-[420px] flex-col gap-4 px-(--margin) py-5">
        {failed && <FormError>{failed}</FormError>}
        <Field label="name" name="name" autoFocus maxLength={60} autoComplete="off" hint="What is written on it, such as Float 05" error={errors.name?.[0]} />
        <Select label="speaks every" name="interval_s" defaultValue="900" hint="As it is set in the sensor; silence is measured by it" error={errors.interval_s?.[0]}>
          {INTERVALS.map((interval) => (
            <option key={interval.seconds} value={interval.seconds}>
              {interval.name}
            </option>
          ))}
        </Select>
        <div className="flex flex-wrap gap-2">
          <Button type="submit" look="first" disabled={busy}>
            {busy ? 'Adding it' : 'Add it'}
          </Button>
          <LinkButton href="/sensors">Leave it</LinkButton>
        </div>
      </form>
    </>
  );
}
