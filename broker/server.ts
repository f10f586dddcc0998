import { closeDatabase } from '@/db/client';
import { env } from '@/lib/config/env';
import { logFor } from '@/lib/log';
import { recordMessages } from '@/lib/services/readings/record';
import { startAnnouncer } from './announce';
import { startHeartbeat } from './heartbeat';
import { keepPartitionsAhead } from './keep-partitions';
import { startBroker } from './mqtt';
import { keepSettings } from './settings';
import { onShutdown } from './shutdown';

/** The broker's process: sensors sign in here, and their readings go to PostgreSQL. */
const log = logFor('broker');
const DRAIN_MS = 7_000;

const { announcer, stop: stopAnnouncer } = startAnnouncer();
const broker = await startBroker({ host: env().HOST, port: env().MQTT_PORT, record: (messages) => recordMessages(messages, announcer) }).catch((error: unknown) => {
  log.fatal({ err: error }, `The broker cannot listen on port ${env().MQTT_PORT} of ${env().HOST}. Set MQTT_PORT to a free port, then start again.`);
  process.exit(1);
});
const stopHeartbeat = startHeartbeat('broker', () => broker.figures());
const settings = keepSettings((topic, payload) => broker.retain(topic, payload));
const stopPartitions = keepPartitionsAhead();
log.info({ host: env().HOST, port: broker.port }, 'broker ready');

onShutdown('broker', async () => {
  await settings.stop();
  const drained = await broker.stop(DRAIN_MS);
  log.info({ drained, ...broker.figures() }, 'broker stopped');
  stopPartitions();
  await stopAnnouncer();
  stopHeartbeat();
  await closeDatabase();
});
