import { Op, type Attributes, type Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Entry, type Batch } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import { createBatch as batchForm, type BatchBody, type UpdateBatch } from '@/lib/contracts/batches';
import { InvalidError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { neckMark } from '../entries/effects';
import { notAhead } from '../not-ahead';
import { takeOut } from '../sensors/place';
import { getBatch } from './get';
import { loadBatch } from './load';
import { sentencesOf } from '@/lib/contracts/issues';

/** Field of the form to column. */
const COLUMNS = {
  name: 'name',
  kind: 'kind',
  drink_colour: 'drinkColour',
  vessel_kind: 'vesselKind',
  tag: 'tag',
  place: 'place',
  volume_l: 'volumeL',
  vessel_l: 'vesselL',
  neck: 'neck',
  original_gravity: 'originalGravity',
  yeast: 'yeast',
  attenuation_min_percent: 'attenuationMinPercent',
  attenuation_max_percent: 'attenuationMaxPercent',
  alcohol_tolerance_abv: 'alcoholToleranceAbv',
  temperature_min_c: 'temperatureMinC',
  temperature_max_c: 'temperatureMaxC',
} as const satisfies Partial<Record<keyof UpdateBatch, keyof Batch>>;

/** What the form gives, by column; what it leaves out is left alone. */
function columnsOf(input: UpdateBatch): Partial<Attributes<Batch>> {
  const given = (Object.keys(COLUMNS) as Array<keyof typeof COLUMNS>).filter((field) => input[field] !== undefined);
  return Object.fromEntries(given.map((field) => [COLUMNS[field], input[field]]));
}

/** A change of one end of a span is right or wrong only beside what is kept of the other. */
function checkWhole(batch: Batch): void {
  const whole = Object.fromEntries(Object.entries(COLUMNS).map(([field, column]) => [field, batch[column]]));
  const checked = batchForm.safeParse(whole);
  if (checked.success) return;
  throw new InvalidError('Some values do not fit together.', sentencesOf(checked.error.issues));
}

/** Changes a batch, ends it (its sensor comes out) or opens it again. A change of neck or pitch is logged as such. */
export async function updateBatch(actor: Actor, id: string, input: UpdateBatch, clock: Clock = systemClock): Promise<BatchBody> {
  authorize(actor, 'batches.update');
  const now = new Date(clock.now());
  return inTransaction(async (transaction) => {
    const batch = await loadBatch(actor.cellarId, id, transaction);
    const before = batch.neck;
    batch.set(columnsOf(input));
    checkWhole(batch);
    if (input.pitched_at !== undefined) await movePitch(actor, batch, input.pitched_at, now, transaction);
    if (batch.neck !== before) await Entry.create({ cellarId: actor.cellarId, batchId: id, kind: 'neck', at: now, neck: batch.neck, detail: await neckMark({ id, neck: before }, transaction), personId: actor.personId }, { transaction });
    if (input.state !== undefined && input.state !== batch.state) {
      batch.set({ state: input.state, endedAt: input.state === 'ended' ? now : null });
      if (input.state === 'ended') await takeOut({ batchId: id }, now, transaction);
    }
    batch.set('updatedAt', now);
    await batch.save({ transaction });
    await auditBy(actor, 'batch.updated', id, { ...input }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'batch', batch: id }, transaction);
    return getBatch(actor, id, transaction);
  });
}

/** The pitch is a line of the log: it moves there, appears there, or is taken back there. */
async function movePitch(actor: Actor, batch: Batch, to: string | null, now: Date, transaction: Transaction): Promise<void> {
  const at = to === null ? null : notAhead(to, now.getTime(), 'pitched_at');
  batch.set('pitchedAt', at);
  const entry = await Entry.findOne({ where: { batchId: batch.id, kind: 'pitch', removedAt: { [Op.is]: null } }, order: [['at', 'DESC']], transaction });
  if (entry && at) await entry.update({ at }, { transaction });
  else if (entry) await entry.update({ removedAt: now, removedBy: actor.personId }, { transaction });
  else if (at) await Entry.create({ cellarId: actor.cellarId, batchId: batch.id, kind: 'pitch', at, gravity: batch.originalGravity, gravityRead: batch.originalGravity, neck: batch.neck, volumeL: batch.volumeL, personId: actor.personId }, { transaction });
}
