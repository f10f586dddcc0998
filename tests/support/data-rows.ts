import type { EndpointName } from '@/lib/contracts/endpoints';
import { BREWERS, EVERYBODY, NOT_GUESTS, type RoleRow } from './role-rows';

const LOG = 'time,sg\n2026-03-01T00:00:00Z,1.050\n';
const COLUMNS = { at: 0, gravity: 1, temperature: null, battery: null, signal: null };

/** Sensors, photos, data in and out, webhooks. Written out by hand, as the watch's rows are. */
export const dataRows = {
  rotateSensor: { may: ['keeper'], good: 200, names: true, path: (t) => `/sensors/${t.floatId}/secret` },
  removeSensor: { may: ['keeper'], good: 204, names: true, path: (t) => `/sensors/${t.floatId}` },
  setSensor: { may: ['keeper'], good: 200, names: true, path: (t) => `/sensors/${t.floatId}/settings`, body: () => ({ interval_s: 600 }) },
  getSensorHealth: { may: NOT_GUESTS, good: 200, names: true, path: (t) => `/sensors/${t.floatId}/health` },
  listStays: { may: NOT_GUESTS, good: 200, names: true, path: (t) => `/sensors/${t.floatId}/stays` },
  listRawReadings: { may: NOT_GUESTS, good: 200, names: true, path: (t) => `/sensors/${t.floatId}/readings` },
  listSensorHealth: { may: NOT_GUESTS, good: 200, path: () => '/sensor-health' },
  getSensorLimits: { may: NOT_GUESTS, good: 200, path: () => '/sensor-limits' },
  setSensorLimits: { may: ['keeper'], good: 200, path: () => '/sensor-limits', body: () => ({ low_battery_days: 7 }) },
  getCalibration: { may: NOT_GUESTS, good: 200, names: true, path: (t) => `/sensors/${t.floatId}/calibration` },
  addCalibrationPoint: { may: BREWERS, good: 201, names: true, path: (t) => `/sensors/${t.floatId}/calibration/points`, body: () => ({ source: 'water', inclination: 11 }) },
  pairCalibrationPoint: { may: BREWERS, good: 201, names: true, path: (t) => `/sensors/${t.floatId}/calibration/pairs`, body: (t) => ({ entry_id: t.pairEntryId }) },
  removeCalibrationPoint: { may: BREWERS, good: 204, names: true, path: (t) => `/sensors/${t.floatId}/calibration/points/${t.pointIds[0]}` },
  calibrate: { may: BREWERS, good: 201, names: true, path: (t) => `/sensors/${t.floatId}/calibration/versions`, body: (t) => ({ degree: 1, points: t.pointIds, applies_from: '2026-01-01T00:00:00Z' }) },
  offsetSensor: { may: BREWERS, good: 201, names: true, path: (t) => `/sensors/${t.floatId}/calibration/offset`, body: () => ({ offset: -0.002, applies_from: '2026-01-01T00:00:00Z' }) },
  removeCalibration: { may: BREWERS, good: 204, names: true, path: (t) => `/sensors/${t.floatId}/calibration/versions/1` },

  listBatchPhotos: { may: EVERYBODY, good: 200, names: true, path: (t) => `/batches/${t.batchId}/photos` },
  listLotPhotos: { may: EVERYBODY, good: 200, names: true, path: (t) => `/lots/${t.lotId}/photos` },
  // The photo is somebody else's: a hand may take off only an own one.
  removePhoto: { may: BREWERS, good: 204, names: true, byService: true, path: (t) => `/photos/${t.photoId}` },

  previewImport: { may: BREWERS, good: 200, path: () => '/imports/preview', body: () => ({ kind: 'readings', file_name: 'log.csv', text: LOG }) },
  keepImport: { may: BREWERS, good: 201, names: true, path: () => '/imports', body: (t) => ({ kind: 'readings', file_name: 'log.csv', text: LOG, columns: COLUMNS, batch_id: t.batchId }) },
  listImports: { may: BREWERS, good: 200, path: () => '/imports' },
  undoImport: { may: BREWERS, good: 200, names: true, path: (t) => `/imports/${t.importId}` },
  exportCellar: { may: BREWERS, good: 200, names: true, path: (t) => `/export.json?batch=${t.batchId}` },
  exportTable: { may: BREWERS, good: 200, names: true, path: (t) => `/export/log.csv?batch=${t.batchId}` },

  listWebhooks: { may: ['keeper'], good: 200, path: () => '/webhooks' },
  createWebhook: { may: ['keeper'], good: 201, path: () => '/webhooks', body: () => ({ url: 'https://hooks.example.com/x', events: ['alert'] }) },
  updateWebhook: { may: ['keeper'], good: 200, names: true, path: (t) => `/webhooks/${t.webhookId}`, body: () => ({ note: 'x' }) },
  removeWebhook: { may: ['keeper'], good: 204, names: true, path: (t) => `/webhooks/${t.webhookId}` },
  tryWebhook: { may: ['keeper'], good: 204, names: true, path: (t) => `/webhooks/${t.webhookId}/try` },
  listDeliveries: { may: ['keeper'], good: 200, names: true, path: (t) => `/webhooks/${t.webhookId}/deliveries` },
  deliverAgain: { may: ['keeper'], good: 204, names: true, path: (t) => `/webhooks/${t.webhookId}/deliveries/${t.deliveryId}/again` },
} satisfies Partial<Record<EndpointName, RoleRow>>;
