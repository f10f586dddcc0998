'use client';

import { useState, type FormEvent } from 'react';
import { dayName } from '@/components/charts/zone';
import { Button } from '@/components/ui/Button';
import { Field, Select } from '@/components/ui/Field';
import { Haze } from '@/components/ui/Haze';
import { ErrorState, FormError } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { Sentence } from '@/components/ui/Sentence';
import { useAct } from '@/components/ui/use-act';
import { ROLE_MAY, ROLE_WORDS } from '@/components/settings/roles';
import { useMe } from '@/lib/client/me';
import { invite, revokeInvitation, useInvitations } from '@/lib/client/people';
import { ROLES, type InvitationBody, type Role } from '@/lib/contracts/people';

const MAIL_WORDS: Record<InvitationBody['mail'], string> = { waiting: 'mail on its way', sent: 'mail sent', failed: 'the mail did not go; look at the address' };

function InviteForm() {
  const { busy, failed, fields, act } = useAct();
  const [email, setEmail] = useState('');
  const [role, setRole] = useState<Role>('hand');
  const [days, setDays] = useState('7');
  const [sent, setSent] = useState<string | null>(null);

  function submit(event: FormEvent) {
    event.preventDefault();
    setSent(null);
    void act(() => invite({ email, role, expires_in_days: Number(days) })).then((done) => {
      if (!done) return;
      setSent(email);
      setEmail('');
    });
  }
  return (
    <form noValidate onSubmit={submit} aria-label="Invite somebody" className="flex flex-col gap-3 border-b bg-desk px-(--margin) py-4">
      <div className="flex flex-wrap items-start gap-3">
        <Field label="mail address" type="email" inputMode="email" autoComplete="off" autoCapitalize="none" spellCheck={false} className="flex-1 basis-60 strip:max-w-96" value={email} error={fields.email} onChange={(event) => setEmail(event.target.value)} />
        <Select label="as" className="w-60 max-strip:w-full" value={role} onChange={(event) => setRole(event.target.value as Role)}>
          {ROLES.map((item) => (
            <option key={item} value={item}>
              {ROLE_WORDS[item]}
            </option>
          ))}
        </Select>
        <Field label="open for" unit="days" inputMode="numeric" className="w-32" value={days} error={fields.expires_in_days} onChange={(event) => setDays(event.target.value)} />
        <Button type="submit" look="first" disabled={busy} className="mt-[22px] strip:h-9">
          Invite
        </Button>
      </div>
      <p className="type-reason text-ink2">{ROLE_MAY[role]}</p>
      {failed && Object.keys(fields).length === 0 && <FormError>{failed}</FormError>}
      <p role="status" className="type-reason">
        {sent && `A mail is on its way to ${sent}. It works once, with an account or without one.`}
      </p>
    </form>
  );
}

function InvitationRow({ invitation, timeZone, onRevoke, busy }: { invitation: InvitationBody; timeZone: string; onRevoke: () => void; busy: boolean }) {
  const day = (at: string) => dayName(Date.parse(at) / 1000, timeZone);
  const state = {
    open: `open until ${day(invitation.expires_at)}, ${MAIL_WORDS[invitation.mail]}`,
    expired: `expired ${day(invitation.expires_at)}`,
    accepted: `accepted by ${invitation.accepted_by ?? 'somebody who has gone since'}`,
  }[invitation.state];
  return (
    <li className="grid items-center gap-x-5 gap-y-1 border-b border-rule px-(--margin) py-2 strip:grid-cols-[minmax(0,1fr)_auto]">
      <div className="min-w-0">
        <p className="type-body break-words font-mono text-[0.8125rem]!">{invitation.email}</p>
        <p className="type-label text-ink2">
          {invitation.role}, {state}
        </p>
      </div>
      {invitation.state !== 'accepted' && (
        <Button size="lane" disabled={busy} onClick={onRevoke} aria-label={`Take back the invitation of ${invitation.email}`}>
          Take back
        </Button>
      )}
    </li>
  );
}

/** Invites by mail, and shows who was asked and has not come yet. */
export function Invitations() {
  const { me, may } = useMe();
  const manage = may('members.manage');
  const { invitations, loading, error, retry } = useInvitations(manage);
  const { busy, failed, act } = useAct();
  if (!manage) return null;
  const waiting = invitations?.filter((item) => item.state !== 'accepted') ?? [];
  const came = invitations?.filter((item) => item.state === 'accepted').slice(0, 10) ?? [];
  return (
    <section aria-label="Invitations">
      <GroupBar word="Invitations" note="by mail; each works once" />
      <InviteForm />
      {loading && <Haze height={48} label="Loading the invitations" className="mx-(--margin) my-3" />}
      {error && !invitations && (
        <ErrorState title="The invitations did not load" onRetry={retry}>
          {error.message}
        </ErrorState>
      )}
      {failed && <FormError>{failed}</FormError>}
      {invitations && waiting.length === 0 && (
        <p className="type-body border-b border-rule px-(--margin) py-3 text-ink2">
          <Sentence>Nobody is waiting.</Sentence>
        </p>
      )}
      <ul>
        {[...waiting, ...came].map((invitation) => (
          <InvitationRow key={invitation.id} invitation={invitation} timeZone={me?.person.time_zone ?? 'UTC'} busy={busy} onRevoke={() => void act(() => revokeInvitation(invitation.id))} />
        ))}
      </ul>
    </section>
  );
}
