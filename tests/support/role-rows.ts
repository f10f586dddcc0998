import type { EndpointName } from '@/lib/contracts/endpoints';
import type { Role } from '@/lib/core/roles';
import type { DataThings } from './data-things';
import type { JobThings } from './job-things';
import type { PeopleThings } from './people-rows';

export type Who = Role | 'nobody';
export const EVERYBODY: Who[] = ['keeper', 'brewer', 'hand', 'guest'];
export const NOT_GUESTS: Who[] = ['keeper', 'brewer', 'hand'];
export const BREWERS: Who[] = ['keeper', 'brewer'];

/** One cellar's things, fresh for each request, so that one request does not decide the next. */
export interface Things extends JobThings, PeopleThings, DataThings {
  batchId: string;
  entryId: string;
  muteId: string;
  deviceId: string;
  sensorId: string;
  alertId: string;
  signInId: string;
  cellarId: string;
}

export interface RoleRow {
  /** Who may, with things of their own cellar; all others get 403, and nobody 401. */
  may: readonly Who[];
  /** What a good request answers. */
  good: number;
  /** Names a thing of a cellar: with another cellar's it is 404 for all who may. */
  names?: boolean;
  /** Who may is decided by the service, by whose the thing is: then it has to be one of the asker's own cellar. */
  byService?: boolean;
  path(things: Things): string;
  body?(things: Things): unknown;
}

export const SHELF_SPAN = 'from=2026-03-01T00:00:00Z&to=2026-03-02T00:00:00Z';

/** Written out by hand on purpose: it says what the policies should be, and is not made from them. */
export const watchRows = {
  getSurroundings: { may: EVERYBODY, good: 200, names: true, path: (t) => `/batches/${t.batchId}/surroundings` },
  getMe: { may: EVERYBODY, good: 200, path: () => '/me' },
  listSignIns: { may: EVERYBODY, good: 200, path: () => '/sign-ins' },
  endAllSignIns: { may: EVERYBODY, good: 204, path: () => '/sign-ins' },
  endSignIn: { may: EVERYBODY, good: 204, names: true, path: (t) => `/sign-ins/${t.signInId}` },
  listMembers: { may: EVERYBODY, good: 200, path: () => '/members' },
  chooseCellar: { may: EVERYBODY, good: 204, names: true, path: () => '/cellars/active', body: (t) => ({ cellar_id: t.cellarId }) },
  getShelf: { may: EVERYBODY, good: 200, path: () => `/shelf?${SHELF_SPAN}` },
  listBatches: { may: EVERYBODY, good: 200, path: () => '/batches' },
  createBatch: { may: BREWERS, good: 201, path: () => '/batches', body: () => ({ name: 'Perry', kind: 'cider', volume_l: 4, vessel_l: 5 }) },
  getBatch: { may: EVERYBODY, good: 200, names: true, path: (t) => `/batches/${t.batchId}` },
  updateBatch: { may: BREWERS, good: 200, names: true, path: (t) => `/batches/${t.batchId}`, body: () => ({ name: 'Renamed' }) },
  getSeries: { may: EVERYBODY, good: 200, names: true, path: (t) => `/batches/${t.batchId}/series` },
  getAssessment: { may: EVERYBODY, good: 200, names: true, path: (t) => `/batches/${t.batchId}/assessment` },
  getJudgement: { may: EVERYBODY, good: 200, names: true, path: (t) => `/batches/${t.batchId}/judgement` },
  listVerdictChanges: { may: EVERYBODY, good: 200, names: true, path: (t) => `/batches/${t.batchId}/assessments` },
  listEntries: { may: EVERYBODY, good: 200, names: true, path: (t) => `/batches/${t.batchId}/entries` },
  createEntry: { may: NOT_GUESTS, good: 201, names: true, path: (t) => `/batches/${t.batchId}/entries`, body: () => ({ kind: 'note', at: '2026-03-01T00:00:00Z', text: 'Smells clean.' }) },
  // The entry is somebody else's: a hand may take back only an own one (403 by the service, tested below).
  removeEntry: { may: BREWERS, good: 204, names: true, byService: true, path: (t) => `/batches/${t.batchId}/entries/${t.entryId}` },
  listSensors: { may: NOT_GUESTS, good: 200, path: () => '/sensors' },
  createSensor: { may: ['keeper'], good: 201, path: () => '/sensors', body: () => ({ name: 'Float' }) },
  getSensor: { may: NOT_GUESTS, good: 200, names: true, path: (t) => `/sensors/${t.sensorId}` },
  updateSensor: { may: BREWERS, good: 200, names: true, path: (t) => `/sensors/${t.sensorId}`, body: () => ({ batch_id: null }) },
  listRefusals: { may: NOT_GUESTS, good: 200, names: true, path: (t) => `/sensors/${t.sensorId}/refusals` },
  listAlerts: { may: NOT_GUESTS, good: 200, path: () => '/alerts' },
  acknowledgeAlert: { may: NOT_GUESTS, good: 200, names: true, path: (t) => `/alerts/${t.alertId}/acknowledge`, body: () => ({}) },
  resolveAlert: { may: NOT_GUESTS, good: 200, names: true, path: (t) => `/alerts/${t.alertId}/resolve`, body: () => ({}) },
} satisfies Partial<Record<EndpointName, RoleRow>>;
