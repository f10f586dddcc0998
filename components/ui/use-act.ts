'use client';

import { useState } from 'react';
import { ClientError } from '@/lib/client/fetcher';

/** One thing asked of the server at a time: whether it is under way, and what was wrong with it. What was typed stays. */
export function useAct() {
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
      const wrong = Object.fromEntries(Object.entries(told?.fields ?? {}).flatMap(([name, sentences]) => (sentences[0] ? [[name, sentences[0]]] : [])));
      setFields(wrong);
      setFailed(told?.message ?? 'It was not done. Nothing was changed; try again.');
      return false;
    } finally {
      setBusy(false);
    }
  }

  return { busy, failed, fields, act, clear: () => (setFailed(null), setFields({})) };
}
