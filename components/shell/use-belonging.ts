'use client';

import { usePathname, useRouter } from 'next/navigation';
import { useEffect, useRef } from 'react';
import { onCellarChanged, useMe } from '@/lib/client/me';
import { useWayOut } from '@/lib/client/sign-in';
import { noteLeft } from './left-cellar';

/** A page of one thing of a cellar: a batch, a sensor, a lot. */
const isOfOneThing = (path: string) => !path.startsWith('/settings') && path.split('/').length > 2;

/** Whoever is writing in a sheet writes to the end first: what they keep waits on the device until they have signed in again. */
function onceNothingIsWritten(leave: () => void): () => void {
  const open = document.querySelector('dialog[open]');
  if (!open) {
    leave();
    return () => undefined;
  }
  open.addEventListener('close', leave, { once: true });
  return () => open.removeEventListener('close', leave);
}

/**
 * Leaves the pages of a cellar when the person no longer belongs there: signed
 * out from afar, to the sign-in page, once an open sheet is closed; in no
 * cellar any more, to the page that makes one; in another, to its shelf. And
 * follows a change of cellar, made here or in another tab.
 */
export function useBelonging(): void {
  const { me, error } = useMe();
  const router = useRouter();
  const path = usePathname();
  const leaving = useWayOut() === 'going';
  const status = error?.status;
  const shown = useRef<{ id: string; name: string; person: string } | null>(null);

  useEffect(() => {
    // Two ways to the same page would break each other off, and the wrong one could be last.
    if (leaving) return;
    // The whole page goes, and with it whatever it still held of the cellar.
    /* eslint-disable @next/next/no-location-assign-relative-destination -- a router would keep the page's memory */
    if (status === 401) return onceNothingIsWritten(() => window.location.assign(`/sign-in?said=ended&next=${encodeURIComponent(window.location.pathname)}`));
    if (status === 403) {
      if (shown.current) noteLeft(shown.current.person, shown.current.name);
      window.location.assign('/welcome');
    }
    /* eslint-enable @next/next/no-location-assign-relative-destination */
  }, [status, leaving]);

  useEffect(() => {
    if (!me) return;
    const before = shown.current;
    shown.current = { id: me.cellar.id, name: me.cellar.name, person: me.person.id };
    if (before === null || before.person !== me.person.id || before.id === me.cellar.id) return;
    const left = !me.cellars.some(({ id }) => id === before.id);
    if (left) noteLeft(before.person, before.name);
    if (left || isOfOneThing(path)) router.replace('/shelf');
  }, [me, path, router]);

  useEffect(() => onCellarChanged(), []);
}
