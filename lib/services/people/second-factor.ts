import QRCode from 'qrcode';
import type { Transaction } from 'sequelize';
import { inTransaction } from '@/db/client';
import { Person, RecoveryCode } from '@/db/models';
import { hashRecoveryCode, makeRecoveryCodes, makeTotpSecret, openTotp, recoveryCodeWords, sealTotp, totpStep, totpWords } from '@/lib/auth/second-factor';
import { ownTriesOf } from '@/lib/auth/throttle';
import { systemClock, type Clock } from '@/lib/clock';
import { ConflictError, InvalidError } from '@/lib/errors';
import { currentOrigin } from '@/lib/origin';
import { audit } from '../audit/write';
import { oweNotice } from '../letters/owe';
import { confirmedPerson, requireSecondFactor } from './verify';

/** A secret for an authenticator. Nothing asks for it before a first code has shown that it arrived there. */
export async function beginSecondFactor(personId: string, passphrase: string): Promise<{ secret: string; uri: string; qr_svg: string }> {
  const person = await confirmedPerson(personId, passphrase);
  if (person.totpConfirmedAt) throw new ConflictError('The second factor is on already. Take it off first.');
  const secret = makeTotpSecret();
  await person.update({ totpSealed: sealTotp(secret, personId), totpLastStep: null });
  const words = totpWords(secret, person.email);
  return { ...words, qr_svg: await QRCode.toString(words.uri, { type: 'svg', errorCorrectionLevel: 'M', margin: 4 }) };
}

/** Turns the second factor on. @returns the recovery codes, shown this once. @throws InvalidError for a wrong code. */
export async function confirmSecondFactor(personId: string, code: string, clock: Clock = systemClock): Promise<{ recovery_codes: string[] }> {
  const tries = ownTriesOf(personId, currentOrigin()?.address ?? 'unknown');
  await tries.begin();
  const now = clock.now();
  const answer = await inTransaction(async (transaction) => {
    const person = await Person.findByPk(personId, { transaction, lock: transaction.LOCK.UPDATE, rejectOnEmpty: true });
    if (person.totpConfirmedAt || !person.totpSealed) throw new ConflictError('There is no second factor waiting to be confirmed.');
    const step = totpStep(openTotp(person.totpSealed, personId), code, now, null);
    if (step === null) throw new InvalidError('The code does not fit. Nothing was changed.', { code: ['does not fit; look whether the clocks of phone and server agree'] });
    await person.update({ totpConfirmedAt: new Date(now), totpLastStep: step }, { transaction });
    await audit({ action: 'second-factor.on', subject: personId, personId, cellarId: null }, transaction);
    await oweNotice(person, 'second-factor-on', `${personId}:${now}`, new Date(now), transaction);
    return { recovery_codes: await freshCodes(personId, transaction) };
  });
  await tries.right();
  return answer;
}

/** Takes the second factor off, with the passphrase and a code. */
export async function endSecondFactor(personId: string, form: { passphrase: string; code: string }, clock: Clock = systemClock): Promise<void> {
  const now = clock.now();
  const person = await confirmedPerson(personId, form.passphrase);
  if (!person.totpConfirmedAt) throw new ConflictError('There is no second factor.');
  await requireSecondFactor(personId, form.code, now);
  await inTransaction(async (transaction) => {
    await person.update({ totpSealed: null, totpConfirmedAt: null, totpLastStep: null }, { transaction });
    await RecoveryCode.destroy({ where: { personId }, transaction });
    await audit({ action: 'second-factor.off', subject: personId, personId, cellarId: null }, transaction);
    await oweNotice(person, 'second-factor-off', `${personId}:${now}`, new Date(now), transaction);
  });
}

/** New recovery codes; the old ones stop. */
export async function renewRecoveryCodes(personId: string, form: { passphrase: string; code: string }, clock: Clock = systemClock): Promise<{ recovery_codes: string[] }> {
  const person = await confirmedPerson(personId, form.passphrase);
  if (!person.totpConfirmedAt) throw new ConflictError('There is no second factor.');
  await requireSecondFactor(personId, form.code, clock.now());
  return inTransaction(async (transaction) => {
    await audit({ action: 'recovery-codes.renewed', subject: personId, personId, cellarId: null }, transaction);
    return { recovery_codes: await freshCodes(personId, transaction) };
  });
}

async function freshCodes(personId: string, transaction: Transaction): Promise<string[]> {
  const codes = makeRecoveryCodes();
  await RecoveryCode.destroy({ where: { personId }, transaction });
  await RecoveryCode.bulkCreate(
    codes.map((code) => ({ personId, codeHash: hashRecoveryCode(code) })),
    { transaction },
  );
  return codes.map(recoveryCodeWords);
}
