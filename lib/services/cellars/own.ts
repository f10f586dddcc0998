import { inTransaction } from '@/db/client';
import { Cellar, Membership } from '@/db/models';
import { forgetCellar } from '@/db/queries/cellars';
import { authorize } from '@/lib/auth/authorize';
import type { Actor } from '@/lib/auth/policies';
import type { CreateCellar } from '@/lib/contracts/people';
import { ConflictError, InvalidError } from '@/lib/errors';
import { audit, auditBy } from '../audit/write';
import { notifyChange } from '../changes';
import { confirmedPerson } from '../people/verify';
import { lockCellar } from './keepers';

/** More than anybody keeps; a program that makes them without end stops here. */
const MOST_CELLARS = 20;

/** Makes a cellar that the person keeps. */
export async function createCellar(personId: string, input: CreateCellar): Promise<{ id: string }> {
  return inTransaction(async (transaction) => {
    if ((await Membership.count({ where: { personId, role: 'keeper' }, transaction })) >= MOST_CELLARS) throw new ConflictError(`A person keeps at most ${MOST_CELLARS} cellars.`);
    const cellar = await Cellar.create({ name: input.name, timeZone: input.time_zone }, { transaction });
    await Membership.create({ cellarId: cellar.id, personId, role: 'keeper' }, { transaction });
    await audit({ action: 'cellar.created', subject: cellar.id, personId, cellarId: cellar.id, detail: { name: input.name } }, transaction);
    return { id: cellar.id };
  });
}

/** Changes the cellar's name, time zone and currency. */
export async function updateCellar(actor: Actor, input: { name?: string | undefined; time_zone?: string | undefined; currency?: string | null | undefined }): Promise<void> {
  authorize(actor, 'cellar.manage');
  await inTransaction(async (transaction) => {
    const cellar = await lockCellar(actor.cellarId, transaction);
    const shown = () => ({ name: cellar.name, time_zone: cellar.timeZone, currency: cellar.currency });
    const before = shown();
    await cellar.update({ name: input.name ?? cellar.name, timeZone: input.time_zone ?? cellar.timeZone, ...(input.currency !== undefined && { currency: input.currency }) }, { transaction });
    await auditBy(actor, 'cellar.updated', cellar.id, { from: before, to: shown() }, transaction);
    await notifyChange({ cellar: cellar.id, kind: 'member', batch: null }, transaction);
  });
}

/** Deletes the cellar with its batches, log, bottles and readings, once its name is typed and the passphrase shown. Nothing brings it back. */
export async function deleteCellar(actor: Actor, form: { name: string; passphrase: string }): Promise<void> {
  authorize(actor, 'cellar.manage');
  const cellar = await Cellar.findByPk(actor.cellarId, { rejectOnEmpty: true });
  if (form.name.trim() !== cellar.name) throw new InvalidError('Type the name as it is written.', { name: ['is not the name of this cellar'] });
  await confirmedPerson(actor.personId, form.passphrase);
  await inTransaction(async (transaction) => {
    await lockCellar(actor.cellarId, transaction);
    await forgetCellar(actor.cellarId, transaction);
    await audit({ action: 'cellar.deleted', subject: actor.cellarId, personId: actor.personId, cellarId: null, detail: { name: cellar.name } }, transaction);
    await notifyChange({ cellar: actor.cellarId, kind: 'member', batch: null }, transaction);
  });
}

