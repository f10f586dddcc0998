'use client';

import { useState } from 'react';
import { dayName } from '@/components/charts/zone';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { Haze } from '@/components/ui/Haze';
import { FormError } from '@/components/ui/Notice';
import { useAct } from '@/components/ui/use-act';
import { beginSecondFactor, confirmSecondFactor, endSecondFactor, renewRecoveryCodes, useAccount } from '@/lib/client/account';
import { useMe } from '@/lib/client/me';
import { RecoveryCodes } from './RecoveryCodes';

const BOX = 'flex flex-col gap-3 border-b px-(--margin) py-4';

interface Shown {
  secret: string;
  qr_svg: string;
}

/** `abcd efgh …`: read out, or typed in by hand. */
const inFours = (secret: string) => secret.match(/.{1,4}/g)?.join(' ') ?? secret;

function SetUp({ onCodes }: { onCodes: (codes: string[]) => void }) {
  const { busy, failed, fields, act, clear } = useAct();
  const [passphrase, setPassphrase] = useState('');
  const [shown, setShown] = useState<Shown | null>(null);
  const [code, setCode] = useState('');
  if (!shown)
    return (
      <form
        aria-label="Set up the second factor"
        className={BOX}
        onSubmit={(event) => {
          event.preventDefault();
          void act(async () => setShown(await beginSecondFactor(passphrase)));
        }}
      >
        <p className="type-body max-w-[62ch] text-ink2">Off. With it, a stolen passphrase alone lets nobody in. Any authenticator for time-based codes will do.</p>
        <div className="flex flex-wrap items-start gap-3">
          <Field label="your passphrase" type="password" autoComplete="current-password" value={passphrase} error={fields.passphrase} className="w-80 max-strip:w-full" onChange={(event) => setPassphrase(event.target.value)} />
          <Button type="submit" disabled={busy || passphrase === ''} className="mt-[22px] strip:h-9">
            Set it up
          </Button>
        </div>
        {failed && Object.keys(fields).length === 0 && <FormError>{failed}</FormError>}
      </form>
    );
  return (
    <form
      aria-label="Confirm the second factor"
      className="flex flex-wrap gap-6 border-b px-(--margin) py-4"
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        void act(async () => onCodes((await confirmSecondFactor(code)).recovery_codes));
      }}
    >
      {/* Read by a camera: dark on white in a dark cellar too. */}
      {/* eslint-disable-next-line @next/next/no-img-element -- made on the spot: nothing to load or to shrink */}
      <img src={`data:image/svg+xml;utf8,${encodeURIComponent(shown.qr_svg)}`} alt="The secret as a picture for your authenticator" width={184} height={184} className="border-[1.5px] border-ink" />
      <div className="flex min-w-0 flex-1 basis-72 flex-col gap-3">
        <p className="type-body max-w-[62ch]">Take the picture with your authenticator, or type the secret into it:</p>
        <p className="break-words font-mono text-[0.875rem] font-semibold">{inFours(shown.secret)}</p>
        <Field label="the code it shows" inputMode="numeric" autoComplete="one-time-code" maxLength={7} autoFocus value={code} error={fields.code} className="max-w-56" onChange={(event) => setCode(event.target.value)} />
        {failed && Object.keys(fields).length === 0 && <FormError>{failed}</FormError>}
        <div className="flex gap-2">
          <Button type="submit" look="first" disabled={busy || code.trim() === ''}>
            Turn it on
          </Button>
          <Button
            onClick={() => {
              clear();
              setShown(null);
            }}
          >
            Leave it off
          </Button>
        </div>
      </div>
    </form>
  );
}

function Manage({ since, left, onCodes }: { since: string; left: number; onCodes: (codes: string[]) => void }) {
  const { busy, failed, fields, act } = useAct();
  const [wish, setWish] = useState<'off' | 'codes' | null>(null);
  const [form, setForm] = useState({ passphrase: '', code: '' });
  const done = () => {
    setWish(null);
    setForm({ passphrase: '', code: '' });
  };
  return (
    <div className={BOX}>
      <p className="type-body max-w-[62ch]">
        On since <span className="fig">{since}</span>. <span className="fig">{left}</span> recovery {left === 1 ? 'code is' : 'codes are'} left{left < 3 ? ': make new ones before they run out.' : '.'}
      </p>
      {wish === null ? (
        <div className="flex flex-wrap gap-2">
          <Button onClick={() => setWish('codes')}>New recovery codes</Button>
          <Button onClick={() => setWish('off')}>Turn it off</Button>
        </div>
      ) : (
        <form
          className="flex flex-col gap-3"
          noValidate
          aria-label={wish === 'off' ? 'Turn the second factor off' : 'New recovery codes'}
          onSubmit={(event) => {
            event.preventDefault();
            void act(async () => {
              if (wish === 'off') await endSecondFactor(form);
              else onCodes((await renewRecoveryCodes(form)).recovery_codes);
            }).then((was) => was && done());
          }}
        >
          <div className="flex flex-wrap items-start gap-3">
            <Field label="your passphrase" type="password" autoComplete="current-password" value={form.passphrase} error={fields.passphrase} className="w-80 max-strip:w-full" onChange={(event) => setForm({ ...form, passphrase: event.target.value })} />
            <Field label="code, or a recovery code" autoComplete="one-time-code" value={form.code} error={fields.code} className="w-56 max-strip:w-full" onChange={(event) => setForm({ ...form, code: event.target.value })} />
          </div>
          {failed && Object.keys(fields).length === 0 && <FormError>{failed}</FormError>}
          <div className="flex gap-2">
            <Button type="submit" look={wish === 'off' ? 'final' : 'first'} disabled={busy}>
              {wish === 'off' ? 'Turn it off' : 'Make new ones'}
            </Button>
            <Button onClick={done}>Leave it</Button>
          </div>
        </form>
      )}
    </div>
  );
}

/** Sets the second factor up, shows its recovery codes once, takes it off. */
export function SecondFactor() {
  const { account, loading } = useAccount();
  const { me } = useMe();
  const [codes, setCodes] = useState<string[] | null>(null);
  if (loading) return <Haze height={48} label="Loading the second factor" className="mx-(--margin) my-3" />;
  if (!account) return null;
  if (codes) return <RecoveryCodes codes={codes} onKept={() => setCodes(null)} />;
  const { second_factor: on } = account;
  return on ? <Manage since={dayName(Date.parse(on.since) / 1000, me?.person.time_zone ?? 'UTC')} left={on.recovery_codes_left} onCodes={setCodes} /> : <SetUp onCodes={setCodes} />;
}
