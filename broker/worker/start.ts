import { smtpTransport } from '@/lib/services/outbox/transport';
import { furtherMeans } from '@/lib/services/outbox/ways';
import { systemClock } from '@/lib/clock';
import { env } from '@/lib/config/env';
import { logFor } from '@/lib/log';
import { oweDigests } from '@/lib/services/digest/owe';
import { dropWhatIsOld } from '@/lib/services/housekeeping';
import { startHeartbeat } from '../heartbeat';
import { keepPartitionsAhead } from '../keep-partitions';
import { startAssessing } from './assessing';
import { startDelivering } from './delivering';
import { startRecalculating } from './recalculating';
import { startSending } from './sending';

const log = logFor('worker');
const HOUSEKEEPING_MS = 3_600_000;
/** A digest comes at most this long after its hour. */
const DIGEST_MS = 30_000;

export interface WorkerOptions {
  /** A batch is judged at most this often after new readings, ms. */
  spacingMs: number;
  /** How often the house itself is looked at, ms. */
  tickMs: number;
  /** Every working batch is judged at least this often, ms. */
  idleMs: number;
  /** One mail may take this long, ms. */
  sendTimeoutMs: number;
}

/** With new readings once a minute; without, often enough for a silence that counts in hours. */
export const USUAL: WorkerOptions = { spacingMs: 60_000, tickMs: 60_000, idleMs: 300_000, sendTimeoutMs: 30_000 };

/** The domain that sends, for message identifiers. */
const domainOf = (from: string) => /@([^\s>@]+)>?\s*$/.exec(from)?.[1] ?? 'fallbright.example';

/** Starts every part of the worker; returns what stops it, the work in hand first. */
export function startWorker({ spacingMs, tickMs, idleMs, sendTimeoutMs }: WorkerOptions = USUAL): { stop(): Promise<void> } {
  const { SMTP_URL, MAIL_FROM, PUBLIC_URL } = env();
  const sending = startSending({
    transport: smtpTransport({ url: SMTP_URL, from: MAIL_FROM, sendTimeoutMs, connectTimeoutMs: Math.min(10_000, sendTimeoutMs) }),
    publicUrl: PUBLIC_URL,
    messageHost: domainOf(MAIL_FROM),
    means: furtherMeans(() => systemClock.now()),
    leaseMs: sendTimeoutMs * 1.5,
  });
  const assessing = startAssessing({ spacingMs, tickMs, idleMs, onJudged: () => sending.wake() });
  const stopHeartbeat = startHeartbeat('worker', () => ({ ...assessing.figures(), ...sending.figures() }));
  const delivering = startDelivering();
  const recalculating = startRecalculating();
  const stopPartitions = keepPartitionsAhead();
  const tidy = () => void dropWhatIsOld();
  tidy();
  const tidying = setInterval(tidy, HOUSEKEEPING_MS);
  const digesting = setInterval(
    () =>
      void oweDigests().then(
        (owed) => owed > 0 && sending.wake(),
        (error: unknown) => log.warn({ err: error }, 'the morning digests could not be written; tried again soon'),
      ),
    DIGEST_MS,
  );

  return {
    stop: async () => {
      clearInterval(tidying);
      clearInterval(digesting);
      stopPartitions();
      await Promise.all([assessing.stop(), delivering.stop(), recalculating.stop(), sending.stop()]);
      stopHeartbeat();
    },
  };
}
