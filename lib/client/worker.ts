'use client';

/** The service worker, as the pages see it. It lives in `public/sw.js`. */

// eslint-disable-next-line no-restricted-syntax -- the build writes these in as words: in a browser there is no environment to read in one place
const BUILD = process.env.NODE_ENV === 'development' ? 'dev' : (process.env.NEXT_PUBLIC_BUILD ?? 'none');
const ANSWER_MS = 2_000;

const has = () => typeof navigator !== 'undefined' && 'serviceWorker' in navigator;

/** Starts it, or its next version. Without one all works but away from the network. */
export async function startWorker(): Promise<void> {
  if (has()) await navigator.serviceWorker.register(`/sw.js?v=${encodeURIComponent(BUILD)}`, { updateViaCache: 'none' });
}

/** Asks it to keep these pages with what they show. */
export async function keepAhead(paths: readonly string[]): Promise<void> {
  if (!has()) return;
  const registration = await navigator.serviceWorker.ready;
  registration.active?.postMessage({ type: 'ahead', paths });
}

/** Drops what was kept of the person here; done when it is gone. */
export async function forgetKept(): Promise<void> {
  if (!has()) return;
  const active = (await navigator.serviceWorker.getRegistration())?.active;
  if (active) {
    const channel = new MessageChannel();
    const answered = new Promise<void>((resolve) => {
      channel.port1.onmessage = () => resolve();
      setTimeout(resolve, ANSWER_MS);
    });
    active.postMessage({ type: 'forget' }, [channel.port2]);
    await answered;
  }
  // Should it not have answered: the same from here.
  for (const name of await caches.keys()) if (name.startsWith('data ') || name.startsWith('pages-')) await caches.delete(name);
}
