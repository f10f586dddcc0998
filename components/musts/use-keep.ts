import { useState } from 'react';
import { focusFirstError } from '@/lib/client/focus';
import { ClientError } from '@/lib/client/fetcher';
import type { MustSheetBody } from '@/lib/contracts/musts';
import { checked, type SheetDraft, type SheetErrors } from './draft';

/** Keeps a sheet as it is typed, or says beside each field what is wrong with it. What was typed stays either way. */
export function useKeep(keep: (sheet: MustSheetBody) => Promise<unknown>) {
  const [errors, setErrors] = useState<SheetErrors>({});
  const [failed, setFailed] = useState<string | null>(null);
  const [sending, setSending] = useState(false);

  async function save(draft: SheetDraft) {
    const made = checked(draft);
    setErrors(made.errors ?? {});
    setFailed(made.errors?.sheet ?? null);
    if (made.errors) return focusFirstError();
    setSending(true);
    try {
      await keep(made.sheet);
    } catch (error) {
      setFailed(error instanceof ClientError ? error.message : 'It was not kept. Try again.');
    }
    setSending(false);
  }

  return { errors, failed, sending, save };
}
