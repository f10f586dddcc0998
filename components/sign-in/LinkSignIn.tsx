'use client';

import { useRouter } from 'next/navigation';
import { useState, type FormEvent } from 'react';
import { Button, LinkButton } from '@/components/ui/Button';
import { FormError } from '@/components/ui/Notice';
import { Sentence } from '@/components/ui/Sentence';
import { signInByLink } from '@/lib/client/sign-in';
import { CodeField } from './CodeField';
import { NoLink } from './NoLink';
import { useSecret } from './use-secret';
import { refusalSentence, type Refusal } from './words';

/** Signs in by a mailed link with one button: a mail scanner that opens the link must not use it up. */
export function LinkSignIn() {
  const secret = useSecret();
  const router = useRouter();
  const [busy, setBusy] = useState(false);
  const [refusal, setRefusal] = useState<Refusal | null>(null);
  const [wantsCode, setWantsCode] = useState(false);

  if (secret === null) return <NoLink what="the link" />;
  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    if (!secret) return;
    const code = new FormData(event.currentTarget).get('code');
    setRefusal(null);
    setBusy(true);
    const result = await signInByLink(secret, typeof code === 'string' ? code : '');
    if (result.ok) {
      router.replace('/shelf');
      router.refresh();
      return;
    }
    setBusy(false);
    setRefusal(result);
    if (result.reason === 'code-needed') setWantsCode(true);
  }
  const sentence = refusal && refusalSentence(refusal, 'link');
  return (
    <form method="post" onSubmit={(event) => void submit(event)} className="flex flex-col gap-4">
      <h1 className="type-head">Sign in</h1>
      <p className="type-body text-ink2">
        <Sentence>{wantsCode ? 'Your account has a second factor.' : 'You came by the link from your mail. You stay signed in on this device for 30 days.'}</Sentence>
      </p>
      {sentence && <FormError>{sentence}</FormError>}
      {wantsCode && <CodeField />}
      <Button type="submit" look="first" size="tall" disabled={busy || secret === undefined}>
        {busy ? 'Signing in' : 'Sign in'}
      </Button>
      {refusal?.reason === 'wrong' && <LinkButton href="/sign-in/forgot">Have another mailed</LinkButton>}
    </form>
  );
}
