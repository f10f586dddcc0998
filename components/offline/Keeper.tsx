'use client';

import { useEffect } from 'react';
import { useMe } from '@/lib/client/me';
import { renewDevice } from '@/lib/client/push';
import { startWorker } from '@/lib/client/worker';

/** Once in the shell: starts the service worker, and tells the house where this browser takes messages. */
export function Keeper() {
  const { me } = useMe();
  const personId = me?.person.id;
  useEffect(() => {
    void startWorker().catch(() => undefined);
  }, []);
  useEffect(() => {
    if (personId) void renewDevice().catch(() => undefined);
  }, [personId]);
  return null;
}
