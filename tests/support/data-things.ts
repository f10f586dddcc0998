import { Assignment, CalibrationPointRow, CalibrationRow, ImportRun, Photo, Sensor, Webhook, WebhookDelivery } from '@/db/models';
import { database } from '@/db/client';
import { ensurePartitions, monthOf } from '@/db/queries/partitions';
import type { Actor } from '@/lib/auth/policies';
import { feltAt } from '@/lib/core/calibration/apply';
import { seal } from '@/lib/services/webhooks/signature';
import { buildBatch, buildEntry, buildSensor } from './factories';

/** What sensors and data have in a cellar. */
export interface DataThings {
  floatId: string;
  pointIds: string[];
  pairEntryId: string;
  photoId: string;
  importId: string;
  webhookId: string;
  deliveryId: string;
}

/** Made by somebody else than who asks. */
export async function dataThings({ cellarId, personId }: Actor): Promise<DataThings> {
  const batch = await buildBatch({ cellarId });
  const { sensor } = await buildSensor({ cellarId });
  await Assignment.create({ cellarId, sensorId: sensor.id, batchId: batch.id, fromAt: new Date(Date.now() - 86_400_000) });
  const points = await CalibrationPointRow.bulkCreate([10, 30, 50, 70].map((inclination) => ({ cellarId, sensorId: sensor.id, at: new Date(), inclination, gravity: 0.99 + 0.001 * inclination + (feltAt(1, 20) - 1), temperature: 20, source: 'hydrometer' as const })), { returning: true });
  await CalibrationRow.create({ cellarId, sensorId: sensor.id, version: 1, appliesFrom: new Date(), offsetSg: 0.001 });
  const entry = await buildEntry(batch, { kind: 'reading', gravity: 1.03, at: new Date(Date.now() - 3_600_000) });
  await ensurePartitions(database(), [monthOf(Date.now() - 3_600_000)]);
  await database().query('insert into readings (sensor_id, measured_at, inclination, temperature) values ($id, $at, 40, 20) on conflict do nothing', { bind: { id: sensor.id, at: new Date(Date.now() - 3_600_000) } });
  const photo = await Photo.create({ cellarId, entryId: entry.id, bytes: 1, width: 10, height: 10, createdBy: personId });
  const file = await Sensor.create({ cellarId, identifier: `fs-${entry.id.slice(0, 12)}`, secretHash: Buffer.alloc(32), name: 'a file', kind: 'file' });
  const run = await ImportRun.create({ cellarId, kind: 'readings', fileName: 'log.csv', counts: { readings: 0 }, sensorId: file.id, batchId: batch.id });
  const webhook = await Webhook.create({ cellarId, url: 'https://hooks.example.com/x', events: ['alert'], secret: seal('whsec_x') });
  const delivery = await WebhookDelivery.create({ cellarId, webhookId: webhook.id, event: 'alert', payload: {}, failedAt: new Date() });
  return { floatId: sensor.identifier, pointIds: points.map((point) => point.id), pairEntryId: entry.id, photoId: photo.id, importId: run.id, webhookId: webhook.id, deliveryId: delivery.id };
}
