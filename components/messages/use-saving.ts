'use client';

import { useCallback, useState } from 'react';
import { ClientError } from '@/lib/client/fetcher';

export interface Saving {
  busy: boolean;
  /** What went wrong, as a sentence. */
  failed: string | null;
  /** True where it was done. */
  run(work: () => Promise<unknown>): Promise<boolean>;
}

/** One thing that is sent at a time, and what became of it. */
export function useSaving(otherwise = 'It was not saved. Try again.'): Saving {
  const [busy, setBusy] = useState(false);
  const [failed, setFailed] = useState<string | null>(null);
  const run = useCallback(
    async (work: () => Promise<unknown>) => {
      setBusy(true);
      setFailed(null);
      try {
        await work();
        return true;
      } catch (error) {
        setFailed(error instanceof ClientError ? (Object.values(error.fields)[0]?.[0] ? `${error.message} (${Object.values(error.fields)[0]![0]!})` : error.message) : otherwise);
        return false;
      } finally {
        setBusy(false);
      }
    },
    [otherwise],
  );
  return { busy, failed, run };
}
