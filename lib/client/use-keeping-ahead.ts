'use client';

import { useEffect } from 'react';
import { keepAhead } from './worker';

/** The pages of these batches open without a network too; those of the round beside them. */
export function useKeepingAhead(batches: readonly { id: string; state: string }[] | undefined): void {
  const paths = (batches ?? []).filter(({ state }) => state === 'working').map(({ id }) => `/batches/${id}`);
  const key = paths.slice(0, 40).join(' ');
  useEffect(() => {
    if (key === '' || !navigator.onLine) return;
    void keepAhead(['/shelf', '/rounds', '/alerts', ...key.split(' ')]).catch(() => undefined);
  }, [key]);
}
