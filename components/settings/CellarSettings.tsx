'use client';

import { useRouter } from 'next/navigation';
import { useState, type FormEvent } from 'react';
import { ANY_LENGTH, Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { Sure } from '@/components/ui/Sure';
import { useAct } from '@/components/ui/use-act';
import { chooseCellar, useMe } from '@/lib/client/me';
import { createCellar, deleteCellar, leaveCellar, updateCellar } from '@/lib/client/people';
import type { MeBody } from '@/lib/contracts/people';
import { CurrencyField } from './CurrencyField';
import { ROLE_WORDS } from './roles';
import { TimeZoneField, useDeviceZone } from './TimeZoneField';

const FORM = 'flex flex-col gap-3 border-b px-(--margin) py-4';

function NameAndClock({ cellar }: { cellar: MeBody['cellar'] }) {
  const { busy, failed, fields, act } = useAct();
  const [name, setName] = useState(cellar.name);
  const [zone, setZone] = useState(cellar.time_zone);
  const [currency, setCurrency] = useState(cellar.currency);
  const changed = name !== cellar.name || zone !== cellar.time_zone || currency !== cellar.currency;
  return (
    <form
      aria-label="This cellar"
      className={FORM}
      onSubmit={(event) => {
        event.preventDefault();
        void act(() => updateCellar({ name, time_zone: zone, currency }));
      }}
    >
      <div className="flex flex-wrap gap-3">
        <Field label="name" value={name} maxLength={80} error={fields.name} className="flex-1 basis-56 strip:max-w-80" onChange={(event) => setName(event.target.value)} />
        <TimeZoneField value={zone} onChoose={setZone} error={fields.time_zone} hint="days and clock times of the calls and mails" className="flex-1 basis-56 strip:max-w-80" />
        <CurrencyField value={currency} onChoose={setCurrency} error={fields.currency} className="flex-1 basis-56 strip:max-w-80" />
      </div>
      {failed && <FormError>{failed}</FormError>}
      <Button type="submit" look="first" disabled={busy || !changed} className="self-start">
        Keep it so
      </Button>
    </form>
  );
}

function NewCellar() {
  const { busy, failed, fields, act } = useAct();
  const router = useRouter();
  const [name, setName] = useState('');
  const device = useDeviceZone();
  const [chosen, setZone] = useState<string | null>(null);
  const zone = chosen ?? device;
  function submit(event: FormEvent) {
    event.preventDefault();
    void act(() => createCellar({ name, time_zone: zone })).then((done) => done && router.push('/shelf'));
  }
  return (
    <form aria-label="Another cellar" className={FORM} onSubmit={submit}>
      <p className="type-body max-w-[62ch] text-ink2">For vessels that others have no business with. You keep it; you choose at the head of the page which one is shown.</p>
      <div className="flex flex-wrap gap-3">
        <Field label="name" value={name} maxLength={80} error={fields.name} className="flex-1 basis-56 strip:max-w-80" onChange={(event) => setName(event.target.value)} />
        <TimeZoneField value={zone} onChoose={setZone} error={fields.time_zone} className="flex-1 basis-56 strip:max-w-80" />
      </div>
      {failed && Object.keys(fields).length === 0 && <FormError>{failed}</FormError>}
      <Button type="submit" disabled={busy || name.trim() === ''} className="self-start">
        Make it
      </Button>
    </form>
  );
}

function DeleteCellar({ cellar }: { cellar: MeBody['cellar'] }) {
  const { busy, failed, fields, act } = useAct();
  const router = useRouter();
  const [open, setOpen] = useState(false);
  const [name, setName] = useState('');
  const [passphrase, setPassphrase] = useState('');
  return (
    <section aria-label="Delete the cellar">
      <GroupBar word="Delete the cellar" />
      <div className={FORM}>
        <p className="type-body max-w-[62ch] text-ink2">All batches, readings, bottles, must sheets and the trail go, for everybody who shares it. Nothing brings them back: export first what you want to keep.</p>
        {!open ? (
          <Button className={`self-start ${ANY_LENGTH}`} onClick={() => setOpen(true)}>
            Delete {cellar.name}
          </Button>
        ) : (
          <form
            className="flex flex-col gap-3"
            onSubmit={(event) => {
              event.preventDefault();
              void act(() => deleteCellar({ name, passphrase })).then((done) => done && router.push('/shelf'));
            }}
          >
            <Field label={`type its name: ${cellar.name}`} autoComplete="off" value={name} error={fields.name} className="max-w-80" onChange={(event) => setName(event.target.value)} />
            <Field label="your passphrase" type="password" autoComplete="current-password" value={passphrase} error={fields.passphrase} className="max-w-80" onChange={(event) => setPassphrase(event.target.value)} />
            {failed && <FormError>{failed}</FormError>}
            <div className="flex gap-2">
              <Button type="submit" look="final" disabled={busy || name.trim() !== cellar.name || passphrase === ''}>
                Delete it for good
              </Button>
              <Button onClick={() => setOpen(false)}>Leave it</Button>
            </div>
          </form>
        )}
      </div>
    </section>
  );
}

/** The cellar shown, the person's others, and the ways in and out. */
export function CellarSettings() {
  const { me, may } = useMe();
  const router = useRouter();
  const { busy, failed, act } = useAct();
  if (!me) return null;
  return (
    <>
      {may('cellar.manage') && (
        <section aria-label="This cellar">
          <GroupBar word="This cellar" />
          <NameAndClock key={me.cellar.id} cellar={me.cellar} />
        </section>
      )}
      <section aria-label="Your cellars">
        <GroupBar word="Your cellars" note={`${me.cellars.length}`} />
        <ul>
          {me.cellars.map((cellar) => {
            const here = cellar.id === me.cellar.id;
            return (
              <li key={cellar.id} className="grid grid-cols-[minmax(0,1fr)_auto] items-center gap-x-5 border-b border-rule px-(--margin) py-2">
                <div className="min-w-0">
                  <p className="type-name-low break-words">{cellar.name}</p>
                  <p className="type-label text-ink2">{ROLE_WORDS[cellar.role]}</p>
                </div>
                {here ? (
                  <span className="type-label" style={{ fontWeight: 600 }}>
                    shown
                  </span>
                ) : (
                  <Button size="lane" onClick={() => void chooseCellar(cellar.id)} aria-label={`Show ${cellar.name}`}>
                    Show it
                  </Button>
                )}
              </li>
            );
          })}
        </ul>
        <div className={FORM}>
          {failed && <FormError>{failed}</FormError>}
          <div>
            <Sure word={`Leave ${me.cellar.name}`} yes="Leave it" no="Stay" className={ANY_LENGTH} busy={busy} onSure={() => void act(() => leaveCellar()).then((done) => done && router.push('/shelf'))}>
              Your tokens and calendar address for it stop. What you logged stays.
            </Sure>
          </div>
        </div>
      </section>
      <section aria-label="Another cellar">
        <GroupBar word="Another cellar" />
        <NewCellar />
      </section>
      {may('cellar.manage') && <DeleteCellar key={me.cellar.id} cellar={me.cellar} />}
    </>
  );
}
