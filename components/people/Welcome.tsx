'use client';

import { useRouter } from 'next/navigation';
import { useState, type FormEvent } from 'react';
import { forgetLeft, useLeft } from '@/components/shell/left-cellar';
import { TimeZoneField, useDeviceZone } from '@/components/settings/TimeZoneField';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { useAct } from '@/components/ui/use-act';
import { createCellar } from '@/lib/client/people';
import { SIGN_OUT_AGAIN, signOut, useWayOut } from '@/lib/client/sign-in';

/** For somebody who belongs to no cellar (any more): make one, or wait to be invited. */
export function Welcome({ id, name }: { id: string; name: string }) {
  const router = useRouter();
  const { busy, failed, fields, act } = useAct();
  const device = useDeviceZone();
  const left = useLeft(id);
  const stayed = useWayOut() === 'failed';
  const [cellar, setCellar] = useState('');
  const [chosen, setZone] = useState<string | null>(null);
  const zone = chosen ?? device;
  function submit(event: FormEvent) {
    event.preventDefault();
    void act(() => createCellar({ name: cellar, time_zone: zone })).then((done) => {
      if (!done) return;
      forgetLeft();
      router.replace('/shelf');
      router.refresh();
    });
  }
  return (
    <form noValidate onSubmit={submit} className="flex flex-col gap-4">
      <h1 className="type-head break-words">{left === null ? `No cellar yet, ${name}` : `No cellar now, ${name}`}</h1>
      {left !== null && (
        <p role="status" className="type-body break-words border-l-[3px] border-ink pl-3">
          You are no longer in <b className="font-semibold">{left}</b>. What you logged there stays with it.
        </p>
      )}
      <p className="type-body text-ink2">Make one and start a batch in it. To share somebody else’s, open the link from their invitation.</p>
      <Field label="name of the cellar" tall maxLength={80} autoFocus value={cellar} error={fields.name} onChange={(event) => setCellar(event.target.value)} />
      <TimeZoneField value={zone} onChoose={setZone} error={fields.time_zone} />
      {failed && Object.keys(fields).length === 0 && <FormError>{failed}</FormError>}
      <Button type="submit" look="first" size="tall" disabled={busy || cellar.trim() === ''}>
        Make it
      </Button>
      {stayed && <FormError>You are still signed in. {SIGN_OUT_AGAIN}</FormError>}
      <Button look="quiet" onClick={() => void signOut().then((gone) => gone && forgetLeft())}>
        Sign out
      </Button>
    </form>
  );
}
