'use client';

import { useState } from 'react';
import { dayName, when } from '@/components/charts/zone';
import { Button } from '@/components/ui/Button';
import { Haze } from '@/components/ui/Haze';
import { ErrorState, FormError } from '@/components/ui/Notice';
import { useNow } from '@/components/ui/now';
import { endSignIn, signOutEverywhere, useMe, useSignIns } from '@/lib/client/me';
import { leaveBy, signOut } from '@/lib/client/sign-in';
import { browserWords } from './browser-words';

/** Where the person is signed in, and the ways to end it. */
export function SignIns() {
  const { me } = useMe();
  const now = (useNow() ?? 0) / 1000;
  const timeZone = me?.person.time_zone ?? 'UTC';
  const { signIns, loading, error, retry } = useSignIns();
  const [busy, setBusy] = useState(false);
  const [failed, setFailed] = useState<string | null>(null);
  const [sure, setSure] = useState(false);

  const run = async (work: () => Promise<unknown>) => {
    setBusy(true);
    setFailed(null);
    try {
      await work();
    } catch (thrown) {
      setFailed(thrown instanceof Error ? thrown.message : 'Nothing was ended. Try again.');
    } finally {
      setBusy(false);
    }
  };

  if (loading) return <Haze height={48} label="Loading the sign-ins" className="mx-(--margin) my-3" />;
  if (!signIns)
    return (
      <ErrorState title="The sign-ins did not load" onRetry={retry}>
        {error?.message}
      </ErrorState>
    );
  return (
    <>
      {failed && <FormError>{failed}</FormError>}
      <ul>
        {signIns.map((signIn) => (
          <li key={signIn.id} className="grid grid-cols-[minmax(0,1fr)_auto] items-center gap-x-5 gap-y-1 border-b border-rule px-(--margin) py-2 strip:grid-cols-[minmax(0,1fr)_auto_auto]">
            <span className="type-body min-w-0 break-words">{browserWords(signIn.user_agent)}</span>
            <span className="type-label text-ink2 max-strip:col-start-1">
              since {dayName(Date.parse(signIn.created_at) / 1000, timeZone)}, seen {when(Date.parse(signIn.last_seen_at) / 1000, now, timeZone)}
            </span>
            {signIn.current ? (
              <span className="type-label max-strip:col-start-2 max-strip:row-span-2 max-strip:row-start-1 strip:w-28 strip:text-right" style={{ fontWeight: 600 }}>
                this one
              </span>
            ) : (
              <Button size="lane" disabled={busy} className="max-strip:col-start-2 max-strip:row-span-2 max-strip:row-start-1 strip:w-28" onClick={() => void run(() => endSignIn(signIn.id))}>
                End it
              </Button>
            )}
          </li>
        ))}
      </ul>
      <div className="flex flex-wrap items-center gap-2 px-(--margin) py-3">
        <Button onClick={() => void signOut()}>Sign out here</Button>
        {sure ? (
          <>
            <Button look="final" disabled={busy} onClick={() => void run(() => leaveBy(signOutEverywhere))}>
              End all of them
            </Button>
            <Button onClick={() => setSure(false)}>Leave them</Button>
          </>
        ) : (
          <Button onClick={() => setSure(true)}>Sign out everywhere</Button>
        )}
      </div>
    </>
  );
}
