import { z } from 'zod';
import { calibrationForm, calibrationPointForm, calibrationPointSchema, calibrationSchema, calibrationVersionSchema, offsetForm, pairForm } from './calibration';
import { id } from './common';
import { byId, endpoint } from './endpoint';
import { surroundingsSchema } from './surroundings';
import { createdSensorSchema, rawReadingList, rawReadingQuery, sensorHealthList, sensorHealthSchema, sensorLimits, sensorSchema, sensorSettingsForm, stayList } from './sensors';

/** A sensor's identifier is not a UUID. */
const bySensor = z.object({ id: z.string().regex(/^[a-z0-9-]{4,64}$/) });
const byVersion = bySensor.extend({ version: z.coerce.number().int().min(1).max(2_147_483_647) });

/** Credentials, settings, health and calibration of a sensor. */
export const endpointsSensors = {
  rotateSensor: endpoint({ method: 'POST', path: '/sensors/{id}/secret', summary: 'Give a sensor a new secret; the old one ends at once, the answer holds the new one, once', access: 'sensors.manage', params: bySensor, response: createdSensorSchema, status: 200 }),
  removeSensor: endpoint({ method: 'DELETE', path: '/sensors/{id}', summary: 'Remove a sensor; what it measured stays where it counted', access: 'sensors.manage', params: bySensor, response: null, status: 204 }),
  setSensor: endpoint({ method: 'POST', path: '/sensors/{id}/settings', summary: 'Send a reporting interval down to a sensor', access: 'sensors.manage', params: bySensor, body: sensorSettingsForm, response: sensorSchema, status: 200 }),
  getSensorHealth: endpoint({ method: 'GET', path: '/sensors/{id}/health', summary: 'Silence, gaps, cell, signal, clock, refusals, against the cellar’s limits', access: 'sensors.read', params: bySensor, response: sensorHealthSchema, status: 200 }),
  listStays: endpoint({ method: 'GET', path: '/sensors/{id}/stays', summary: 'Which batches a sensor was in, from when to when', access: 'sensors.read', params: bySensor, response: stayList, status: 200 }),
  listRawReadings: endpoint({ method: 'GET', path: '/sensors/{id}/readings', summary: 'A sensor’s latest readings as it sent them', access: 'sensors.read', params: bySensor, query: rawReadingQuery, response: rawReadingList, status: 200 }),
  getSurroundings: endpoint({ method: 'GET', path: '/batches/{id}/surroundings', summary: 'What room and foam probes beside a batch and in its place say', access: 'batches.read', params: byId, response: surroundingsSchema, status: 200 }),
  listSensorHealth: endpoint({ method: 'GET', path: '/sensor-health', summary: 'What of the cellar’s sensors is not as it should be', access: 'sensors.read', response: sensorHealthList, status: 200 }),
  getSensorLimits: endpoint({ method: 'GET', path: '/sensor-limits', summary: 'When the cellar wants to be told of its sensors', access: 'sensors.read', response: sensorLimits, status: 200 }),
  setSensorLimits: endpoint({ method: 'PATCH', path: '/sensor-limits', summary: 'Change when the cellar wants to be told of its sensors', access: 'sensors.manage', body: sensorLimits.partial(), response: sensorLimits, status: 200 }),

  getCalibration: endpoint({ method: 'GET', path: '/sensors/{id}/calibration', summary: 'Points, versions, and what the readings by hand suggest', access: 'sensors.read', params: bySensor, response: calibrationSchema, status: 200 }),
  addCalibrationPoint: endpoint({ method: 'POST', path: '/sensors/{id}/calibration/points', summary: 'Note a point: the float in a liquid of known gravity', access: 'sensors.calibrate', params: bySensor, body: calibrationPointForm, response: calibrationPointSchema, status: 201 }),
  pairCalibrationPoint: endpoint({ method: 'POST', path: '/sensors/{id}/calibration/pairs', summary: 'Take a hydrometer reading of the log as a point', access: 'sensors.calibrate', params: bySensor, body: pairForm, response: calibrationPointSchema, status: 201 }),
  removeCalibrationPoint: endpoint({ method: 'DELETE', path: '/sensors/{id}/calibration/points/{pointId}', summary: 'Strike a point out', access: 'sensors.calibrate', params: bySensor.extend({ pointId: id }), response: null, status: 204 }),
  calibrate: endpoint({ method: 'POST', path: '/sensors/{id}/calibration/versions', summary: 'Fit a curve to points and turn the readings from a time on', access: 'sensors.calibrate', params: bySensor, body: calibrationForm, response: calibrationVersionSchema, status: 201 }),
  offsetSensor: endpoint({ method: 'POST', path: '/sensors/{id}/calibration/offset', summary: 'Move what a sensor shows from a time on', access: 'sensors.calibrate', params: bySensor, body: offsetForm, response: calibrationVersionSchema, status: 201 }),
  removeCalibration: endpoint({ method: 'DELETE', path: '/sensors/{id}/calibration/versions/{version}', summary: 'Take a calibration back; its readings go to the one before', access: 'sensors.calibrate', params: byVersion, response: null, status: 204 }),
};
