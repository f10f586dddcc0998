import type { Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Person, RecoveryCode } from '@/db/models';
import { passwordFits } from '@/lib/auth/passwords';
import { hashRecoveryCode, openTotp, totpStep } from '@/lib/auth/second-factor';
import { ownTriesOf } from '@/lib/auth/throttle';
import { InvalidError, NotFoundError } from '@/lib/errors';
import { currentOrigin } from '@/lib/origin';
import { oweNotice } from '../letters/owe';

/** `needed`: the account wants a code and none was given. */
export type SecondFactor = 'right' | 'needed' | 'wrong';

/**
 * Whether the second factor is shown, where the account has one. A code of the
 * authenticator or a recovery code is used up by it, in a transaction of its own.
 */
export async function secondFactorOf(personId: string, code: string | undefined, now: number): Promise<SecondFactor> {
  return inTransaction(async (transaction) => {
    const person = await Person.findByPk(personId, { transaction, lock: transaction.LOCK.UPDATE });
    if (!person?.totpConfirmedAt) return 'right';
    if (code === undefined) return 'needed';
    return (await takeCode(person, code, now, transaction)) ? 'right' : 'wrong';
  });
}

/** @returns whether the code was right; it is used up then. */
export async function takeCode(person: Person, code: string, now: number, transaction: Transaction): Promise<boolean> {
  if (person.totpSealed === null) return false;
  const step = totpStep(openTotp(person.totpSealed, person.id), code, now, person.totpLastStep);
  if (step !== null) {
    await person.update({ totpLastStep: step }, { transaction });
    return true;
  }
  const [used] = await RecoveryCode.update({ usedAt: new Date(now) }, { where: { personId: person.id, codeHash: hashRecoveryCode(code), usedAt: null }, transaction });
  if (used === 1) await oweNotice(person, 'recovery-code-used', `${person.id}:${now}`, new Date(now), transaction);
  return used === 1;
}

/**
 * The person, once they have shown the passphrase again: for what would hurt if
 * somebody sat down at an open screen (OWASP ASVS 5.0 7.5.1, from memory).
 * @throws InvalidError where it is wrong, ThrottledError after too many.
 */
export async function confirmedPerson(personId: string, passphrase: string, field = 'passphrase'): Promise<Person> {
  const tries = ownTriesOf(personId, currentOrigin()?.address ?? 'unknown');
  await tries.begin();
  const person = await Person.findByPk(personId);
  if (!person) throw new NotFoundError('account');
  if (!(await passwordFits(person.passwordHash, passphrase))) {
    const none = person.passwordHash === null ? 'you have none yet; choose one by “Forgot it?” on the sign-in page' : 'is not right';
    throw new InvalidError('The passphrase is not right. Nothing was changed.', { [field]: [none] });
  }
  await tries.right();
  return person;
}

/** @throws InvalidError where the account has a second factor and the code is not right. */
export async function requireSecondFactor(personId: string, code: string | undefined, now: number): Promise<void> {
  const shown = await secondFactorOf(personId, code, now);
  if (shown !== 'right') throw new InvalidError('The code is not right. Nothing was changed.', { code: [shown === 'needed' ? 'is needed: six digits of your authenticator' : 'is not right, or has been used already'] });
}
