import 'server-only';
import { authSecret, env } from '../config/env';
import { logFor } from '../log';
import { eventHub } from './event-hub';
import { refuseUnreadable } from './refuse';

/**
 * What the web server needs before its first request. next-auth reads its own
 * address and secret from the environment wherever no options reach.
 */
export function startServer(): void {
  shareWithNextAuth();
  refuseUnreadable();
  eventHub().begin();
  // An open event stream would keep the server alive after it was told to stop.
  for (const signal of ['SIGTERM', 'SIGINT'] as const) process.once(signal, () => void eventHub().stop());
  logFor('web').info({ url: env().PUBLIC_URL }, 'web ready');
}

function shareWithNextAuth(): void {
  // eslint-disable-next-line no-restricted-syntax -- written for a library that reads nothing else
  Object.assign(process.env, { NEXTAUTH_URL: env().PUBLIC_URL, NEXTAUTH_SECRET: authSecret() });
}
