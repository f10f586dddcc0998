'use client';

import { useState } from 'react';
import { ClientError } from '@/lib/client/fetcher';

/** One thing done at a time, with what is said when it fails. */
export function useWork(otherwise = 'Nothing was changed. Try again.') {
  const [busy, setBusy] = useState(false);
  const [failed, setFailed] = useState<string | null>(null);
  const [fields, setFields] = useState<Record<string, string[]>>({});
  async function run(work: () => Promise<unknown>): Promise<boolean> {
    setBusy(true);
    setFailed(null);
    setFields({});
    try {
      await work();
      return true;
    } catch (error) {
      if (error instanceof ClientError) setFields(error.fields);
      setFailed(error instanceof ClientError ? error.message : otherwise);
      return false;
    } finally {
      setBusy(false);
    }
  }
  return { busy, failed, fields, run, setFields };
}
