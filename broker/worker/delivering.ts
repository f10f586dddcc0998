import { privateTargetsAllowed } from '@/lib/config/env';
import { logFor } from '@/lib/log';
import { deliverDue } from '@/lib/services/webhooks/deliver';
import { startLoop } from './loop';

const log = logFor('webhooks');
const POLL_MS = 2_000;
const AFTER_FAILURE_MS = 10_000;

/** Delivers webhooks as they are owed. */
export function startDelivering(): { stop(): Promise<void> } {
  return startLoop(
    async () => ((await deliverDue({ allowPrivate: privateTargetsAllowed() })) > 0 ? 0 : POLL_MS),
    (error) => {
      log.error({ err: error }, 'webhooks could not be delivered; tried again');
      return AFTER_FAILURE_MS;
    },
  );
}
