import { z } from 'zod';
import { id } from './common';
import { byId, endpoint } from './endpoint';
import { ARCHIVE_LIMIT_BYTES, importForm, importList, importPreviewForm, importPreviewSchema, importSchema } from './imports';
import { byDelivery, createdWebhookSchema, createWebhook, deliveryList, updateWebhook, webhookList, webhookSchema } from './webhooks';
import { PHOTO_LIMIT_BYTES, PHOTO_TYPES, photoFile, photoList, photoSchema, photoTarget } from './photos';

const exportQuery = z.object({ batch: id.optional() });

/** Photos; data in and out; webhooks. */
export const endpointsData = {
  listBatchPhotos: endpoint({ method: 'GET', path: '/batches/{id}/photos', summary: 'Photos in the log of a batch', access: 'batches.read', params: byId, response: photoList, status: 200 }),
  listLotPhotos: endpoint({ method: 'GET', path: '/lots/{id}/photos', summary: 'Photos of a lot and of its tasting notes', access: 'lots.read', params: byId, response: photoList, status: 200 }),
  keepPhoto: endpoint({ method: 'POST', path: '/photos', summary: 'Hang a photo on an entry, a lot or an own tasting note; the body is the picture itself', access: 'member', query: photoTarget, file: PHOTO_TYPES, limitBytes: PHOTO_LIMIT_BYTES, deadlineMs: 60_000, response: photoSchema, status: 201 }),
  removePhoto: endpoint({ method: 'DELETE', path: '/photos/{id}', summary: 'Take a photo off', access: 'member', params: byId, response: null, status: 204 }),
  openPhoto: endpoint({ method: 'GET', path: '/photos/{id}/{size}', summary: 'A photo’s file; the address is the key, and ends by itself', access: 'anyone', params: photoFile.params, query: photoFile.query, response: null, status: 200 }),

  previewImport: endpoint({ method: 'POST', path: '/imports/preview', summary: 'Look at a file: guessed columns, the first rows as they would be kept, errors by line; nothing is kept', access: 'data.import', body: importPreviewForm, limitBytes: 1.5 * ARCHIVE_LIMIT_BYTES, deadlineMs: 60_000, response: importPreviewSchema, status: 200 }),
  keepImport: endpoint({ method: 'POST', path: '/imports', summary: 'Keep a file that was looked at, in one step that can be undone', access: 'data.import', body: importForm, limitBytes: 1.5 * ARCHIVE_LIMIT_BYTES, deadlineMs: 60_000, response: importSchema, status: 201 }),
  listImports: endpoint({ method: 'GET', path: '/imports', summary: 'What was brought in, newest first', access: 'data.import', response: importList, status: 200 }),
  undoImport: endpoint({ method: 'DELETE', path: '/imports/{id}', summary: 'Take an import out again, all of it', access: 'data.import', params: byId, response: importSchema, status: 200 }),
  exportCellar: endpoint({ method: 'GET', path: '/export.json', summary: 'All that a cellar holds as one archive, or what belongs to one batch', access: 'data.export', query: exportQuery, response: null, status: 200 }),
  exportTable: endpoint({ method: 'GET', path: '/export/{table}', summary: 'Readings, log or batches as CSV, of one batch or of all', access: 'data.export', params: z.object({ table: z.enum(['readings.csv', 'log.csv', 'batches.csv']) }), query: exportQuery, response: null, status: 200 }),
  getArchiveSchema: endpoint({ method: 'GET', path: '/archive.schema.json', summary: 'The form of the archive as JSON Schema', access: 'anyone', response: null, status: 200 }),

  listWebhooks: endpoint({ method: 'GET', path: '/webhooks', summary: 'Where the cellar tells other programs of changes', access: 'webhooks.manage', response: webhookList, status: 200 }),
  createWebhook: endpoint({ method: 'POST', path: '/webhooks', summary: 'Tell another program of changes; the answer holds the key that signs, once', access: 'webhooks.manage', body: createWebhook, response: createdWebhookSchema, status: 201 }),
  updateWebhook: endpoint({ method: 'PATCH', path: '/webhooks/{id}', summary: 'Change a webhook or switch it off', access: 'webhooks.manage', params: byId, body: updateWebhook, response: webhookSchema, status: 200 }),
  removeWebhook: endpoint({ method: 'DELETE', path: '/webhooks/{id}', summary: 'Remove a webhook with its deliveries', access: 'webhooks.manage', params: byId, response: null, status: 204 }),
  tryWebhook: endpoint({ method: 'POST', path: '/webhooks/{id}/try', summary: 'Send a delivery that says nothing, to see whether it arrives', access: 'webhooks.manage', params: byId, response: null, status: 204 }),
  listDeliveries: endpoint({ method: 'GET', path: '/webhooks/{id}/deliveries', summary: 'What was delivered, what waits, what was given up', access: 'webhooks.manage', params: byId, response: deliveryList, status: 200 }),
  deliverAgain: endpoint({ method: 'POST', path: '/webhooks/{id}/deliveries/{deliveryId}/again', summary: 'Send a delivery again that did not arrive', access: 'webhooks.manage', params: byDelivery, response: null, status: 204 }),
};
