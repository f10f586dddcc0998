'use client';

import Link from 'next/link';
import { useState } from 'react';
import { buttonClass, Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Field, Select } from '@/components/ui/Field';
import { Haze } from '@/components/ui/Haze';
import { ErrorState, FormError } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { useAct } from '@/components/ui/use-act';
import { updateMe, useMe } from '@/lib/client/me';
import type { MeBody } from '@/lib/contracts/people';
import type { GravityUnit, TemperatureUnit, VolumeUnit } from '@/lib/core/units/chosen';
import { LANGUAGES, LOCALES, type Locale } from '@/lib/texts/languages';
import { DeleteAccount } from './DeleteAccount';
import { TimeZoneField } from './TimeZoneField';

const GRAVITIES: readonly { value: GravityUnit; name: string }[] = [
  { value: 'sg', name: 'SG' },
  { value: 'brix', name: '°Bx' },
  { value: 'plato', name: '°P' },
];
const TEMPERATURES: readonly { value: TemperatureUnit; name: string }[] = [
  { value: 'c', name: '°C' },
  { value: 'f', name: '°F' },
];
const VOLUMES: readonly { value: VolumeUnit; name: string }[] = [
  { value: 'l', name: 'L' },
  { value: 'us_gal', name: 'US gal' },
  { value: 'imp_gal', name: 'imp gal' },
];

function ProfileForm({ person }: { person: MeBody['person'] }) {
  const { busy, failed, fields, act } = useAct();
  const [name, setName] = useState(person.name);
  const [zone, setZone] = useState(person.time_zone);
  const [locale, setLocale] = useState(person.locale);
  const changed = name.trim() !== person.name || zone !== person.time_zone || locale !== person.locale;
  return (
    <form
      aria-label="Profile"
      className="flex flex-col gap-3 border-b px-(--margin) py-4"
      onSubmit={(event) => {
        event.preventDefault();
        void act(() => updateMe({ name, time_zone: zone, locale }));
      }}
    >
      <div className="flex flex-wrap gap-3">
        <Field label="name" value={name} maxLength={80} autoComplete="name" error={fields.name} hint="as others see it in the log" className="flex-1 basis-56 strip:max-w-80" onChange={(event) => setName(event.target.value)} />
        <TimeZoneField value={zone} onChoose={setZone} error={fields.time_zone} hint="for quiet hours and your own mails" className="flex-1 basis-56 strip:max-w-80" />
        <Select label="language" value={locale} hint="of your mails and notices; screens are English" className="w-56 max-strip:w-full" onChange={(event) => setLocale(event.target.value as Locale)}>
          {LOCALES.map((item) => (
            <option key={item} value={item}>
              {LANGUAGES[item].name}
            </option>
          ))}
        </Select>
      </div>
      {failed && Object.keys(fields).length === 0 && <FormError>{failed}</FormError>}
      <Button type="submit" look="first" disabled={busy || !changed} className="self-start">
        Keep it so
      </Button>
    </form>
  );
}

/** Units are taken at once, without a button. */
function Units({ kept }: { kept: MeBody['person']['units'] }) {
  const { failed, act } = useAct();
  // Shown at once; taken back where it was not kept.
  const [units, setUnits] = useState(kept);
  const choose = (change: Partial<MeBody['person']['units']>) => {
    setUnits({ ...units, ...change });
    void act(() => updateMe({ units: change })).then((done) => !done && setUnits(units));
  };
  return (
    <div className="flex flex-col gap-3 border-b px-(--margin) py-4">
      <div className="flex flex-wrap gap-x-6 gap-y-3">
        <Choice label="gravity" value={units.gravity} onChoose={(gravity) => choose({ gravity })} options={GRAVITIES} className="w-56" />
        <Choice label="temperature" value={units.temperature} onChoose={(temperature) => choose({ temperature })} options={TEMPERATURES} className="w-40" />
        <Choice label="volume" value={units.volume} onChoose={(volume) => choose({ volume })} options={VOLUMES} className="w-64" />
      </div>
      {failed && <FormError>{failed}</FormError>}
      <p className="type-reason text-ink2">What is kept is always SG, °C and litres: others read the same log in their own.</p>
    </div>
  );
}

/** What a person says of themself, how they read figures, and what of theirs is kept. */
export function Profile() {
  const { me, loading, error, retry } = useMe();
  if (loading) return <Haze height={96} label="Loading the profile" className="mx-(--margin) my-3" />;
  if (!me)
    return (
      <ErrorState title="The profile did not load" onRetry={retry}>
        {error?.message}
      </ErrorState>
    );
  return (
    <>
      <section aria-label="You">
        <GroupBar word="You" note={me.person.email} />
        <ProfileForm key={me.person.id} person={me.person} />
      </section>
      <section aria-label="Units">
        <GroupBar word="Units" note="on every screen of yours" />
        <Units key={me.person.id} kept={me.person.units} />
      </section>
      <section aria-label="Messages">
        <GroupBar word="Messages" />
        <p className="type-body border-b border-rule px-(--margin) py-3">
          What you are told of, when and by which means stands under <Link href="/settings/messages" className="underline underline-offset-4">Messages</Link>.
        </p>
      </section>
      <section aria-label="Your data">
        <GroupBar word="Your data" />
        <div className="flex flex-wrap items-center gap-x-5 gap-y-2 border-b border-rule px-(--margin) py-3">
          <p className="type-body max-w-[62ch] flex-1 basis-72 text-ink2">Your account, sign-ins, and every entry, tasting and job of yours, as one JSON file. No passphrase, no keys.</p>
          <a className={buttonClass('plain', 'normal')} href="/api/v1/account/export" download>
            Save my data
          </a>
        </div>
        <DeleteAccount />
      </section>
    </>
  );
}
