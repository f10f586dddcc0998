'use client';

import { useAllUnsent } from '@/lib/client/unsent/use-unsent';

/** On the sign-in page: that something written here has not been sent. It does not say by whom. */
export function UnsentNotice() {
  const waiting = useAllUnsent().filter(({ state }) => state !== 'refused').length;
  if (waiting === 0) return null;
  return (
    <p role="status" className="type-reason mb-4 border-l-[3px] border-ink pl-3">
      {waiting === 1 ? 'One note waits' : `${waiting} notes wait`} on this device to be sent. {waiting === 1 ? 'It goes' : 'They go'} when whoever wrote {waiting === 1 ? 'it' : 'them'} signs in here.
    </p>
  );
}
