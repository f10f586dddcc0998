'use client';

import { useState } from 'react';
import { ClientError } from '@/lib/client/fetcher';
import { firstOf } from '@/lib/contracts/issues';

/** One thing asked of the server at a time: whether it is under way, and what was wrong with it. What was typed stays. `otherwise`: said where the server did not say why. */
export function useAct(otherwise = 'It was not done. Nothing was changed; try again.') {
  const [busy, setBusy] = useState(false);
  const [failed, setFailed] = useState<string | null>(null);
  const [fields, setFields] = useState<Record<string, string>>({});

  /** @returns whether it was done. */
  async function act(work: () => Promise<unknown>): Promise<boolean> {
    setBusy(true);
    setFailed(null);
    setFields({});
    try {
      await work();
      return true;
    } catch (error) {
      const told = error instanceof ClientError ? error : null;
      setFields(firstOf(told?.fields ?? {}));
      setFailed(told?.message ?? otherwise);
      return false;
    } finally {
      setBusy(false);
    }
  }

  return { busy, failed, fields, act, setFields, clear: () => (setFailed(null), setFields({})) };
}
