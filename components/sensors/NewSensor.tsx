'use client';

import { useState, type FormEvent } from 'react';
import { Button, LinkButton } from '@/components/ui/Button';
import { Field, Select } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { GroupBar, PageHead } from '@/components/ui/Page';
import { Sentence } from '@/components/ui/Sentence';
import { createSensor } from '@/lib/client/sensors';
import { ClientError } from '@/lib/client/fetcher';
import { createSensor as createSensorSchema, type CreatedSensorBody } from '@/lib/contracts/sensors';
import { ConnectLines, CopyLine, type Doors } from './ConnectLines';
import { IntervalOptions } from './Intervals';

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

/** The message that is taken, from the contract's own limits. */
const SENT: readonly { name: string; says: string; needed?: true }[] = [
  { name: 'gravity', says: 'SG at 20 °C, 0.970 to 1.200', needed: true },
  { name: 'temperature', says: '°C, −10 to 60', needed: true },
  { name: 'at', says: 'when it was measured, such as 2026-03-04T06:00:00Z; without it, when it arrives' },
  { name: 'battery', says: 'V, 0 to 15' },
  { name: 'signal', says: 'dBm, −130 to 0' },
  { name: 'sequence', says: 'a whole number that counts up; shows gaps' },
];

function WhatItSends() {
  return (
    <section aria-label="What it sends" className="min-w-0">
      <GroupBar word="What it sends" note="one JSON object, or up to 500 in a list" />
      <dl>
        {SENT.map((field) => (
          <div key={field.name} className="grid grid-cols-[8rem_minmax(0,1fr)] items-baseline gap-x-4 border-b border-rule px-(--margin) py-1.5">
            <dt className={`font-mono text-[0.8125rem] ${field.needed ? 'font-semibold' : 'font-medium text-ink2'}`}>{field.name}</dt>
            <dd className="type-body">
              <Sentence>{field.says}</Sentence>
              {field.needed && <span className="text-ink2">, needed</span>}
            </dd>
          </div>
        ))}
      </dl>
      <p className="type-body px-(--margin) py-3 text-ink2">A reading sent twice counts once, and late ones are taken. What cannot be a reading is kept with its reason on the sensor’s page.</p>
    </section>
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
      <div className="wide:grid wide:min-h-[calc(100dvh-101px)] wide:grid-cols-[424px_minmax(0,1fr)]">
        <form noValidate onSubmit={(event) => void submit(event)} className="flex flex-col gap-4 bg-desk px-(--margin) py-5 wide:border-r-[1.5px] wide:border-ink">
          {failed && <FormError>{failed}</FormError>}
          <Field label="name" name="name" autoFocus maxLength={60} autoComplete="off" hint="What is written on it, such as Float 05" error={errors.name?.[0]} />
          <Select label="speaks every" name="interval_s" defaultValue="900" hint="As it is set in the sensor; silence is measured by it" error={errors.interval_s?.[0]}>
            <IntervalOptions />
          </Select>
          <div className="flex flex-wrap gap-2">
            <Button type="submit" look="first" disabled={busy}>
              {busy ? 'Adding it' : 'Add it'}
            </Button>
            <LinkButton href="/sensors">Leave it</LinkButton>
          </div>
        </form>
        <WhatItSends />
      </div>
    </>
  );
}
