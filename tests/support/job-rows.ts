import type { endpointsAfter } from '@/lib/contracts/endpoints-after';
import type { endpointsBefore } from '@/lib/contracts/endpoints-before';
import { aLine, aSheet, bottleForm, isoAt } from './cellar';
import { ITEM } from './job-things';
import { BREWERS, EVERYBODY, NOT_GUESTS, type RoleRow } from './role-rows';

const at = () => isoAt(Date.now());
const sheet = () => aSheet();
const bench = () => {
  const { client_id: _client, code: _code, name: _name, place_id: _place, ends_batch: _ends, other_cost: _cost, override_reason: _reason, at: _at, ...form } = bottleForm();
  return form;
};

/** Must sheets, cellar work, rounds, bench, lots, labels, shares. Written out by hand on purpose, as the other rows are. */
export const jobRows: Record<Exclude<keyof typeof endpointsBefore | keyof typeof endpointsAfter, 'readCalendar' | 'getShared' | 'tasteShared'>, RoleRow> = {
  getCatalogue: { may: EVERYBODY, good: 200, path: () => '/catalogue' },
  addToCatalogue: { may: BREWERS, good: 201, path: () => '/catalogue', body: () => ITEM },
  updateCatalogue: { may: BREWERS, good: 200, names: true, path: (t) => `/catalogue/${t.itemId}`, body: () => ITEM },
  removeFromCatalogue: { may: BREWERS, good: 204, names: true, path: (t) => `/catalogue/${t.itemId}` },
  listMusts: { may: EVERYBODY, good: 200, path: () => '/musts' },
  createMust: { may: BREWERS, good: 201, path: () => '/musts', body: () => ({ sheet: sheet() }) },
  getMust: { may: EVERYBODY, good: 200, names: true, path: (t) => `/musts/${t.mustId}` },
  updateMust: { may: BREWERS, good: 200, names: true, path: (t) => `/musts/${t.mustId}`, body: () => ({ sheet: sheet(), base_version: 1, change_note: 'again' }) },
  copyMust: { may: BREWERS, good: 201, names: true, path: (t) => `/musts/${t.mustId}/copy`, body: () => ({ name: 'Copy', change_note: 'less sugar' }) },
  archiveMust: { may: BREWERS, good: 204, names: true, path: (t) => `/musts/${t.mustId}` },
  getBatchProposal: { may: EVERYBODY, good: 200, names: true, path: (t) => `/musts/${t.mustId}/batch-proposal` },
  reckonMust: { may: EVERYBODY, good: 200, path: () => '/musts/reckon', body: () => ({ sheet: sheet() }) },
  scaleMust: { may: EVERYBODY, good: 200, path: () => '/musts/scale', body: () => ({ sheet: sheet(), fill_l: 9 }) },
  solveMust: { may: EVERYBODY, good: 200, path: () => '/musts/solve', body: () => ({ sheet: aSheet({ lines: [aLine('apple-juice', 4, 'L'), aLine('table-sugar', 50, 'g')] }), line: 'table-sugar', wanted: { original: 1.06 } }) },
  updateEntry: { may: NOT_GUESTS, good: 200, names: true, path: (t) => `/batches/${t.finishedId}/entries/${t.ownEntryId}`, body: () => ({ text: 'corrected' }) },
  listRevisions: { may: EVERYBODY, good: 200, names: true, path: (t) => `/batches/${t.finishedId}/entries/${t.ownEntryId}/revisions` },
  getDrink: { may: EVERYBODY, good: 200, names: true, path: (t) => `/batches/${t.finishedId}/drink` },
  rackBatch: { may: BREWERS, good: 201, names: true, path: (t) => `/batches/${t.finishedId}/rack`, body: () => ({ at: at(), left_l: 0.2 }) },
  topUpBatch: { may: BREWERS, good: 201, names: true, path: (t) => `/batches/${t.finishedId}/top-up`, body: () => ({ at: at(), top_up: { what: 'water', volume_l: 0.1 } }) },
  splitBatch: { may: BREWERS, good: 201, names: true, path: (t) => `/batches/${t.finishedId}/split`, body: () => ({ at: at(), parts: [{ name: 'Half', volume_l: 1, vessel_l: 2 }] }) },
  blendBatches: { may: BREWERS, good: 201, names: true, path: () => '/blends', body: (t) => ({ at: at(), parts: [{ batch_id: t.finishedId, volume_l: 1 }], into_batch_id: t.otherBatchId }) },
  getFamily: { may: EVERYBODY, good: 200, names: true, path: (t) => `/batches/${t.finishedId}/family` },
  listFinings: { may: EVERYBODY, good: 200, names: true, path: (t) => `/batches/${t.finishedId}/finings` },
  startFining: { may: BREWERS, good: 201, names: true, path: (t) => `/batches/${t.finishedId}/finings`, body: () => ({ at: at(), fining: 'bentonite' }) },
  secondDose: { may: NOT_GUESTS, good: 200, names: true, path: (t) => `/finings/${t.finingId}/second`, body: () => ({ at: at() }) },
  listJobs: { may: NOT_GUESTS, good: 200, path: () => '/jobs' },
  createJob: { may: NOT_GUESTS, good: 201, path: () => '/jobs', body: () => ({ title: 'Look', due_at: at() }) },
  updateJob: { may: NOT_GUESTS, good: 200, names: true, path: (t) => `/jobs/${t.jobId}`, body: () => ({ title: 'Look again' }) },
  dropJob: { may: NOT_GUESTS, good: 204, names: true, path: (t) => `/jobs/${t.jobId}` },
  doJob: { may: NOT_GUESTS, good: 200, names: true, path: (t) => `/jobs/${t.jobId}/done`, body: () => ({}) },
  undoJob: { may: NOT_GUESTS, good: 200, names: true, path: (t) => `/jobs/${t.jobId}/undo` },
  takeJob: { may: NOT_GUESTS, good: 200, names: true, path: (t) => `/jobs/${t.jobId}/take`, body: () => ({}) },
  snoozeJob: { may: NOT_GUESTS, good: 200, names: true, path: (t) => `/jobs/${t.jobId}/snooze`, body: () => ({ until: isoAt(Date.now() + 3_600_000) }) },
  getCalendar: { may: NOT_GUESTS, good: 200, path: () => '/calendar' },
  makeCalendar: { may: NOT_GUESTS, good: 201, path: () => '/calendar' },
  endCalendar: { may: NOT_GUESTS, good: 204, path: () => '/calendar' },
  getBench: { may: EVERYBODY, good: 200, names: true, path: (t) => `/batches/${t.finishedId}/bench` },
  judgeBench: { may: EVERYBODY, good: 200, names: true, path: (t) => `/batches/${t.finishedId}/bench`, body: bench },
  bottleBatch: { may: BREWERS, good: 201, names: true, path: (t) => `/batches/${t.finishedId}/bottle`, body: () => ({ ...bench(), at: at() }) },
  listLots: { may: EVERYBODY, good: 200, path: () => '/lots' },
  exportLots: { may: EVERYBODY, good: 200, path: () => '/lots.csv' },
  getLot: { may: EVERYBODY, good: 200, names: true, path: (t) => `/lots/${t.lotId}` },
  updateLot: { may: BREWERS, good: 200, names: true, path: (t) => `/lots/${t.lotId}`, body: () => ({ name: 'Renamed' }) },
  liftCaution: { may: BREWERS, good: 200, names: true, path: (t) => `/lots/${t.lotId}/lift-caution`, body: () => ({ reason: 'Three test bottles since, none of them gushed.' }) },
  moveBottles: { may: NOT_GUESTS, good: 200, names: true, path: (t) => `/lots/${t.lotId}/move`, body: (t) => ({ bottle_id: t.bottleId, from_place_id: null, to_place_id: t.placeId, count: 1 }) },
  openBottles: { may: NOT_GUESTS, good: 201, names: true, path: (t) => `/lots/${t.lotId}/openings`, body: (t) => ({ at: at(), kind: 'opened', bottle_id: t.bottleId, place_id: null }) },
  undoOpening: { may: NOT_GUESTS, good: 204, names: true, path: (t) => `/lots/${t.lotId}/openings/${t.openingId}` },
  listPlaces: { may: EVERYBODY, good: 200, path: () => '/places' },
  createPlace: { may: BREWERS, good: 201, path: () => '/places', body: () => ({ name: 'attic' }) },
  updatePlace: { may: BREWERS, good: 200, names: true, path: (t) => `/places/${t.placeId}`, body: () => ({ capacity: 12 }) },
  removePlace: { may: BREWERS, good: 204, names: true, path: (t) => `/places/${t.emptyPlaceId}` },
  listTastings: { may: EVERYBODY, good: 200, names: true, path: (t) => `/lots/${t.lotId}/tastings` },
  createTasting: { may: EVERYBODY, good: 201, names: true, path: (t) => `/lots/${t.lotId}/tastings`, body: () => ({ at: at(), score: 6 }) },
  removeTasting: { may: EVERYBODY, good: 204, names: true, path: (t) => `/tastings/${t.tastingId}` },
  listShares: { may: BREWERS, good: 200, path: () => '/shares' },
  listBatchShares: { may: BREWERS, good: 200, names: true, path: (t) => `/batches/${t.finishedId}/shares` },
  createShare: { may: BREWERS, good: 201, names: true, path: (t) => `/batches/${t.finishedId}/shares`, body: () => ({}) },
  revokeShare: { may: BREWERS, good: 204, names: true, path: (t) => `/shares/${t.shareId}` },
  getLabelFacts: { may: EVERYBODY, good: 200, names: true, path: (t) => `/lots/${t.lotId}/label` },
  printLabels: { may: BREWERS, good: 200, names: true, path: (t) => `/lots/${t.lotId}/labels.pdf?count=1` },
  compareBatches: { may: EVERYBODY, good: 200, names: true, path: (t) => `/compare?batches=${t.finishedId}` },
};
