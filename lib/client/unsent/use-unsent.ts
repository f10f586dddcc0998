'use client';

import { useEffect, useState } from 'react';
import { useLiveState } from '../use-live-changes';
import { useMe } from '../me';
import { sendUnsent, setWriter, type Stopped } from './send';
import { allUnsent, onUnsentChange, type Unsent } from './store';

/** What waits on this device, oldest first; of everybody who wrote here. */
export function useAllUnsent(): Unsent[] {
  const [entries, setEntries] = useState<Unsent[]>([]);
  useEffect(() => {
    let gone = false;
    const look = () =>
      void allUnsent().then(
        (found) => !gone && setEntries(found),
        () => undefined,
      );
    look();
    const stop = onUnsentChange(look);
    return () => {
      gone = true;
      stop();
    };
  }, []);
  return entries;
}

/** What waits of the person here in this cellar; another cellar's goes when that one is shown. An entry on its way from an open form is not among them. */
export function useUnsent(): Unsent[] {
  const { me } = useMe();
  return useAllUnsent().filter((entry) => entry.personId === me?.person.id && entry.cellarId === me.cellar.id && entry.state !== 'sending');
}

const AGAIN_MS = 15_000;
const SOON_MS = 400;

/** Once, in the shell: sends what waits when the line is back, when the page is opened, and now and then. */
export function useSendingUnsent(): Stopped {
  const { me } = useMe();
  const { state } = useLiveState();
  const [stopped, setStopped] = useState<Stopped>(null);
  const personId = me?.person.id;
  const cellarId = me?.cellar.id;

  useEffect(() => {
    setWriter(personId && cellarId ? { personId, cellarId } : null);
    if (!personId || !cellarId) return;
    let gone = false;
    const send = () =>
      void sendUnsent().then(
        (why) => !gone && setStopped(why),
        () => undefined,
      );
    send();
    // Soon after something was put by too: it may have been a sign-in that ended, and not the network.
    let soon: ReturnType<typeof setTimeout> | undefined;
    const stop = onUnsentChange(() => {
      clearTimeout(soon);
      soon = setTimeout(send, SOON_MS);
    });
    const timer = setInterval(send, AGAIN_MS);
    window.addEventListener('online', send);
    return () => {
      gone = true;
      stop();
      clearTimeout(soon);
      clearInterval(timer);
      window.removeEventListener('online', send);
    };
  }, [personId, cellarId, state]);

  return stopped;
}
