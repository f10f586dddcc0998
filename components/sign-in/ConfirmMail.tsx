'use client';

import { useState } from 'react';
import { Button, LinkButton } from '@/components/ui/Button';
import { FormError } from '@/components/ui/Notice';
import { useAct } from '@/components/ui/use-act';
import { confirmMail } from '@/lib/client/account';
import { NoLink } from './NoLink';
import { useSecret } from './use-secret';

const WAITS = { old: 'the old', new: 'the new' } as const;

/** Confirms one side of a change of mail address, with a button. */
export function ConfirmMail() {
  const secret = useSecret();
  const { busy, failed, act } = useAct();
  const [answer, setAnswer] = useState<Awaited<ReturnType<typeof confirmMail>> | null>(null);
  if (secret === null) return <NoLink what="the link" />;
  if (answer)
    return (
      <div role="status" className="flex flex-col items-start gap-3">
        <h1 className="type-head">{answer.changed ? 'The address is changed' : 'Confirmed'}</h1>
        <p className="type-body">{answer.changed ? 'Sign in with the new one from now on.' : `It changes once the link sent to ${WAITS[answer.waits_for ?? 'new']} address has been used too.`}</p>
        <LinkButton href="/shelf">To the shelf</LinkButton>
      </div>
    );
  return (
    <form
      method="post"
      className="flex flex-col gap-4"
      onSubmit={(event) => {
        event.preventDefault();
        if (secret) void act(async () => setAnswer(await confirmMail(secret)));
      }}
    >
      <h1 className="type-head">Change of mail address</h1>
      <p className="type-body">Only go on if you asked for it in Fallbright.</p>
      {failed && <FormError>{failed}</FormError>}
      <Button type="submit" look="first" size="tall" disabled={busy || !secret}>
        Confirm
      </Button>
    </form>
  );
}
