import { Op, type Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Entry, type Batch } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Action, Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { CreateEntry, EntryBody, EntryDetail, LOGGED_KINDS } from '@/lib/contracts/batches';
import { correctHydrometer } from '@/lib/core/gravity/hydrometer';
import { correctHydrometerInDrink } from '@/lib/core/gravity/hydrometer-in-drink';
import { correctBrix, gravityByRefractometer, sgOfBrix } from '@/lib/core/gravity/refractometer';
import { abvBalling } from '@/lib/core/strength/strength';
import { ConflictError, InvalidError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { loadBatch } from '../batches/load';
import { notifyChange } from '../changes';
import { ledgerOf } from '../drink/ledger';
import { broughtBy } from './brought';
import { answerJobs } from '../jobs/answer';
import { notAhead } from '../not-ahead';
import { applyEntry, neckMark, takeAsOriginal } from './effects';
import { namesOf } from './names';
import { quieten, saidThen } from './overrule';
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
  overrule: 'entries.alter',
};

/** Where the correction for temperature holds, °C. */
const CORRECTED_C = { min: 0, max: 40 };

type Measured = Pick<CreateEntry, 'kind' | 'gravity' | 'temperature_c' | 'calibrated_at_c' | 'detail'>;

/** Gravity at 20 °C as a hydrometer or, in a drink with alcohol too, a refractometer told it. */
export async function gravityOf(batch: Batch, input: Measured, transaction: Transaction): Promise<number | null> {
  const { gravity, temperature_c: sampleC, detail } = input;
  if (gravity === null && typeof detail?.brix === 'number') return byRefractometer(batch, detail.brix, sampleC, transaction);
  if (gravity === null || sampleC === null || (input.kind !== 'reading' && input.kind !== 'pitch')) return gravity;
  if (sampleC < CORRECTED_C.min || sampleC > CORRECTED_C.max) {
    throw new InvalidError('The sample is too cold or too hot for a reading.', { temperature_c: [`must be ${CORRECTED_C.min} to ${CORRECTED_C.max} °C for a reading; let the sample come nearer to 20 °C`] });
  }
  const calibratedC = input.calibrated_at_c ?? undefined;
  const strength = await strengthAt(batch, correctHydrometer(gravity, sampleC, calibratedC), transaction);
  return correctHydrometerInDrink(gravity, sampleC, strength, calibratedC);
}

/** Strength at a gravity, % vol, near enough to say how the sample widens: 0 before the pitch and where no original gravity is known. */
async function strengthAt(batch: Batch, gravity: number, transaction: Transaction): Promise<number> {
  if (batch.pitchedAt === null) return 0;
  const og = await effectiveOgOf(batch, transaction);
  return og === null ? 0 : abvBalling(og, gravity);
}

async function effectiveOgOf(batch: Batch, transaction: Transaction): Promise<number | null> {
  const entries = await Entry.findAll({ where: { batchId: batch.id, removedAt: { [Op.is]: null } }, transaction });
  return ledgerOf(batch, entries).effectiveOg;
}

async function byRefractometer(batch: Batch, shown: number, sampleC: number | null, transaction: Transaction): Promise<number> {
  const brix = sampleC === null ? shown : correctBrix(shown, sampleC);
  if (brix === null) throw new InvalidError('The sample is too cold or too warm for this table.', { temperature_c: ['must be 10 to 20 °C; leave it empty where the instrument corrects itself'] });
  if (batch.pitchedAt === null) return sgOfBrix(brix);
  const og = await effectiveOgOf(batch, transaction);
  if (og === null) throw new InvalidError('Alcohol changes what a refractometer shows.', { 'detail.brix': ['needs the original gravity of the batch; tell that first, or use a hydrometer'] });
  const gravity = gravityByRefractometer(og, brix);
  if (gravity === null) throw new InvalidError('The reading is above the original gravity.', { 'detail.brix': ['is more than the must had at the start'] });
  return gravity;
}

/** What was told in detail, with what the program made of it. */
function kept({ detail, gravity }: CreateEntry, original: boolean, said: NonNullable<EntryDetail['said']> | null, marks: EntryDetail | null): CreateEntry['detail'] {
  const { as_original_gravity: _, said: _said, neck_before: _neck, ...told } = detail ?? {};
  const made = { ...told, ...(typeof told.brix === 'number' && gravity === null && { instrument: 'refractometer' as const }), ...(original && { as_original_gravity: true }), ...(said && { said }), ...marks };
  return Object.keys(made).length > 0 ? made : null;
}

/**
 * Logs what happened to a batch, once: the same `client_id` again answers the
 * entry that is there. A hydrometer reading is kept as read and corrected to 20 °C.
 */
export async function createEntry(actor: Actor, batchId: string, input: CreateEntry, clock: Clock = systemClock): Promise<EntryBody> {
  authorize(actor, ACTION[input.kind]);
  const at = notAhead(input.at, clock.now());

  return inTransaction(async (transaction) => {
    // The lock makes the same entry sent twice at once wait for the first.
    const batch = await loadBatch(actor.cellarId, batchId, transaction);
    const known = input.client_id === null ? null : await Entry.findOne({ where: { cellarId: actor.cellarId, clientId: input.client_id }, transaction });
    if (known && known.batchId !== batchId) throw new ConflictError('This entry was sent for another batch.');
    const entry = known ?? (await write());
    return presentEntry(entry, actor, await namesOf([entry.personId], transaction));

    async function write(): Promise<Entry> {
      const marks = input.neck === null ? null : await neckMark(batch, transaction);
      await applyEntry(batch, input, transaction);
      const gravity = await gravityOf(batch, input, transaction);
      const said = input.kind === 'overrule' && input.detail?.call ? await saidThen(batch, input.detail.call, transaction) : null;
      const original = await takeAsOriginal(batch, { kind: input.kind, at, gravity, detail: input.detail }, transaction);
      const { sugarG, fruitG } = await broughtBy(actor, input, transaction);
      const created = await Entry.create(
        {
          cellarId: actor.cellarId,
          batchId,
          kind: input.kind,
          at,
          text: input.text,
          gravity,
          gravityRead: input.gravity,
          temperatureC: input.temperature_c,
          calibratedAtC: input.calibrated_at_c,
          neck: input.neck,
          volumeL: input.volume_l,
          sugarG,
          fruitG,
          detail: kept(input, original, said, marks),
          personId: actor.personId,
          clientId: input.client_id,
        },
        { transaction },
      );
      // The times that the database writes by itself.
      await created.reload({ transaction });
      if (said && input.detail?.call) await quieten(actor, batch, input.detail.call, input.text, new Date(clock.now()), transaction);
      await answerJobs(actor, batch, created, new Date(clock.now()), transaction);
      await auditBy(actor, 'entry.created', created.id, { batch: batchId, kind: input.kind }, transaction);
      await notifyChange({ cellar: actor.cellarId, kind: 'entry', batch: batchId }, transaction);
      return created;
    }
  });
}
