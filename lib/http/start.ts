import 'server-only';
import { authSecret, env } from '../config/env';
import { logFor } from '../log';
import { guardApi } from './api-door';
import { beforeEachRequest } from './before';
import { eventHub } from './event-hub';
import { refuseUnreadable } from './refuse';

/**
 * What the web server needs before its first request. next-auth reads its own
 * address and secret from the environment wherever no options reach.
 */
export function startServer(): void {
  shareWithNextAuth();
  guardApi();
  // Last, so that it looks first.
  refuseUnreadable();
  eventHub().begin();
  for (const signal of ['SIGTERM', 'SIGINT'] as const) process.once(signal, endConnections);
  logFor('web').info({ url: env().PUBLIC_URL }, 'web ready');
}

/** An open event stream, or a page that comes back for one over the connection it has, would keep a server alive that was told to stop. */
function endConnections(): void {
  beforeEachRequest((_, response) => {
    response.shouldKeepAlive = false;
    return false;
  });
  void eventHub().stop();
}

function shareWithNextAuth(): void {
  // eslint-disable-next-line no-restricted-syntax -- written for a library that reads nothing else
  Object.assign(process.env, { NEXTAUTH_URL: env().PUBLIC_URL, NEXTAUTH_SECRET: authSecret() });
}
