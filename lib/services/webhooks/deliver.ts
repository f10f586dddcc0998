import { settleDelivery, takeDeliveries, type DueDelivery } from '@/db/queries/webhooks';
import { systemClock, type Clock } from '@/lib/clock';
import { composeDelivery } from './compose';
import { noteArrival, noteFailure } from './give-up';
import { post } from './post';
import { sign, unseal } from './signature';

/** After each try that failed; with the last one a day has passed, and it is given up. */
const AGAIN_AFTER_MS = [10_000, 60_000, 300_000, 1_800_000, 7_200_000, 21_600_000, 43_200_000];
const AT_ONCE = 8;
const LEASE_MS = 60_000;

export interface DeliverDeps {
  allowPrivate: boolean;
  clock?: Clock;
  timeoutMs?: number;
}

/** Sends what is due, a few at a time. @returns how many were tried */
export async function deliverDue({ allowPrivate, clock = systemClock, timeoutMs }: DeliverDeps): Promise<number> {
  const due = await takeDeliveries(AT_ONCE, LEASE_MS);
  await Promise.all(due.map((delivery) => deliver(delivery, allowPrivate, clock.now(), timeoutMs)));
  return due.length;
}

async function deliver(delivery: DueDelivery, allowPrivate: boolean, now: number, timeoutMs: number | undefined): Promise<void> {
  const body = await composeDelivery(delivery, now);
  const payload = { ...delivery.payload, body };
  let status: number | null = null;
  let error: string | null = null;
  try {
    status = await post(
      delivery.url,
      {
        'content-type': 'application/json; charset=utf-8',
        'user-agent': 'Fallbright',
        'fallbright-event': delivery.event,
        'fallbright-delivery': delivery.id,
        // Each try is signed anew, so that the replay window holds for it too.
        'fallbright-signature': sign(unseal(delivery.secret), body, now),
      },
      body,
      allowPrivate,
      timeoutMs,
    );
    if (status < 200 || status >= 300) error = `it answered ${status}`;
  } catch (thrown) {
    error = sentence(thrown);
  }
  const againInMs = error === null ? null : (AGAIN_AFTER_MS[delivery.attempts - 1] ?? null);
  await settleDelivery({ id: delivery.id, attempts: delivery.attempts, payload, status, error, againInMs });
  await (error === null ? noteArrival(delivery.webhookId) : noteFailure(delivery.webhookId, againInMs === null, now));
}

function sentence(error: unknown): string {
  if (!(error instanceof Error)) return 'it could not be reached';
  if (error.name === 'PrivateAddressError') return error.message;
  if (error.name === 'TimeoutError' || error.name === 'AbortError') return 'it did not answer in time';
  const { code } = error as NodeJS.ErrnoException;
  return `it could not be reached${code ? ` (${code})` : ''}`;
}
