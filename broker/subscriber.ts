import { randomBytes } from 'node:crypto';
import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { closeDatabase } from '@/db/client';
import { env } from '@/lib/config/env';
import { logFor } from '@/lib/log';
import { recordMessages } from '@/lib/services/readings/record';
import { startAnnouncer } from './announce';
import { startHeartbeat } from './heartbeat';
import { keepPartitionsAhead } from './keep-partitions';
import { keepSettings } from './settings';
import { onShutdown } from './shutdown';
import { OutsideBroker } from './subscription';

/** The ingest's process where MQTT_URL names an existing broker. */
const log = logFor('subscriber');
const DRAIN_MS = 7_000;

const url = env().MQTT_URL;
if (!url) {
  log.fatal('The variable MQTT_URL is not set. Set it to the address of an MQTT broker, or start broker/server.ts instead.');
  process.exit(1);
}

/** Made once and kept: the broker holds messages under this name while we are down. */
function instanceName(): string {
  const file = join(env().DATA_DIR, 'ingest.id');
  try {
    return readFileSync(file, 'utf8').trim();
  } catch {
    mkdirSync(env().DATA_DIR, { recursive: true });
    const made = randomBytes(6).toString('hex');
    writeFileSync(file, made);
    return made;
  }
}

const { announcer, stop: stopAnnouncer } = startAnnouncer();
const stopPartitions = keepPartitionsAhead();
// It may come back before there are any: then they are laid for the first time below.
let settings: ReturnType<typeof keepSettings> | null = null;
const outside = await OutsideBroker.subscribe({ url, instance: instanceName(), record: (messages) => recordMessages(messages, announcer), onBack: () => settings?.again() });
settings = keepSettings((topic, payload) => outside.retain(topic, payload));
const stopHeartbeat = startHeartbeat('broker', () => outside.figures());
log.info({ broker: new URL(url).host }, 'subscriber ready');

onShutdown('subscriber', async () => {
  await settings?.stop();
  const drained = await outside.stop(DRAIN_MS);
  log.info({ drained, ...outside.figures() }, 'subscriber stopped');
  stopHeartbeat();
  stopPartitions();
  await stopAnnouncer();
  await closeDatabase();
});
