'use client';

import { useState, type FormEvent } from 'react';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { useAct } from '@/components/ui/use-act';
import { changePassphrase, useAccount } from '@/lib/client/account';

/** Chooses another passphrase, knowing the old one. */
export function Passphrase() {
  const { account } = useAccount();
  const { busy, failed, fields, act } = useAct();
  const [current, setCurrent] = useState('');
  const [passphrase, setPassphrase] = useState('');
  const [shown, setShown] = useState(false);
  const [done, setDone] = useState(false);
  if (account && !account.has_passphrase) return <p className="type-body border-b border-rule px-(--margin) py-3 text-ink2">You sign in by links alone. To choose a passphrase, sign out and take “Forgot it?” on the sign-in page.</p>;

  function submit(event: FormEvent) {
    event.preventDefault();
    setDone(false);
    void act(() => changePassphrase({ current, passphrase })).then((changed) => {
      if (!changed) return;
      setDone(true);
      setCurrent('');
      setPassphrase('');
    });
  }
  return (
    <form aria-label="Change the passphrase" noValidate className="flex flex-col gap-3 border-b px-(--margin) py-4" onSubmit={submit}>
      <div className="flex flex-wrap items-start gap-3">
        <Field label="the one you have" type="password" autoComplete="current-password" value={current} error={fields.current} className="flex-1 basis-56 strip:max-w-80" onChange={(event) => setCurrent(event.target.value)} />
        <Field
          label="the new one"
          type={shown ? 'text' : 'password'}
          autoComplete="new-password"
          value={passphrase}
          error={fields.passphrase}
          hint="8 characters or more; a few words do well"
          className="flex-1 basis-56 strip:max-w-80"
          onChange={(event) => setPassphrase(event.target.value)}
        />
        <Button look="quiet" className="mt-[22px] strip:h-9" aria-pressed={shown} onClick={() => setShown(!shown)}>
          {shown ? 'Hide' : 'Show'}
        </Button>
      </div>
      {failed && Object.keys(fields).length === 0 && <FormError>{failed}</FormError>}
      <div className="flex flex-wrap items-center gap-4">
        <Button type="submit" look="first" disabled={busy || current === '' || passphrase === ''}>
          Change it
        </Button>
        <p role="status" className="type-reason">
          {done ? 'Changed. Every other sign-in has ended.' : ''}
        </p>
      </div>
    </form>
  );
}
