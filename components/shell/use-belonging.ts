'use client';

import { useEffect } from 'react';
import { onCellarChanged, useMe } from '@/lib/client/me';

/**
 * Leaves the pages of a cellar when the person no longer belongs there: signed
 * out from afar, to the sign-in page; in no cellar any more, to the page that
 * makes one. And follows a change of cellar made in another tab.
 */
export function useBelonging(): void {
  const { error } = useMe();
  const status = error?.status;
  useEffect(() => {
    // The whole page goes, and with it whatever it still held of the cellar.
    /* eslint-disable @next/next/no-location-assign-relative-destination -- a router would keep the page's memory */
    if (status === 401) window.location.assign(`/sign-in?next=${encodeURIComponent(window.location.pathname)}`);
    if (status === 403) window.location.assign('/welcome');
    /* eslint-enable @next/next/no-location-assign-relative-destination */
  }, [status]);
  useEffect(() => onCellarChanged(), []);
}
