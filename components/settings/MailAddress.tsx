'use client';

import { useState, type FormEvent } from 'react';
import { dayName, clock } from '@/components/charts/zone';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { Haze } from '@/components/ui/Haze';
import { ErrorState, FormError } from '@/components/ui/Notice';
import { useAct } from '@/components/ui/use-act';
import { changeMail, dropMailChange, useAccount } from '@/lib/client/account';
import { useMe } from '@/lib/client/me';
import type { AccountBody } from '@/lib/contracts/people';
import { Row } from './Row';

function Waiting({ change, timeZone }: { change: NonNullable<AccountBody['new_mail']>; timeZone: string }) {
  const { busy, failed, act } = useAct();
  const until = Date.parse(change.expires_at) / 1000;
  const said = (confirmed: boolean) => (confirmed ? 'has confirmed' : 'has not confirmed yet');
  return (
    <div className="flex flex-col gap-2 border-b border-rule bg-lit px-(--margin) py-3">
      <p className="type-body max-w-[62ch]">
        A change to <span className="fig">{change.email}</span> waits until{' '}
        <span className="fig">
          {dayName(until, timeZone)} {clock(until, timeZone)}
        </span>
        . The old address {said(change.old_confirmed)}, the new one {said(change.new_confirmed)}.
      </p>
      {failed && <FormError>{failed}</FormError>}
      <Button className="self-start" disabled={busy} onClick={() => void act(() => dropMailChange())}>
        Keep the old one
      </Button>
    </div>
  );
}

/** The address, and the change of it that both addresses have to confirm. */
export function MailAddress() {
  const { account, loading, error, retry } = useAccount();
  const { me } = useMe();
  const { busy, failed, fields, act } = useAct();
  const [open, setOpen] = useState(false);
  const [email, setEmail] = useState('');
  const [passphrase, setPassphrase] = useState('');
  if (loading) return <Haze height={48} label="Loading the address" className="mx-(--margin) my-3" />;
  if (!account)
    return (
      <ErrorState title="The address did not load" onRetry={retry}>
        {error?.message}
      </ErrorState>
    );
  function submit(event: FormEvent) {
    event.preventDefault();
    void act(() => changeMail({ email, passphrase })).then((done) => {
      if (!done) return;
      setOpen(false);
      setEmail('');
      setPassphrase('');
    });
  }
  return (
    <>
      <Row name="now">
        <span className="flex flex-wrap items-center justify-between gap-3">
          <span className="font-mono text-[0.8125rem]">{account.email}</span>
          {!open && !account.new_mail && (
            <Button size="lane" onClick={() => setOpen(true)}>
              Change it
            </Button>
          )}
        </span>
      </Row>
      {account.new_mail && <Waiting change={account.new_mail} timeZone={me?.person.time_zone ?? 'UTC'} />}
      {open && (
        <form aria-label="Change the mail address" noValidate className="flex flex-col gap-3 border-b px-(--margin) py-4" onSubmit={submit}>
          <p className="type-body max-w-[62ch] text-ink2">A link goes to the old address and one to the new. It changes once both have been used, within a day.</p>
          <div className="flex flex-wrap items-start gap-3">
            <Field label="new address" type="email" inputMode="email" autoComplete="off" autoCapitalize="none" spellCheck={false} autoFocus value={email} error={fields.email} className="flex-1 basis-56 strip:max-w-80" onChange={(event) => setEmail(event.target.value)} />
            <Field label="your passphrase" type="password" autoComplete="current-password" value={passphrase} error={fields.passphrase} className="flex-1 basis-56 strip:max-w-80" onChange={(event) => setPassphrase(event.target.value)} />
          </div>
          {failed && Object.keys(fields).length === 0 && <FormError>{failed}</FormError>}
          <div className="flex gap-2">
            <Button type="submit" look="first" disabled={busy}>
              Send both links
            </Button>
            <Button onClick={() => setOpen(false)}>Leave it</Button>
          </div>
        </form>
      )}
    </>
  );
}
