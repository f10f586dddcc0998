'use client';

import { useRouter } from 'next/navigation';
import { useEffect, useState, type FormEvent } from 'react';
import { NoLink } from '@/components/sign-in/NoLink';
import { forgetSecret, useSecret } from '@/components/sign-in/use-secret';
import { ROLE_MAY } from '@/components/settings/roles';
import { useDeviceZone } from '@/components/settings/TimeZoneField';
import { Button, LinkButton } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { Haze } from '@/components/ui/Haze';
import { FormError } from '@/components/ui/Notice';
import { useAct } from '@/components/ui/use-act';
import { dayName } from '@/components/charts/zone';
import { signInWithPassword } from '@/lib/client/sign-in';
import { acceptInvitation, joinByInvitation, lookAtInvitation } from '@/lib/client/people';
import type { InvitationView } from '@/lib/contracts/people';

const KEPT = 'fallbright-invitation';

function NewAccount({ secret, email, onDone }: { secret: string; email: string; onDone: () => void }) {
  const { busy, failed, fields, act } = useAct();
  const zone = useDeviceZone();
  const [name, setName] = useState('');
  const [passphrase, setPassphrase] = useState('');
  function submit(event: FormEvent) {
    event.preventDefault();
    void act(async () => {
      await joinByInvitation({ token: secret, name, passphrase, time_zone: zone });
      await signInWithPassword({ email, password: passphrase, stay: true });
    }).then((done) => done && onDone());
  }
  return (
    <form method="post" aria-label="Make an account" noValidate onSubmit={submit} className="flex flex-col gap-4">
      <Field label="your name" autoComplete="name" maxLength={80} tall value={name} error={fields.name} hint="as others see it in the log" onChange={(event) => setName(event.target.value)} />
      <Field label={`passphrase, for ${email}`} type="password" autoComplete="new-password" tall value={passphrase} error={fields.passphrase} hint="8 characters or more; a few words do well" onChange={(event) => setPassphrase(event.target.value)} />
      {failed && Object.keys(fields).length === 0 && <FormError>{failed}</FormError>}
      <Button type="submit" look="first" size="tall" disabled={busy || name.trim() === '' || passphrase === ''}>
        Join
      </Button>
    </form>
  );
}

/** What an invitation offers, and the two ways to take it: with the account that is signed in, or a new one. */
export function InvitationPage({ signedInAs }: { signedInAs: string | null }) {
  const secret = useSecret(KEPT);
  const router = useRouter();
  const [view, setView] = useState<InvitationView | null>(null);
  const look = useAct();
  const accept = useAct();
  const { act } = look;
  const [asked, setAsked] = useState(false);

  // One look, once the secret is known.
  useEffect(() => {
    if (!secret || asked) return;
    queueMicrotask(() => {
      setAsked(true);
      void act(async () => setView(await lookAtInvitation(secret)));
    });
  }, [secret, asked, act]);

  if (secret === null) return <NoLink what="the invitation" />;
  if (look.failed)
    return (
      <div className="flex flex-col items-start gap-3">
        <h1 className="type-head">This invitation is not open</h1>
        <p className="type-body">It has been used, taken back, or has expired. Ask whoever invited you for another.</p>
        <LinkButton href="/sign-in">To the sign-in page</LinkButton>
      </div>
    );
  if (!view || !secret) return <Haze height={120} label="Looking at the invitation" />;
  const enter = () => {
    forgetSecret(KEPT);
    // A page of the cellar has a session to read: the whole of it is loaded anew.
    router.replace('/shelf');
    router.refresh();
  };
  return (
    <div className="flex flex-col gap-4">
      <div>
        <h1 className="type-head break-words">Share {view.cellar}</h1>
        <p className="type-body mt-1 break-words">
          {view.by} asks you to be a {view.role} there. {ROLE_MAY[view.role]}
        </p>
        <p className="type-label mt-1 text-ink2">open until {dayName(Date.parse(view.expires_at) / 1000, 'UTC')}</p>
      </div>
      {signedInAs !== null ? (
        <>
          {accept.failed && <FormError>{accept.failed}</FormError>}
          <Button look="first" size="tall" disabled={accept.busy} onClick={() => void accept.act(() => acceptInvitation(secret)).then((done) => done && enter())}>
            Join as {signedInAs}
          </Button>
        </>
      ) : view.has_account ? (
        <>
          <p className="type-body">
            <span className="fig">{view.email}</span> has an account. Sign in with it, then join.
          </p>
          <LinkButton look="first" size="tall" href="/sign-in?next=/invitation">
            Sign in
          </LinkButton>
        </>
      ) : (
        <>
          <NewAccount secret={secret} email={view.email} onDone={enter} />
          <p className="type-body border-t pt-4 text-ink2">
            You have an account with another address?{' '}
            <a href="/sign-in?next=/invitation" className="font-bold text-ink underline underline-offset-4">
              Sign in and join with it
            </a>
          </p>
        </>
      )}
    </div>
  );
}
