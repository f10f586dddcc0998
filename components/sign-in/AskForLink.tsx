'use client';

import Link from 'next/link';
import { useState, type FormEvent } from 'react';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Field } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { Sentence } from '@/components/ui/Sentence';
import { useAct } from '@/components/ui/use-act';
import { askForPassphraseLink, askForSignInLink } from '@/lib/client/account';

type Kind = 'sign-in' | 'passphrase';
const KINDS = [
  { value: 'sign-in', name: 'Sign in once' },
  { value: 'passphrase', name: 'New passphrase' },
] as const satisfies readonly { value: Kind; name: string }[];

/** Has a link mailed: to sign in with, or to choose a new passphrase. Says the same whether or not the address is known. */
export function AskForLink() {
  const { busy, failed, fields, act } = useAct();
  const [kind, setKind] = useState<Kind>('sign-in');
  const [email, setEmail] = useState('');
  const [asked, setAsked] = useState<string | null>(null);

  function submit(event: FormEvent) {
    event.preventDefault();
    void act(() => (kind === 'sign-in' ? askForSignInLink(email) : askForPassphraseLink(email))).then((done) => done && setAsked(email));
  }
  if (asked !== null)
    return (
      <div role="status" className="flex flex-col gap-3">
        <h1 className="type-head">Look into your mail</h1>
        <p className="type-body">
          <Sentence>{`If ${asked} has an account, a link is on its way. It works once, for 10 min.`}</Sentence>
        </p>
        <p className="type-body text-ink2">Nothing came? Look among the unwanted mails, and whether the address is the one your account has.</p>
        <Button className="self-start" onClick={() => setAsked(null)}>
          Ask again
        </Button>
      </div>
    );
  return (
    <form noValidate onSubmit={submit} className="flex flex-col gap-4">
      <h1 className="type-head">Have a link mailed</h1>
      <Choice label="for what" value={kind} onChoose={setKind} options={KINDS} />
      <Field label="e-mail" type="email" name="email" autoComplete="username" inputMode="email" autoCapitalize="none" spellCheck={false} autoFocus tall value={email} error={fields.email} onChange={(event) => setEmail(event.target.value)} />
      {failed && Object.keys(fields).length === 0 && <FormError>{failed}</FormError>}
      <Button type="submit" look="first" size="tall" disabled={busy}>
        Send the link
      </Button>
      <Link href="/sign-in" className="type-body text-ink2 underline underline-offset-4">
        Back to the sign-in page
      </Link>
    </form>
  );
}
