import { z } from 'zod';
import { acknowledgeAlert, alertList, alertQuery, alertSchema, resolveAlert } from './alerts';
import { assessmentQuery, assessmentSchema, judgementSchema, verdictChangeList } from './assessment';
import { batchList, batchQuery, batchSchema, createBatch, createEntry, entryList, entrySchema, seriesAnswer, seriesQuery, shelfQuery, shelfSchema, updateBatch } from './batches';
import { id, pageQuery } from './common';
import { byId, endpoint, type Endpoint } from './endpoint';
import { endpointsAfter } from './endpoints-after';
import { endpointsBefore } from './endpoints-before';
import { endpointsPeople } from './endpoints-people';
import { endpointsData } from './endpoints-data';
import { endpointsSensors } from './endpoints-sensors';
import { endpointsMessages } from './endpoints-messages';
import { chooseCellar, meSchema, memberList, signInList } from './people';
import { createdSensorSchema, createSensor, refusedList, sensorList, sensorSchema, updateSensor } from './sensors';
import { reading, telemetryResult } from './telemetry';

export type { Access, Endpoint } from './endpoint';

/** A sensor's identifier is not a UUID. */
const bySensor = z.object({ id: z.string().regex(/^[a-z0-9-]{4,64}$/) });

/** The whole web API: the routes check requests by it, OpenAPI is made from it, the role tests walk through it. */
export const endpoints = {
  getMe: endpoint({ method: 'GET', path: '/me', summary: 'Who is signed in, in which cellar, and what they may do', access: 'member', response: meSchema, status: 200 }),
  listSignIns: endpoint({ method: 'GET', path: '/sign-ins', summary: 'The person’s open sign-ins', access: 'person', response: signInList, status: 200 }),
  endAllSignIns: endpoint({ method: 'DELETE', path: '/sign-ins', summary: 'Sign out everywhere', access: 'person', response: null, status: 204 }),
  endSignIn: endpoint({ method: 'DELETE', path: '/sign-ins/{id}', summary: 'End one sign-in', access: 'person', params: byId, response: null, status: 204 }),
  listMembers: endpoint({ method: 'GET', path: '/members', summary: 'Who shares the cellar', access: 'members.read', response: memberList, status: 200 }),
  chooseCellar: endpoint({ method: 'POST', path: '/cellars/active', summary: 'Show another of the person’s cellars', access: 'person', body: chooseCellar, response: null, status: 204 }),

  getShelf: endpoint({ method: 'GET', path: '/shelf', summary: 'Every vessel at work with its curve, forecast and calls', access: 'batches.read', query: shelfQuery, response: shelfSchema, status: 200 }),
  listBatches: endpoint({ method: 'GET', path: '/batches', summary: 'Batches, newest first', access: 'batches.read', query: batchQuery, response: batchList, status: 200 }),
  createBatch: endpoint({ method: 'POST', path: '/batches', summary: 'Start a batch', access: 'batches.create', body: createBatch, response: batchSchema, status: 201 }),
  getBatch: endpoint({ method: 'GET', path: '/batches/{id}', summary: 'One batch', access: 'batches.read', params: byId, response: batchSchema, status: 200 }),
  updateBatch: endpoint({ method: 'PATCH', path: '/batches/{id}', summary: 'Change a batch, end it or open it again', access: 'batches.update', params: byId, body: updateBatch, response: batchSchema, status: 200 }),
  getSeries: endpoint({ method: 'GET', path: '/batches/{id}/series', summary: 'The sensor’s readings, thinned with their extremes kept', access: 'batches.read', params: byId, query: seriesQuery, response: seriesAnswer, status: 200 }),
  getAssessment: endpoint({ method: 'GET', path: '/batches/{id}/assessment', summary: 'The judgement now, or as it was known at a past time', access: 'batches.read', params: byId, query: assessmentQuery, response: assessmentSchema, status: 200 }),
  getJudgement: endpoint({ method: 'GET', path: '/batches/{id}/judgement', summary: 'The judgement with its fitted curve, forecast and gas', access: 'batches.read', params: byId, query: assessmentQuery, response: judgementSchema, status: 200 }),
  listVerdictChanges: endpoint({ method: 'GET', path: '/batches/{id}/assessments', summary: 'Past judgements, each kept when a verdict changed, newest first', access: 'batches.read', params: byId, query: pageQuery, response: verdictChangeList, status: 200 }),
  listEntries: endpoint({ method: 'GET', path: '/batches/{id}/entries', summary: 'The log of a batch, newest first', access: 'batches.read', params: byId, query: pageQuery, response: entryList, status: 200 }),
  createEntry: endpoint({ method: 'POST', path: '/batches/{id}/entries', summary: 'Log what happened to a batch', access: 'entries.create', params: byId, body: createEntry, response: entrySchema, status: 201 }),
  removeEntry: endpoint({ method: 'DELETE', path: '/batches/{id}/entries/{entryId}', summary: 'Take an entry back', access: 'entries.remove-own', params: z.object({ id, entryId: id }), response: null, status: 204 }),

  listSensors: endpoint({ method: 'GET', path: '/sensors', summary: 'The cellar’s sensors', access: 'sensors.read', query: pageQuery, response: sensorList, status: 200 }),
  createSensor: endpoint({ method: 'POST', path: '/sensors', summary: 'Make a sensor; the answer holds its secret, once', access: 'sensors.manage', body: createSensor, response: createdSensorSchema, status: 201 }),
  getSensor: endpoint({ method: 'GET', path: '/sensors/{id}', summary: 'One sensor', access: 'sensors.read', params: bySensor, response: sensorSchema, status: 200 }),
  updateSensor: endpoint({ method: 'PATCH', path: '/sensors/{id}', summary: 'Put a sensor in a batch or take it out; rename it or switch it off', access: 'sensors.assign', params: bySensor, body: updateSensor, response: sensorSchema, status: 200 }),
  listRefusals: endpoint({ method: 'GET', path: '/sensors/{id}/refusals', summary: 'What a sensor sent that was not taken, and why', access: 'sensors.read', params: bySensor, response: refusedList, status: 200 }),

  listAlerts: endpoint({ method: 'GET', path: '/alerts', summary: 'Alerts, open ones first', access: 'alerts.read', query: alertQuery, response: alertList, status: 200 }),
  acknowledgeAlert: endpoint({ method: 'POST', path: '/alerts/{id}/acknowledge', summary: 'Take an alert in hand', access: 'alerts.acknowledge', params: byId, body: acknowledgeAlert, response: alertSchema, status: 200 }),
  resolveAlert: endpoint({ method: 'POST', path: '/alerts/{id}/resolve', summary: 'Clear an alert', access: 'alerts.resolve', params: byId, body: resolveAlert, response: alertSchema, status: 200 }),

  ...endpointsBefore,
  ...endpointsAfter,
  ...endpointsPeople,
  ...endpointsSensors,
  ...endpointsData,
  ...endpointsMessages,

  streamEvents: endpoint({ method: 'GET', path: '/events', summary: 'Server-sent events: `change` says what to ask for again, `beat` that the line is up', access: 'batches.read', response: null, status: 200 }),
  postTelemetry: endpoint({ method: 'POST', path: '/telemetry', summary: 'Readings of a sensor, as over MQTT; also SenML JSON (RFC 8428)', access: 'sensor', body: z.union([reading, z.array(reading).max(500)]), response: telemetryResult, status: 202 }),
  getOpenApi: endpoint({ method: 'GET', path: '/openapi.json', summary: 'This description', access: 'anyone', response: null, status: 200 }),
} as const satisfies Record<string, Endpoint>;

export type EndpointName = keyof typeof endpoints;
