import { inTransaction } from '@/db/client';
import { Entry } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Action, Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { CreateEntry, EntryBody, LOGGED_KINDS } from '@/lib/contracts/batches';
import { correctHydrometer } from '@/lib/core/gravity/hydrometer';
import { ConflictError, InvalidError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { loadBatch } from '../batches/load';
import { notifyChange } from '../changes';
import { applyEntry } from './effects';
import { namesOf } from './names';
import { presentEntry } from './present';

/** Looking and writing down is a hand's work; what changes the drink is the brewer's. */
const ACTION: Record<(typeof LOGGED_KINDS)[number], Action> = {
  reading: 'entries.create',
  observation: 'entries.create',
  note: 'entries.create',
  neck: 'entries.create',
  pitch: 'entries.alter',
  rack: 'entries.alter',
  addition: 'entries.alter',
  top_up: 'entries.alter',
  stabilise: 'entries.alter',
};

/** A clock that is a little ahead is no reason to refuse. */
const AHEAD_MS = 10 * 60_000;
/** Where the correction for temperature holds, °C. */
const CORRECTED_C = { min: 0, max: 40 };

function gravityOf(input: CreateEntry): number | null {
  if (input.gravity === null || input.temperature_c === null || (input.kind !== 'reading' && input.kind !== 'pitch')) return input.gravity;
  if (input.temperature_c < CORRECTED_C.min || input.temperature_c > CORRECTED_C.max) {
    throw new InvalidError('The sample is too cold or too hot for a reading.', { temperature_c: [`must be ${CORRECTED_C.min} to ${CORRECTED_C.max} °C for a reading; let the sample come nearer to 20 °C`] });
  }
  return correctHydrometer(input.gravity, input.temperature_c, input.calibrated_at_c ?? undefined);
}

/**
 * Logs what happened to a batch, once: the same `client_id` again answers the
 * entry that is there. A hydrometer reading is kept as read and corrected to 20 °C.
 */
export async function createEntry(actor: Actor, batchId: string, input: CreateEntry, clock: Clock = systemClock): Promise<EntryBody> {
  authorize(actor, ACTION[input.kind]);
  const at = new Date(input.at);
  if (at.getTime() > clock.now() + AHEAD_MS) throw new InvalidError('The time lies ahead.', { at: ['lies ahead'] });

  return inTransaction(async (transaction) => {
    // The lock makes the same entry sent twice at once wait for the first.
    const batch = await loadBatch(actor.cellarId, batchId, transaction);
    const known = input.client_id === null ? null : await Entry.findOne({ where: { cellarId: actor.cellarId, clientId: input.client_id }, transaction });
    if (known && known.batchId !== batchId) throw new ConflictError('This entry was sent for another batch.');
    const entry = known ?? (await write());
    return presentEntry(entry, actor, await namesOf([entry.personId], transaction));

    async function write(): Promise<Entry> {
      await applyEntry(batch, input, transaction);
      const created = await Entry.create(
        {
          cellarId: actor.cellarId,
          batchId,
          kind: input.kind,
          at,
          text: input.text,
          gravity: gravityOf(input),
          gravityRead: input.gravity,
          temperatureC: input.temperature_c,
          calibratedAtC: input.calibrated_at_c,
          neck: input.neck,
          volumeL: input.volume_l,
          sugarG: input.sugar_g,
          fruitG: input.fruit_g,
          detail: input.detail,
          personId: actor.personId,
          clientId: input.client_id,
        },
        { transaction },
      );
      // The times that the database writes by itself.
      await created.reload({ transaction });
      await auditBy(actor, 'entry.created', created.id, { batch: batchId, kind: input.kind }, transaction);
      await notifyChange({ cellar: actor.cellarId, kind: 'entry', batch: batchId }, transaction);
      return created;
    }
  });
}
