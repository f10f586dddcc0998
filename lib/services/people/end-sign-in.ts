import { Op } from 'sequelize';
import { inTransaction } from '@/db/client';
import { SignIn } from '@/db/models';
import { NotFoundError } from '@/lib/errors';
import { audit } from '../audit/write';
import { notifyAccess } from '../changes';

/**
 * Ends one open sign-in of the person; its cookie is worth nothing from now on.
 * @throws NotFoundError for another person's, or one that has ended.
 */
export async function endSignIn(personId: string, signInId: string): Promise<void> {
  await inTransaction(async (transaction) => {
    const [ended] = await SignIn.update({ endedAt: new Date() }, { where: { id: signInId, personId, endedAt: { [Op.is]: null } }, transaction });
    if (ended === 0) throw new NotFoundError('sign-in');
    await audit({ action: 'sign-in.ended', subject: signInId, personId, cellarId: null }, transaction);
    await notifyAccess(null, personId, transaction);
  });
}

/** Ends every open sign-in of the person. */
export async function endAllSignIns(personId: string): Promise<void> {
  await inTransaction(async (transaction) => {
    const [ended] = await SignIn.update({ endedAt: new Date() }, { where: { personId, endedAt: { [Op.is]: null } }, transaction });
    await audit({ action: 'sign-in.ended-all', subject: personId, personId, cellarId: null, detail: { ended } }, transaction);
    await notifyAccess(null, personId, transaction);
  });
}
