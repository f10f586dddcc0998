'use client';

import Link from 'next/link';
import { useRouter } from 'next/navigation';
import { useState, useSyncExternalStore, type FormEvent } from 'react';
import { Box } from '@/components/ui/Box';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { Sentence } from '@/components/ui/Sentence';
import { signInWithPassword } from '@/lib/client/sign-in';
import { signInForm } from '@/lib/contracts/people';
import { CodeField } from './CodeField';
import { refusalSentence, type Refusal } from './words';

const never = () => () => undefined;

/** Mail address and passphrase, then a code where the account has a second factor. Both are checked here for form only, the server decides. */
export function SignInForm({ to }: { to: string }) {
  const router = useRouter();
  const [stay, setStay] = useState(true);
  const [busy, setBusy] = useState(false);
  const [errors, setErrors] = useState<{ email?: string; password?: string }>({});
  const [refusal, setRefusal] = useState<Refusal | null>(null);
  /** What fitted already, while the code is asked for. */
  const [first, setFirst] = useState<{ email: string; password: string } | null>(null);
  // Before the page has taken over, a submit would leave it with the passphrase.
  const ready = useSyncExternalStore(never, () => true, () => false);

  async function attempt(form: { email: string; password: string; code?: string }) {
    setBusy(true);
    const result = await signInWithPassword({ ...form, stay });
    if (result.ok) {
      router.replace(to);
      router.refresh();
      return;
    }
    setBusy(false);
    setRefusal(result);
    if (result.reason === 'code-needed') setFirst({ email: form.email, password: form.password });
  }

  function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const given = Object.fromEntries(new FormData(event.currentTarget)) as Record<string, string>;
    setRefusal(null);
    if (first) return void attempt({ ...first, code: given.code ?? '' });
    const parsed = signInForm.safeParse(given);
    if (!parsed.success) {
      const fields = parsed.error.issues.map((issue) => [issue.path[0], issue.message] as const);
      const message = (name: string) => fields.find(([field]) => field === name)?.[1];
      setErrors({ ...(message('email') && { email: message('email')! }), ...(message('password') && { password: message('password')! }) });
      return;
    }
    setErrors({});
    void attempt({ email: parsed.data.email, password: parsed.data.password });
  }

  const sentence = refusal && refusalSentence(refusal, 'passphrase');
  return (
    <form method="post" noValidate onSubmit={submit} className="flex flex-col gap-4">
      <h2 className="type-head">{first ? 'One more thing' : 'Sign in'}</h2>
      {sentence && (
        <FormError>
          <span>
            <Sentence>{sentence}</Sentence>
          </span>
        </FormError>
      )}
      {first ? (
        <CodeField />
      ) : (
        <>
          <Field label="e-mail" name="email" type="email" autoComplete="username" inputMode="email" autoCapitalize="none" spellCheck={false} autoFocus tall error={errors.email} />
          <Field label="passphrase" name="password" type="password" autoComplete="current-password" tall error={errors.password} />
          <Box ticked={stay} onTick={setStay} className="items-center! py-1">
            <span className="text-[0.9375rem]">
              <Sentence>Stay signed in on this device for 30 days</Sentence>
            </span>
          </Box>
        </>
      )}
      <Button type="submit" look="first" size="tall" disabled={busy || !ready} className="w-full text-[0.8125rem]!">
        {busy ? 'Signing in' : 'Sign in'}
      </Button>
      {first ? (
        <Button look="quiet" onClick={() => (setFirst(null), setRefusal(null))}>
          Back
        </Button>
      ) : (
        <p className="type-body mt-1 border-t pt-4 text-[0.9375rem]! text-ink2">
          No passphrase at hand, or forgot it?{' '}
          <Link href="/sign-in/forgot" className="font-bold text-ink underline underline-offset-4">
            Have a link mailed
          </Link>
        </p>
      )}
    </form>
  );
}
