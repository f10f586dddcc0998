import { Op } from 'sequelize';
import { inTransaction } from '@/db/client';
import { SignIn } from '@/db/models';
import { systemClock, type Clock } from '@/lib/clock';
import { NotFoundError } from '@/lib/errors';
import { audit } from '../audit/write';
import { notifyAccess } from '../changes';

/**
 * Ends one open sign-in of the person; its cookie is worth nothing from now on.
 * @throws NotFoundError for another person's, or one that has ended.
 */
export async function endSignIn(personId: string, signInId: string, clock: Clock = systemClock): Promise<void> {
  await inTransaction(async (transaction) => {
    const [ended] = await SignIn.update({ endedAt: new Date(clock.now()) }, { where: { id: signInId, personId, endedAt: { [Op.is]: null } }, transaction });
    if (ended === 0) throw new NotFoundError('sign-in');
    await audit({ action: 'sign-in.ended', subject: signInId, personId, cellarId: null }, transaction);
    await notifyAccess(null, personId, transaction);
  });
}

/** Ends every open sign-in of the person. */
export async function endAllSignIns(personId: string, clock: Clock = systemClock): Promise<void> {
  await inTransaction(async (transaction) => {
    const [ended] = await SignIn.update({ endedAt: new Date(clock.now()) }, { where: { personId, endedAt: { [Op.is]: null } }, transaction });
    await audit({ action: 'sign-in.ended-all', subject: personId, personId, cellarId: null, detail: { ended } }, transaction);
    await notifyAccess(null, personId, transaction);
  });
}
