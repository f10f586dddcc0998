'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { useAct } from '@/components/ui/use-act';
import { deleteAccount, useAccount } from '@/lib/client/account';
import { leaveBy } from '@/lib/client/sign-in';
import type { AccountBody } from '@/lib/contracts/people';

/** What becomes of the cellars, said before anything is asked. */
function Fate({ cellars }: { cellars: AccountBody['sole_keeper_of'] }) {
  const shared = cellars.filter(({ others }) => others > 0);
  const alone = cellars.filter(({ others }) => others === 0);
  return (
    <ul className="type-body max-w-[62ch] list-disc pl-5 text-ink2">
      <li>What you logged stays in the cellars’ logs, without your name.</li>
      {alone.map(({ id, name, batches }) => (
        <li key={id}>
          {name} is shared with nobody: it goes too, with <span className="fig">{batches}</span> {batches === 1 ? 'batch' : 'batches'}.
        </li>
      ))}
      {shared.map(({ id, name, others }) => (
        <li key={id} className="text-madder">
          {name} is shared with <span className="fig">{others}</span> {others === 1 ? 'other' : 'others'} and kept by you alone: hand it over first, under People.
        </li>
      ))}
    </ul>
  );
}

export function DeleteAccount() {
  const { account } = useAccount();
  const { busy, failed, fields, act } = useAct();
  const [open, setOpen] = useState(false);
  const [form, setForm] = useState({ email: '', passphrase: '', code: '' });
  if (!account) return null;
  const held = account.sole_keeper_of.some(({ others }) => others > 0);
  return (
    <div className="flex flex-col gap-3 border-b px-(--margin) py-4">
      <h3 className="type-name-low">Delete your account</h3>
      <Fate cellars={account.sole_keeper_of} />
      {!open ? (
        <Button className="self-start" disabled={held} onClick={() => setOpen(true)}>
          Delete my account
        </Button>
      ) : (
        <form
          className="flex flex-col gap-3"
          noValidate
          onSubmit={(event) => {
            event.preventDefault();
            void act(() => leaveBy(() => deleteAccount({ email: form.email, passphrase: form.passphrase, ...(form.code && { code: form.code }) }), 'deleted'));
          }}
        >
          <Field label={`type your address: ${account.email}`} type="email" autoComplete="off" value={form.email} error={fields.email} className="max-w-80" onChange={(event) => setForm({ ...form, email: event.target.value })} />
          <Field label="your passphrase" type="password" autoComplete="current-password" value={form.passphrase} error={fields.passphrase} className="max-w-80" onChange={(event) => setForm({ ...form, passphrase: event.target.value })} />
          {account.second_factor && <Field label="code of your authenticator" inputMode="numeric" autoComplete="one-time-code" value={form.code} error={fields.code} className="max-w-80" onChange={(event) => setForm({ ...form, code: event.target.value })} />}
          {failed && <FormError>{failed}</FormError>}
          <div className="flex gap-2">
            <Button type="submit" look="final" disabled={busy || form.email.trim().toLowerCase() !== account.email.toLowerCase() || form.passphrase === ''}>
              Delete it for good
            </Button>
            <Button onClick={() => setOpen(false)}>Keep it</Button>
          </div>
        </form>
      )}
    </div>
  );
}
