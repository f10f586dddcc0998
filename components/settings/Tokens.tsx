'use client';

import { useState, type FormEvent } from 'react';
import { dayName, when } from '@/components/charts/zone';
import { Button } from '@/components/ui/Button';
import { Field, Select } from '@/components/ui/Field';
import { Haze } from '@/components/ui/Haze';
import { EmptyState, ErrorState, FormError } from '@/components/ui/Notice';
import { useNow } from '@/components/ui/now';
import { GroupBar } from '@/components/ui/Page';
import { Sure } from '@/components/ui/Sure';
import { useAct } from '@/components/ui/use-act';
import { createToken, revokeToken, useTokens } from '@/lib/client/account';
import { useMe } from '@/lib/client/me';
import { ROLES, type CreatedToken, type Role, type TokenBody } from '@/lib/contracts/people';
import { ROLE_MAY } from './roles';

const LASTS = [
  { days: '30', name: '30 days' },
  { days: '90', name: '90 days' },
  { days: '365', name: 'a year' },
  { days: '', name: 'until revoked' },
] as const;

/** The new key, this once. */
function Fresh({ token, onDone }: { token: CreatedToken; onDone: () => void }) {
  const [copied, setCopied] = useState(false);
  const line = `curl -H "Authorization: Bearer ${token.token}" ${typeof location === 'undefined' ? '' : location.origin}/api/v1/batches`;
  return (
    <div role="region" aria-label="The new token" className="flex flex-col gap-3 border-b-[1.5px] border-ink bg-lit px-(--margin) py-4">
      <h3 className="type-verdict-now">{token.name}: shown this once</h3>
      <p className="type-body max-w-[62ch] text-ink2">Whoever has it may do here what a {token.role} may. Keep it where your program reads it, and out of what you publish.</p>
      <code className="break-all border-[1.5px] border-ink2 bg-sheet px-3 py-2 font-mono text-[0.875rem] font-semibold">{token.token}</code>
      <p className="type-label break-all text-ink2">{line}</p>
      <div className="flex gap-2">
        <Button look="first" onClick={() => void navigator.clipboard.writeText(token.token).then(() => setCopied(true))}>
          {copied ? 'Copied' : 'Copy the token'}
        </Button>
        <Button onClick={onDone}>I have it</Button>
      </div>
    </div>
  );
}

function NewToken({ own, onMade }: { own: Role; onMade: (token: CreatedToken) => void }) {
  const { busy, failed, fields, act } = useAct();
  const roles = ROLES.slice(ROLES.indexOf(own));
  const [name, setName] = useState('');
  const [wanted, setRole] = useState<Role>('guest');
  const role = roles.includes(wanted) ? wanted : 'guest';
  const [days, setDays] = useState<string>('90');
  function submit(event: FormEvent) {
    event.preventDefault();
    void act(async () => {
      onMade(await createToken({ name, role, expires_in_days: days === '' ? null : Number(days) }));
      setName('');
    });
  }
  return (
    <form aria-label="Make a token" noValidate onSubmit={submit} className="flex flex-col gap-3 border-b bg-desk px-(--margin) py-4">
      <div className="flex flex-wrap items-start gap-3">
        <Field label="what it is for" maxLength={60} value={name} error={fields.name} className="flex-1 basis-56 strip:max-w-80" onChange={(event) => setName(event.target.value)} />
        <Select label="may do as much as" value={role} className="w-44 max-strip:w-full" onChange={(event) => setRole(event.target.value as Role)}>
          {roles.map((item) => (
            <option key={item} value={item}>
              a {item}
            </option>
          ))}
        </Select>
        <Select label="lasts" value={days} className="w-44 max-strip:w-full" onChange={(event) => setDays(event.target.value)}>
          {LASTS.map((item) => (
            <option key={item.name} value={item.days}>
              {item.name}
            </option>
          ))}
        </Select>
        <Button type="submit" look="first" disabled={busy || name.trim() === ''} className="mt-[22px] strip:h-9">
          Make it
        </Button>
      </div>
      <p className="type-reason text-ink2">{ROLE_MAY[role]} In this cellar alone, and never more than you may yourself.</p>
      {failed && Object.keys(fields).length === 0 && <FormError>{failed}</FormError>}
    </form>
  );
}

function TokenRow({ token, now, timeZone, busy, onRevoke }: { token: TokenBody; now: number; timeZone: string; busy: boolean; onRevoke: () => void }) {
  const at = (iso: string) => Date.parse(iso) / 1000;
  const expired = token.expires_at !== null && at(token.expires_at) <= now;
  return (
    <li className="grid items-center gap-x-5 gap-y-1 border-b border-rule px-(--margin) py-2 strip:grid-cols-[minmax(0,1fr)_auto]">
      <div className="min-w-0">
        <p className="type-name-low break-words">
          {token.name} <span className="type-label pl-1 text-ink2">…{token.last_four}</span>
        </p>
        <p className="type-label text-ink2">
          {token.role}
          {!token.mine && `, of ${token.person.name}`}, {token.expires_at === null ? 'until revoked' : `${expired ? 'expired' : 'until'} ${dayName(at(token.expires_at), timeZone)}`}, {token.last_used_at ? `used ${when(at(token.last_used_at), now, timeZone)}` : 'never used'}
        </p>
      </div>
      <Sure word="Revoke" yes="Revoke it" size="lane" busy={busy} onSure={onRevoke} />
    </li>
  );
}

/** Keys for a person's own programs, in the cellar shown. */
export function Tokens() {
  const { me } = useMe();
  const { tokens, loading, error, retry } = useTokens();
  const { busy, failed, act } = useAct();
  const [fresh, setFresh] = useState<CreatedToken | null>(null);
  const now = (useNow() ?? 0) / 1000;
  if (loading || !me) return <Haze height={96} label="Loading the tokens" className="mx-(--margin) my-3" />;
  return (
    <>
      <GroupBar word="Tokens" note={`for ${me.cellar.name}`} />
      {fresh ? <Fresh token={fresh} onDone={() => setFresh(null)} /> : <NewToken own={me.cellar.role} onMade={setFresh} />}
      {failed && <FormError>{failed}</FormError>}
      {!tokens ? (
        <ErrorState title="The tokens did not load" onRetry={retry}>
          {error?.message}
        </ErrorState>
      ) : tokens.length === 0 ? (
        <EmptyState title="No token yet">
          With one, a program reads and writes as you do: <span className="fig">Authorization: Bearer fbt_…</span>
        </EmptyState>
      ) : (
        <ul>
          {tokens.map((token) => (
            <TokenRow key={token.id} token={token} now={now} timeZone={me.person.time_zone} busy={busy} onRevoke={() => void act(() => revokeToken(token.id))} />
          ))}
        </ul>
      )}
    </>
  );
}
