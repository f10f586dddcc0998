import { z } from 'zod';
import { benchFacts, benchForm, benchVerdictSchema, bottleBatchForm } from './bench';
import { id } from './common';
import { compareQuery, compareSchema } from './compare';
import { byId, endpoint } from './endpoint';
import { labelFacts, labelQuery } from './labels';
import { liftCaution, lotList, lotQuery, lotSchema, moveBottles, openBottles, placeForm, placeList, placeSchema, updateLot, updatePlaceForm } from './lots';
import { byToken, createShare, sharedBatch, sharedQuery, shareList, shareSchema, tastingTaken } from './shares';
import { createTasting, guestTasting, tastingList, tastingSchema } from './tastings';

/** The bottle and what comes after it. */
export const endpointsAfter = {
  getBench: endpoint({ method: 'GET', path: '/batches/{id}/bench', summary: 'What the log says to the bottling bench: is it done, how strong, how warm it was', access: 'batches.read', params: byId, response: benchFacts, status: 200 }),
  judgeBench: endpoint({ method: 'POST', path: '/batches/{id}/bench', summary: 'Safe or stop, with the pressure in every bottle; a stop has no dose', access: 'batches.read', params: byId, body: benchForm, response: benchVerdictSchema, status: 200 }),
  bottleBatch: endpoint({ method: 'POST', path: '/batches/{id}/bottle', summary: 'Bottle it: a new lot. A stop is put aside only by a brewer’s written reason', access: 'lots.bottle', params: byId, body: bottleBatchForm, response: lotSchema, status: 201 }),

  listLots: endpoint({ method: 'GET', path: '/lots', summary: 'The cellar book: searched, filtered, sorted', access: 'lots.read', query: lotQuery, response: lotList, status: 200 }),
  exportLots: endpoint({ method: 'GET', path: '/lots.csv', summary: 'The cellar book as CSV', access: 'lots.read', query: lotQuery, response: null, status: 200 }),
  getLot: endpoint({ method: 'GET', path: '/lots/{id}', summary: 'One lot: where it stands, what became of it', access: 'lots.read', params: byId, response: lotSchema, status: 200 }),
  updateLot: endpoint({ method: 'PATCH', path: '/lots/{id}', summary: 'Name, code, note, ready from, and what to do otherwise next time', access: 'lots.update', params: byId, body: updateLot, response: lotSchema, status: 200 }),
  liftCaution: endpoint({ method: 'POST', path: '/lots/{id}/lift-caution', summary: 'Take a caution off a lot, with a brewer’s written reason that stays in its history', access: 'lots.override', params: byId, body: liftCaution, response: lotSchema, status: 200 }),
  moveBottles: endpoint({ method: 'POST', path: '/lots/{id}/move', summary: 'Move bottles to another place, if it has room and is not too warm', access: 'lots.serve', params: byId, body: moveBottles, response: lotSchema, status: 200 }),
  openBottles: endpoint({ method: 'POST', path: '/lots/{id}/openings', summary: 'Opened, given away, broken, or gushed', access: 'lots.serve', params: byId, body: openBottles, response: lotSchema, status: 201 }),
  undoOpening: endpoint({ method: 'DELETE', path: '/lots/{id}/openings/{openingId}', summary: 'Put a bottle back that was not opened after all', access: 'lots.serve', params: z.object({ id, openingId: id }), response: null, status: 204 }),

  listPlaces: endpoint({ method: 'GET', path: '/places', summary: 'Where bottles stand, and how many fit', access: 'lots.read', response: placeList, status: 200 }),
  createPlace: endpoint({ method: 'POST', path: '/places', summary: 'Add a place', access: 'places.manage', body: placeForm, response: placeSchema, status: 201 }),
  updatePlace: endpoint({ method: 'PATCH', path: '/places/{id}', summary: 'Change a place', access: 'places.manage', params: byId, body: updatePlaceForm, response: placeSchema, status: 200 }),
  removePlace: endpoint({ method: 'DELETE', path: '/places/{id}', summary: 'Take an empty place away', access: 'places.manage', params: byId, response: null, status: 204 }),

  listTastings: endpoint({ method: 'GET', path: '/lots/{id}/tastings', summary: 'Tasting notes, their average and spread', access: 'lots.read', params: byId, response: tastingList, status: 200 }),
  createTasting: endpoint({ method: 'POST', path: '/lots/{id}/tastings', summary: 'Write a tasting note', access: 'tastings.write', params: byId, body: createTasting, response: tastingSchema, status: 201 }),
  removeTasting: endpoint({ method: 'DELETE', path: '/tastings/{id}', summary: 'Take a tasting note back', access: 'tastings.write', params: byId, response: null, status: 204 }),

  listShares: endpoint({ method: 'GET', path: '/shares', summary: 'The cellar’s share links', access: 'shares.manage', response: shareList, status: 200 }),
  listBatchShares: endpoint({ method: 'GET', path: '/batches/{id}/shares', summary: 'The share links of a batch', access: 'shares.manage', params: byId, response: shareList, status: 200 }),
  createShare: endpoint({ method: 'POST', path: '/batches/{id}/shares', summary: 'Make a share link: one batch, read only, until it expires or is revoked', access: 'shares.manage', params: byId, body: createShare, response: shareSchema, status: 201 }),
  revokeShare: endpoint({ method: 'DELETE', path: '/shares/{id}', summary: 'Revoke a share link', access: 'shares.manage', params: byId, response: null, status: 204 }),
  getShared: endpoint({ method: 'GET', path: '/share/{token}', summary: 'The shared batch; the address is the key', access: 'anyone', params: byToken, query: sharedQuery, response: sharedBatch, status: 200 }),
  tasteShared: endpoint({ method: 'POST', path: '/share/{token}/tastings', summary: 'A guest’s tasting note', access: 'anyone', params: byToken, body: guestTasting, response: tastingTaken, status: 201 }),

  getLabelFacts: endpoint({ method: 'GET', path: '/lots/{id}/label', summary: 'What the log has to say on a label', access: 'lots.read', params: byId, response: labelFacts, status: 200 }),
  printLabels: endpoint({ method: 'GET', path: '/lots/{id}/labels.pdf', summary: 'Labels as PDF', access: 'labels.print', params: byId, query: labelQuery, response: null, status: 200 }),
  compareBatches: endpoint({ method: 'GET', path: '/compare', summary: 'Batches laid over each other, aligned at their pitch', access: 'batches.read', query: compareQuery, response: compareSchema, status: 200 }),
} as const;
