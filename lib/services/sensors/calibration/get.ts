import { Op } from 'sequelize';
import { Assignment, CalibrationPointRow, CalibrationRow, Entry, type Sensor } from '@/db/models';
import { readingsOfBatch } from '@/db/queries/batch-readings';
import { calibrationState, pairCandidates } from '@/db/queries/calibrations';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { CalibrationBody } from '@/lib/contracts/calibration';
import { suggestOffset } from '@/lib/core/calibration/offset';
import { namesOf } from '../../entries/names';
import { iso, isoOrNull } from '../../iso';
import { loadSensor } from '../place';
import { presentPoint, presentVersion } from './present';

/** What the readings by hand of the batch it is in say of what it shows; the must itself, before the pitch, is not one of them. */
async function suggestionFor(sensor: Sensor): Promise<CalibrationBody['suggestion']> {
  const stay = await Assignment.findOne({ where: { sensorId: sensor.id, toAt: { [Op.is]: null } } });
  if (!stay) return null;
  const hands = await Entry.findAll({ where: { batchId: stay.batchId, kind: { [Op.in]: ['reading', 'note'] }, gravity: { [Op.ne]: null }, removedAt: { [Op.is]: null }, at: { [Op.gte]: stay.fromAt } } });
  if (hands.length === 0) return null;
  const readings = (await readingsOfBatch(stay.batchId)).filter((reading) => reading.at >= stay.fromAt.getTime());
  const found = suggestOffset(readings, hands.map((entry) => ({ at: entry.at.getTime(), gravity: entry.gravity! })));
  return found && { offset: found.offset, since: iso(found.since), spread: found.spread, pairs: found.pairs.map((pair) => ({ at: iso(pair.at), hand: pair.hand, float: pair.float })) };
}

/** Points, versions, what waits, and what the hydrometer says of it. */
export async function getCalibration(actor: Actor, identifier: string): Promise<CalibrationBody> {
  authorize(actor, 'sensors.read');
  const sensor = await loadSensor(actor.cellarId, identifier);
  const points = await CalibrationPointRow.findAll({ where: { sensorId: sensor.id, removedAt: { [Op.is]: null } }, order: [['inclination', 'ASC'], ['at', 'ASC']] });
  const versions = await CalibrationRow.findAll({ where: { sensorId: sensor.id }, order: [['version', 'DESC']] });
  const names = await namesOf([...points, ...versions].map((row) => row.createdBy));
  const { waiting, waitingSince, turning, last } = await calibrationState(sensor.id);
  const candidates = await pairCandidates(sensor.id);
  return {
    points: points.map((row) => presentPoint(row, names)),
    candidates: candidates.map((row) => ({ entry_id: row.entryId, at: iso(row.at), batch: row.batch, gravity: row.gravity, inclination: row.inclination, temperature: row.temperature })),
    versions: versions.map((row) => presentVersion(row, names)),
    waiting,
    waiting_since: isoOrNull(waitingSince),
    turning,
    suggestion: sensor.kind === 'float' ? await suggestionFor(sensor) : null,
    last: last && { at: iso(last.at), inclination: last.inclination, temperature: last.temperature },
  };
}
