'use client';

import { useEffect, useState, useSyncExternalStore } from 'react';

const never = () => () => undefined;

/**
 * The secret of a mailed link, from behind the `#` of the address: no server and
 * no log sees it. It is taken out of the address at once, so that it is neither
 * shown nor kept in the history; `keep` holds it for this tab while somebody
 * signs in elsewhere and comes back. Undefined: not looked yet; null: none.
 */
export function useSecret(keep?: string): string | null | undefined {
  const ready = useSyncExternalStore(never, () => true, () => false);
  const [secret] = useState(() => (typeof window === 'undefined' ? undefined : window.location.hash.slice(1) || (keep && window.sessionStorage.getItem(keep)) || null));
  useEffect(() => {
    if (!window.location.hash) return;
    if (keep && secret) window.sessionStorage.setItem(keep, secret);
    window.history.replaceState(window.history.state, '', window.location.pathname + window.location.search);
  }, [keep, secret]);
  return ready ? (secret ?? null) : undefined;
}

export const forgetSecret = (keep: string) => window.sessionStorage.removeItem(keep);
