'use client';

import { useState, type ReactNode } from 'react';
import { dayName, when } from '@/components/charts/zone';
import { MorePlaces } from '@/components/shell/MorePlaces';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Haze } from '@/components/ui/Haze';
import { FormError } from '@/components/ui/Notice';
import { useNow } from '@/components/ui/now';
import { GroupBar, PageHead } from '@/components/ui/Page';
import { chooseTheme, useTheme, type ThemeChoice } from '@/components/ui/theme';
import type { Role } from '@/lib/contracts/people';
import { chooseCellar, endSignIn, signOutEverywhere, useMe, useMembers, useSignIns } from '@/lib/client/me';
import { signOut } from '@/lib/client/sign-in';
import { browserWords } from './browser-words';

function Row({ name, children }: { name: string; children: ReactNode }) {
  return (
    <div className="grid items-baseline gap-x-5 border-b border-rule px-(--margin) py-2 strip:grid-cols-[9rem_minmax(0,1fr)]">
      <span className="type-label text-ink2">{name}</span>
      <div className="type-body min-w-0 break-words">{children}</div>
    </div>
  );
}

const THEMES: readonly { value: ThemeChoice; name: string }[] = [
  { value: 'day', name: 'Day' },
  { value: 'night', name: 'Night' },
  { value: 'clock', name: 'By the clock' },
];

const ROLE_WORDS: Record<Role, string> = {
  keeper: 'keeper, runs the cellar',
  brewer: 'brewer, makes batches',
  hand: 'hand, helps on the round',
  guest: 'guest, looks and tastes',
};

function Members() {
  const { members, loading, error } = useMembers();
  if (loading) return <Haze height={48} label="Loading the people" className="mx-(--margin) my-3" />;
  if (!members) return <p className="type-body px-(--margin) py-3 text-ink2">The people did not load. {error?.message}</p>;
  return (
    <ul>
      {members.map((member) => (
        <li key={member.person.id} className="grid items-baseline gap-x-5 border-b border-rule px-(--margin) py-2 strip:grid-cols-[minmax(0,12rem)_minmax(0,1fr)_auto]">
          <span className="type-name-low">{member.person.name}</span>
          <span className="type-label min-w-0 break-words text-ink2">{member.person.email}</span>
          <span className="type-label">{ROLE_WORDS[member.role]}</span>
        </li>
      ))}
    </ul>
  );
}

function SignIns({ now, timeZone }: { now: number; timeZone: string }) {
  const { signIns, loading, error } = useSignIns();
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
  if (!signIns) return <p className="type-body px-(--margin) py-3 text-ink2">The sign-ins did not load. {error?.message}</p>;
  return (
    <>
      {failed && <FormError>{failed}</FormError>}
      <ul>
        {signIns.map((signIn) => (
          <li key={signIn.id} className="grid items-center gap-x-5 gap-y-1 border-b border-rule px-(--margin) py-2 strip:grid-cols-[minmax(0,1fr)_auto_auto]">
            <span className="type-body min-w-0 break-words">{browserWords(signIn.user_agent)}</span>
            <span className="type-label text-ink2">
              since {dayName(Date.parse(signIn.created_at) / 1000, timeZone)}, seen {when(Date.parse(signIn.last_seen_at) / 1000, now, timeZone)}
            </span>
            {signIn.current ? (
              <span className="type-label strip:w-28 strip:text-right" style={{ fontWeight: 600 }}>
                this one
              </span>
            ) : (
              <Button size="lane" disabled={busy} className="strip:w-28" onClick={() => void run(() => endSignIn(signIn.id))}>
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
            <Button
              look="final"
              disabled={busy}
              onClick={() =>
                void run(async () => {
                  await signOutEverywhere();
                  await signOut();
                })
              }
            >
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

/** The person, this device, the cellar's people, and where the person is signed in. */
export function Settings() {
  const { me, loading } = useMe();
  const { choice } = useTheme();
  const nowMs = useNow();
  const now = (nowMs ?? 0) / 1000;
  const timeZone = me?.cellar.time_zone ?? 'UTC';
  return (
    <>
      <MorePlaces />
      <PageHead title="Settings" />
      {loading && <Haze height={96} label="Loading the settings" className="mx-(--margin) my-3" />}
      <div className="wide:grid wide:min-h-[calc(100dvh-101px)] wide:grid-cols-[424px_minmax(0,1fr)]">
        <div className="bg-desk wide:border-r-[1.5px] wide:border-ink">
          {me && (
            <section aria-label="You">
              <GroupBar word="You" />
              <Row name="name">{me.person.name}</Row>
              <Row name="e-mail">
                <span className="font-mono text-[0.8125rem]">{me.person.email}</span>
              </Row>
              <Row name="role">{ROLE_WORDS[me.cellar.role]}</Row>
            </section>
          )}
          <section aria-label="This device">
            <GroupBar word="This device" />
            <div className="border-b border-rule px-(--margin) py-3">
              <Choice label="light" value={choice} onChoose={chooseTheme} options={THEMES} className="max-w-[380px]" />
              <p className="type-reason pt-1.5 text-ink2">
                By the clock, night is from <span className="fig">20:00</span> to <span className="fig">07:00</span>. Kept on this device alone.
              </p>
            </div>
          </section>
          {me && (
            <section aria-label="Cellar">
              <GroupBar word="Cellar" />
              <Row name="name">{me.cellar.name}</Row>
              <Row name="time zone">
                <span className="font-mono text-[0.8125rem]">{me.cellar.time_zone}</span>
              </Row>
              {me.cellars.length > 1 && (
                <Row name="your cellars">
                  <div className="flex flex-wrap gap-2">
                    {me.cellars.map((cellar) => (
                      <Button key={cellar.id} size="lane" look={cellar.id === me.cellar.id ? 'first' : 'plain'} aria-pressed={cellar.id === me.cellar.id} onClick={() => void chooseCellar(cellar.id)}>
                        {cellar.name}
                      </Button>
                    ))}
                  </div>
                </Row>
              )}
            </section>
          )}
        </div>
        <div className="min-w-0">
          <section aria-label="People">
            <GroupBar word="People" note="who shares this cellar" />
            <Members />
          </section>
          <section aria-label="Signed in">
            <GroupBar word="Signed in" note="where you are signed in" />
            <SignIns now={now} timeZone={timeZone} />
          </section>
        </div>
      </div>
    </>
  );
}
