import { parseArgs } from 'node:util';
import { closeDatabase, database } from '@/db/client';
import { logFor } from '@/lib/log';
import { onShutdown } from './shutdown';
import { startWorker, USUAL } from './worker/start';

/** The watch's process: it judges batches, moves alerts and sends mails. The options are for tests and trials. */
const log = logFor('worker');
const { values } = parseArgs({ options: { 'spacing-ms': { type: 'string' }, 'tick-ms': { type: 'string' }, 'idle-ms': { type: 'string' }, 'send-timeout-ms': { type: 'string' } } });
const span = (given: string | undefined, usual: number) => (given === undefined ? usual : Number(given));

database();
const worker = startWorker({
  spacingMs: span(values['spacing-ms'], USUAL.spacingMs),
  tickMs: span(values['tick-ms'], USUAL.tickMs),
  idleMs: span(values['idle-ms'], USUAL.idleMs),
  sendTimeoutMs: span(values['send-timeout-ms'], USUAL.sendTimeoutMs),
});
log.info('worker ready');

onShutdown('worker', async () => {
  await worker.stop();
  await closeDatabase();
  log.info('worker stopped');
});
