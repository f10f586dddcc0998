import { Op } from 'sequelize';
import { Batch, Cellar, Entry } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import { loadBatch } from '../batches/load';
import { namesOf } from '../entries/names';
import { iso, isoOrNull } from '../iso';
import { partPieces } from './parts';
import { photosPieces } from './photos';
import { sensorsPieces } from './sensors';

const setupOf = (batch: Batch, names: ReadonlyMap<string, string>) => ({
  id: batch.id,
  name: batch.name,
  kind: batch.kind,
  drink_colour: batch.drinkColour,
  vessel_kind: batch.vesselKind,
  tag: batch.tag,
  place: batch.place,
  volume_l: batch.volumeL,
  vessel_l: batch.vesselL,
  neck: batch.neck,
  pitched_at: isoOrNull(batch.pitchedAt),
  original_gravity: batch.originalGravity,
  must_version: batch.mustVersionId,
  must_share: batch.mustShare,
  yeast: batch.yeast,
  attenuation_min_percent: batch.attenuationMinPercent,
  attenuation_max_percent: batch.attenuationMaxPercent,
  alcohol_tolerance_abv: batch.alcoholToleranceAbv,
  temperature_min_c: batch.temperatureMinC,
  temperature_max_c: batch.temperatureMaxC,
  state: batch.state,
  ended_at: isoOrNull(batch.endedAt),
  by: batch.createdBy === null ? null : (names.get(batch.createdBy) ?? null),
  created_at: iso(batch.createdAt),
});

async function entriesOf(batch: Batch) {
  const rows = await Entry.findAll({ where: { batchId: batch.id, removedAt: { [Op.is]: null } }, order: [['at', 'ASC'], ['createdAt', 'ASC'], ['kind', 'ASC'], ['id', 'ASC']] });
  const names = await namesOf(rows.map((row) => row.personId));
  return rows.map((row) => ({
    id: row.id,
    kind: row.kind,
    at: iso(row.at),
    text: row.text,
    gravity: row.gravity,
    gravity_read: row.gravityRead,
    temperature_c: row.temperatureC,
    calibrated_at_c: row.calibratedAtC,
    neck: row.neck,
    volume_l: row.volumeL,
    sugar_g: row.sugarG,
    fruit_g: row.fruitG,
    detail: row.detail,
    by: row.personId === null ? null : (names.get(row.personId) ?? null),
    created_at: iso(row.createdAt),
    revised_at: isoOrNull(row.revisedAt),
  }));
}

async function* pieces(cellar: Cellar, batches: readonly Batch[], batchId: string | null, now: number): AsyncGenerator<string> {
  yield `{"format":"fallbright-archive","version":1,"exported_at":"${iso(now)}","cellar":${JSON.stringify({ name: cellar.name, time_zone: cellar.timeZone, currency: cellar.currency })},"batches":[`;
  const names = await namesOf(batches.map((batch) => batch.createdBy));
  for (const [index, batch] of batches.entries()) yield `${index === 0 ? '' : ','}\n${JSON.stringify({ ...setupOf(batch, names), entries: await entriesOf(batch) })}`;
  yield ']';
  yield* partPieces(cellar.id, batchId);
  yield* sensorsPieces(cellar.id, batchId);
  yield* photosPieces(cellar.id, batchId);
  yield '}\n';
}

/** Batches to take out: one, or all of the cellar. */
export async function batchesToExport(actor: Actor, batchId: string | null): Promise<Batch[]> {
  authorize(actor, 'data.export');
  if (batchId !== null) return [await loadBatch(actor.cellarId, batchId)];
  return Batch.findAll({ where: { cellarId: actor.cellarId }, order: [['createdAt', 'ASC'], ['id', 'ASC']] });
}

/** An archive as a stream of text: a cellar of years does not fit in memory twice. */
export async function exportArchive(actor: Actor, batchId: string | null, clock: Clock = systemClock): Promise<AsyncGenerator<string>> {
  const batches = await batchesToExport(actor, batchId);
  const cellar = await Cellar.findByPk(actor.cellarId, { rejectOnEmpty: true });
  return pieces(cellar, batches, batchId, clock.now());
}
