import { Op } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Entry, EntryRevision } from '@/db/models';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import { checkEntry, LOGGED_KINDS, type EntryBody, type RevisionList, type UpdateEntry } from '@/lib/contracts/batches';
import { partOfWork } from '@/lib/contracts/work';
import { ConflictError, ForbiddenError, InvalidError, NotFoundError, type FieldErrors } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { loadBatch } from '../batches/load';
import { notifyChange } from '../changes';
import { iso } from '../iso';
import { notAhead } from '../not-ahead';
import { gravityOf } from './create';
import { broughtBy } from './brought';
import { followOriginal, settleBatch } from './effects';
import { namesOf } from './names';
import { mayRemove, presentEntry } from './present';

export type Before = RevisionList['items'][number]['before'];

/** What an entry says now, as a revision keeps it. */
function before(entry: Entry): Before {
  return {
    at: iso(entry.at),
    text: entry.text,
    gravity: entry.gravity,
    gravity_read: entry.gravityRead,
    temperature_c: entry.temperatureC,
    neck: entry.neck,
    volume_l: entry.volumeL,
    sugar_g: entry.sugarG,
    fruit_g: entry.fruitG,
    detail: (entry.detail ?? null) as Before['detail'],
  };
}

/** Corrects an entry. What it said before is kept, and the batch stands as the corrected log says. */
export async function updateEntry(actor: Actor, batchId: string, entryId: string, input: UpdateEntry, clock: Clock = systemClock): Promise<EntryBody> {
  authorize(actor, 'entries.remove-own');
  const now = new Date(clock.now());
  const at = input.at === undefined ? undefined : notAhead(input.at, now.getTime());
  return inTransaction(async (transaction) => {
    const batch = await loadBatch(actor.cellarId, batchId, transaction);
    const entry = await Entry.findOne({ where: { id: entryId, batchId, removedAt: { [Op.is]: null } }, transaction });
    if (!entry) throw new NotFoundError('entry');
    if (!mayRemove(actor, entry)) throw new ForbiddenError('You can correct only what you logged yourself.');
    const work = partOfWork(entry);
    if (work && Object.keys(input).some((field) => field !== 'text')) throw new ConflictError(`This line is part of ${work}: only its words can be corrected.`);

    const was = before(entry);
    const then = { kind: entry.kind, neck: entry.neck, volumeL: entry.volumeL, gravity: entry.gravity, detail: entry.detail };
    const kind = LOGGED_KINDS.find((item) => item === entry.kind);
    const read = input.gravity !== undefined ? input.gravity : entry.gravityRead;
    const temperature = input.temperature_c !== undefined ? input.temperature_c : entry.temperatureC;
    const calibrated = input.calibrated_at_c !== undefined ? input.calibrated_at_c : entry.calibratedAtC;
    // What the program made of it is not the writer's to change.
    const detail = input.detail === undefined ? was.detail : withMarks(input.detail, was.detail);
    const remeasured = input.gravity !== undefined || input.temperature_c !== undefined || input.calibrated_at_c !== undefined || input.detail !== undefined;
    entry.set({
      at: at ?? entry.at,
      text: input.text !== undefined ? input.text : entry.text,
      gravityRead: read,
      temperatureC: temperature,
      calibratedAtC: calibrated,
      neck: input.neck !== undefined ? input.neck : entry.neck,
      volumeL: input.volume_l !== undefined ? input.volume_l : entry.volumeL,
      sugarG: input.sugar_g !== undefined ? input.sugar_g : entry.sugarG,
      fruitG: input.fruit_g !== undefined ? input.fruit_g : entry.fruitG,
      detail,
      revisedAt: now,
    });
    if (kind && remeasured) entry.set('gravity', await gravityOf(batch, { kind, gravity: read, temperature_c: temperature, calibrated_at_c: calibrated, detail }, transaction));
    // Sugar that was reckoned from what was weighed is reckoned anew.
    if (kind && input.detail !== undefined && input.sugar_g === undefined && input.fruit_g === undefined && (detail?.ingredient || was.detail?.ingredient)) {
      entry.set(await broughtBy(actor, { kind, sugar_g: null, fruit_g: null, detail }, transaction));
    }
    check(entry);
    if ((entry.volumeL ?? 0) > batch.vesselL) throw new InvalidError('The vessel cannot hold it.', { volume_l: [`the vessel holds ${batch.vesselL} L`] });
    await EntryRevision.create({ cellarId: actor.cellarId, entryId, at: now, personId: actor.personId, before: was }, { transaction });
    await entry.save({ transaction });
    for (const changed of [then, entry]) await settleBatch(batch, changed, transaction);
    await followOriginal(batch, then, entry.gravity, transaction);
    await auditBy(actor, 'entry.updated', entryId, { batch: batchId, kind: entry.kind, fields: Object.keys(input) }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'entry', batch: batchId }, transaction);
    return presentEntry(entry, actor, await namesOf([entry.personId], transaction));
  });
}

function withMarks(detail: Before['detail'], was: Before['detail']): Before['detail'] {
  const { as_original_gravity: _, said: _said, neck_before: _neck, ...told } = detail ?? {};
  const marks = { ...(was?.as_original_gravity && { as_original_gravity: true }), ...(was?.said && { said: was.said }), ...(was?.neck_before && { neck_before: was.neck_before }) };
  return detail || Object.keys(marks).length > 0 ? { ...told, ...marks } : null;
}

/** What it says after the correction has to make sense as if it were written anew. */
function check(entry: Entry): void {
  const fields: FieldErrors = {};
  const kind = LOGGED_KINDS.find((item) => item === entry.kind);
  if (!kind) return;
  const detail = (entry.detail ?? null) as Before['detail'];
  checkEntry({ kind, text: entry.text, gravity: entry.gravity, neck: entry.neck, volume_l: entry.volumeL, sugar_g: entry.sugarG, fruit_g: entry.fruitG, detail }, (path, message) => (fields[path] ??= []).push(message));
  if (Object.keys(fields).length > 0) throw new InvalidError('The corrected entry says too little.', fields);
}
