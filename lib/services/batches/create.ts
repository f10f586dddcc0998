import { inTransaction } from '@/db/client';
import { Batch, Entry } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { BatchBody, CreateBatch } from '@/lib/contracts/batches';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { loadVersionById } from '../musts/load';
import { notAhead } from '../not-ahead';
import { loadSensor, placeSensor } from '../sensors/place';
import { getBatch } from './get';

/** Starts a batch. A pitch is also the first line of its log; a sensor counts from the pitch on. */
export async function createBatch(actor: Actor, input: CreateBatch, clock: Clock = systemClock): Promise<BatchBody> {
  authorize(actor, 'batches.create');
  if (input.sensor !== null) authorize(actor, 'sensors.assign');
  const now = clock.now();
  const pitchedAt = input.pitched_at === null ? null : notAhead(input.pitched_at, now, 'pitched_at', 'lies ahead; leave it empty and log the pitch when it is done');

  return inTransaction(async (transaction) => {
    if (input.must_version_id !== null) await loadVersionById(actor.cellarId, input.must_version_id, transaction);
    const batch = await Batch.create(
      {
        cellarId: actor.cellarId,
        name: input.name,
        kind: input.kind,
        drinkColour: input.drink_colour,
        vesselKind: input.vessel_kind,
        tag: input.tag,
        place: input.place,
        volumeL: input.volume_l,
        vesselL: input.vessel_l,
        neck: input.neck,
        pitchedAt,
        originalGravity: input.original_gravity,
        yeast: input.yeast,
        attenuationMinPercent: input.attenuation_min_percent,
        attenuationMaxPercent: input.attenuation_max_percent,
        alcoholToleranceAbv: input.alcohol_tolerance_abv,
        temperatureMinC: input.temperature_min_c,
        temperatureMaxC: input.temperature_max_c,
        mustVersionId: input.must_version_id,
        createdBy: actor.personId,
      },
      { transaction },
    );
    if (pitchedAt) {
      await Entry.create(
        { cellarId: actor.cellarId, batchId: batch.id, kind: 'pitch', at: pitchedAt, gravity: input.original_gravity, gravityRead: input.original_gravity, neck: input.neck, volumeL: input.volume_l, personId: actor.personId },
        { transaction },
      );
    }
    if (input.sensor !== null) {
      const sensor = await loadSensor(actor.cellarId, input.sensor, transaction);
      const changed = await placeSensor(sensor, batch.id, { at: pitchedAt ?? new Date(now), said: false, now: new Date(now) }, transaction);
      for (const id of changed) await notifyChange({ cellar: actor.cellarId, kind: 'sensor', batch: id }, transaction);
    }
    await auditBy(actor, 'batch.created', batch.id, { name: input.name, sensor: input.sensor, must: input.must_version_id }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'batch', batch: batch.id }, transaction);
    return getBatch(actor, batch.id, transaction);
  });
}
