'use client';

import { useState, type FormEvent } from 'react';
import { Button, LinkButton } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Field, Select } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { GroupBar, PageHead } from '@/components/ui/Page';
import { Sentence } from '@/components/ui/Sentence';
import { createSensor } from '@/lib/client/sensors';
import { ClientError } from '@/lib/client/fetcher';
import { createSensor as createSensorSchema, SENSOR_KINDS, type CreatedSensorBody, type SensorKindName } from '@/lib/contracts/sensors';
import type { Doors } from './ConnectLines';
import { IntervalOptions } from './Intervals';
import { SecretShown } from './SecretShown';
import { KIND_WORDS } from './words';

type SentField = { name: string; says: string; needed?: true };

const ALWAYS: readonly SentField[] = [
  { name: 'at', says: 'when it was measured, such as 2026-03-04T06:00:00Z; without it, when it arrives' },
  { name: 'battery', says: 'V, 0 to 15' },
  { name: 'signal', says: 'dBm, −130 to 0' },
  { name: 'sequence', says: 'a whole number that counts up; shows gaps' },
  { name: 'settings', says: 'the version of the settings it has, once it was handed any' },
];

/** The message that is taken, from the contract's own limits. */
const SENT: Record<SensorKindName, readonly SentField[]> = {
  float: [
    { name: 'gravity', says: 'SG at 20 °C, 0.970 to 1.200; or the inclination', needed: true },
    { name: 'inclination', says: 'degrees from the vertical, 0 to 90; a calibration turns it into gravity' },
    { name: 'temperature', says: '°C, −10 to 60', needed: true },
    ...ALWAYS,
  ],
  room: [{ name: 'temperature', says: '°C, −10 to 60', needed: true }, ...ALWAYS],
  foam: [{ name: 'foam', says: 'mm of foam above the liquid, 0 to 500', needed: true }, { name: 'temperature', says: '°C, −10 to 60', needed: true }, ...ALWAYS],
};

function WhatItSends({ kind }: { kind: SensorKindName }) {
  return (
    <section aria-label="What it sends" className="min-w-0">
      <GroupBar word="What it sends" note="one JSON object, or up to 500 in a list" />
      <dl>
        {SENT[kind].map((field) => (
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
  const [kind, setKind] = useState<SensorKindName>('float');
  const [created, setCreated] = useState<CreatedSensorBody | null>(null);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const given = new FormData(event.currentTarget);
    const parsed = createSensorSchema.safeParse({ name: given.get('name'), kind, interval_s: Number(given.get('interval_s')) });
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

  if (created) return <SecretShown sensor={created} doors={doors} since={Date.parse(created.created_at)} />;
  return (
    <>
      <PageHead title="Add a sensor" />
      <div className="wide:grid wide:min-h-[calc(100dvh-101px)] wide:grid-cols-[424px_minmax(0,1fr)]">
        <form noValidate onSubmit={(event) => void submit(event)} className="flex flex-col gap-4 bg-desk px-(--margin) py-5 wide:border-r-[1.5px] wide:border-ink">
          {failed && <FormError>{failed}</FormError>}
          <Field label="name" name="name" autoFocus maxLength={60} autoComplete="off" hint="What is written on it, such as Float 05" error={errors.name?.[0]} />
          <Choice label="kind" value={kind} onChoose={setKind} options={SENSOR_KINDS.map((value) => ({ value, name: KIND_WORDS[value].name }))} />
          <p className="type-reason -mt-2 text-ink2">{KIND_WORDS[kind].says}</p>
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
        <WhatItSends kind={kind} />
      </div>
    </>
  );
}
