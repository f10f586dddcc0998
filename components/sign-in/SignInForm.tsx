'use client';

import { useRouter } from 'next/navigation';
import { useState, useSyncExternalStore, type FormEvent } from 'react';
import { Box } from '@/components/ui/Box';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { Sentence } from '@/components/ui/Sentence';
import { signInWithPassword, type SignInResult } from '@/lib/client/sign-in';
import { signInForm } from '@/lib/contracts/people';

type Refusal = Extract<SignInResult, { ok: false }>;

/** `90 s`, `12 min` */
const wait = (seconds: number) => (seconds < 120 ? `${Math.max(1, Math.ceil(seconds))} s` : `${Math.ceil(seconds / 60)} min`);

function sentenceFor(refusal: Refusal): string {
  switch (refusal.reason) {
    case 'wrong':
      return 'This address and passphrase do not belong together. Nothing was changed; check both and try again.';
    case 'throttled':
      return `Too many tries for this address. The next one counts in ${wait(refusal.retryAfterS ?? 60)}.`;
    case 'unavailable':
      return 'The server does not answer. Nothing was changed; try again in a minute.';
  }
}

const never = () => () => undefined;

/** Mail address and passphrase; both are checked here for form only, the server decides. */
export function SignInForm({ to }: { to: string }) {
  const router = useRouter();
  const [stay, setStay] = useState(true);
  const [busy, setBusy] = useState(false);
  const [errors, setErrors] = useState<{ email?: string; password?: string }>({});
  const [refusal, setRefusal] = useState<Refusal | null>(null);
  // Before the page has taken over, a submit would leave it with the passphrase.
  const ready = useSyncExternalStore(never, () => true, () => false);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const given = Object.fromEntries(new FormData(event.currentTarget));
    const parsed = signInForm.safeParse(given);
    setRefusal(null);
    if (!parsed.success) {
      const fields = parsed.error.issues.map((issue) => [issue.path[0], issue.message] as const);
      const first = (name: string) => fields.find(([field]) => field === name)?.[1];
      setErrors({ ...(first('email') && { email: first('email')! }), ...(first('password') && { password: first('password')! }) });
      return;
    }
    setErrors({});
    setBusy(true);
    const result = await signInWithPassword({ ...parsed.data, stay });
    if (result.ok) {
      router.replace(to);
      router.refresh();
      return;
    }
    setBusy(false);
    setRefusal(result);
  }

  return (
    <form method="post" noValidate onSubmit={(event) => void submit(event)} className="flex flex-col gap-4">
      <h2 className="type-head">Sign in</h2>
      {refusal && (
        <FormError>
          <span>
            <Sentence>{sentenceFor(refusal)}</Sentence>
          </span>
        </FormError>
      )}
      <Field label="e-mail" name="email" type="email" autoComplete="username" inputMode="email" autoCapitalize="none" spellCheck={false} autoFocus tall error={errors.email} />
      <Field label="passphrase" name="password" type="password" autoComplete="current-password" tall error={errors.password} />
      <Box ticked={stay} onTick={setStay} className="items-center! py-1">
        <span className="text-[0.9375rem]">
          <Sentence>Stay signed in on this device for 30 days</Sentence>
        </span>
      </Box>
      <Button type="submit" look="first" size="tall" disabled={busy || !ready} className="w-full text-[0.8125rem]!">
        {busy ? 'Signing in' : 'Sign in'}
      </Button>
    </form>
  );
}
