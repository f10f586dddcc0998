'use client';

import { useState, type FormEvent } from 'react';
import { Button, LinkButton } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { useAct } from '@/components/ui/use-act';
import { resetPassphrase } from '@/lib/client/account';
import { NoLink } from './NoLink';
import { useSecret } from './use-secret';

/** Chooses a new passphrase by a mailed link. */
export function NewPassphrase() {
  const secret = useSecret();
  const { busy, failed, fields, act } = useAct();
  const [passphrase, setPassphrase] = useState('');
  const [shown, setShown] = useState(false);
  const [done, setDone] = useState(false);
  if (secret === null) return <NoLink what="the link" />;
  if (done)
    return (
      <div role="status" className="flex flex-col items-start gap-3">
        <h1 className="type-head">It is changed</h1>
        <p className="type-body">Every sign-in that was open has ended. Sign in with the new one.</p>
        <LinkButton look="first" href="/sign-in">
          Sign in
        </LinkButton>
      </div>
    );
  function submit(event: FormEvent) {
    event.preventDefault();
    if (secret) void act(() => resetPassphrase({ token: secret, passphrase })).then((changed) => changed && setDone(true));
  }
  return (
    <form method="post" noValidate onSubmit={submit} className="flex flex-col gap-4">
      <h1 className="type-head">Choose a new passphrase</h1>
      <Field label="new passphrase" type={shown ? 'text' : 'password'} autoComplete="new-password" autoFocus tall value={passphrase} error={fields.passphrase} hint="8 characters or more; a few words do well" onChange={(event) => setPassphrase(event.target.value)} />
      <Button look="quiet" className="self-start" aria-pressed={shown} onClick={() => setShown(!shown)}>
        {shown ? 'Hide it' : 'Show it'}
      </Button>
      {failed && !fields.passphrase && <FormError>{failed}</FormError>}
      {failed && !fields.passphrase && <LinkButton href="/sign-in/forgot">Have another mailed</LinkButton>}
      <Button type="submit" look="first" size="tall" disabled={busy || !secret || passphrase === ''}>
        Set it
      </Button>
    </form>
  );
}
