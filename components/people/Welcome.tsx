'use client';

import { useRouter } from 'next/navigation';
import { useState, type FormEvent } from 'react';
import { TimeZoneField, useDeviceZone } from '@/components/settings/TimeZoneField';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { useAct } from '@/components/ui/use-act';
import { createCellar } from '@/lib/client/people';
import { signOut } from '@/lib/client/sign-in';

/** For somebody who belongs to no cellar (any more): make one, or wait to be invited. */
export function Welcome({ name }: { name: string }) {
  const router = useRouter();
  const { busy, failed, fields, act } = useAct();
  const device = useDeviceZone();
  const [cellar, setCellar] = useState('');
  const [chosen, setZone] = useState<string | null>(null);
  const zone = chosen ?? device;
  function submit(event: FormEvent) {
    event.preventDefault();
    void act(() => createCellar({ name: cellar, time_zone: zone })).then((done) => {
      if (!done) return;
      router.replace('/shelf');
      router.refresh();
    });
  }
  return (
    <form noValidate onSubmit={submit} className="flex flex-col gap-4">
      <h1 className="type-head">No cellar yet, {name}</h1>
      <p className="type-body text-ink2">Make one and start a batch in it. To share somebody else’s, open the link from their invitation.</p>
      <Field label="name of the cellar" tall maxLength={80} autoFocus value={cellar} error={fields.name} onChange={(event) => setCellar(event.target.value)} />
      <TimeZoneField value={zone} onChoose={setZone} error={fields.time_zone} />
      {failed && Object.keys(fields).length === 0 && <FormError>{failed}</FormError>}
      <Button type="submit" look="first" size="tall" disabled={busy || cellar.trim() === ''}>
        Make it
      </Button>
      <Button look="quiet" onClick={() => void signOut()}>
        Sign out
      </Button>
    </form>
  );
}
