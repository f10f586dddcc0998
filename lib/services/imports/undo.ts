import { Op } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Assignment, Batch, ImportRun, Lot, Sensor } from '@/db/models';
import { deleteImported, heardHere } from '@/db/queries/archive';
import { deleteUnused } from '@/db/queries/imports';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { ImportBody } from '@/lib/contracts/imports';
import { ConflictError, NotFoundError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import type { Made } from './archive';
import { loadImport } from './list';

/** Takes an import out again, all of it in one step. Batches that were bottled since then are no longer the file's alone. */
export async function undoImport(actor: Actor, id: string, clock: Clock = systemClock): Promise<ImportBody> {
  authorize(actor, 'data.import');
  return inTransaction(async (transaction) => {
    const run = await ImportRun.findOne({ where: { id, cellarId: actor.cellarId }, transaction, lock: transaction.LOCK.UPDATE });
    if (!run) throw new NotFoundError('import');
    if (run.undoneAt) throw new ConflictError('This import was taken out already.');
    const batches = await Batch.findAll({ attributes: ['id'], where: { importId: id }, transaction });
    const ids = batches.map((batch) => batch.id);
    if (ids.length > 0 && (await Lot.count({ where: { batchId: ids, createdAt: { [Op.gt]: run.createdAt } }, transaction })) > 0) throw new ConflictError('Some of these batches were bottled since. Take those bottles out of the book first.');
    const stays = ids.length > 0 ? await Assignment.findAll({ attributes: ['sensorId'], where: { batchId: ids }, transaction }) : [];
    const made = { tables: {}, sensors: [], ...(run.made as Partial<Made>) };
    // What it brought is no longer the file's alone once it speaks here.
    if (await heardHere(made.sensors, transaction)) throw new ConflictError('A sensor of this import has been heard here since. Remove it first; what it measured goes with it then.');
    const files = [...stays.map((stay) => stay.sensorId), ...(run.sensorId === null ? [] : [run.sensorId])];
    const floats = await Sensor.findAll({ attributes: ['id'], where: { cellarId: actor.cellarId, [Op.or]: [{ id: made.sensors }, { kind: 'file', id: files }] }, transaction });
    for (const float of floats) await deleteImported(float.id, transaction);
    await run.update({ undoneAt: new Date(clock.now()), undoneBy: actor.personId }, { transaction });
    await Batch.destroy({ where: { id: ids }, transaction });
    await deleteUnused(made.tables, transaction);
    await Sensor.destroy({ where: { id: floats.map((float) => float.id) }, transaction });
    await auditBy(actor, 'import.undone', id, { ...run.counts }, transaction);
    for (const batch of new Set([...ids, ...(run.batchId === null ? [] : [run.batchId])])) await notifyChange({ cellar: actor.cellarId, kind: 'batch', batch }, transaction);
    return loadImport(actor, id, transaction);
  });
}
