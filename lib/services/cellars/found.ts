import { randomUUID } from 'node:crypto';
import { inTransaction } from '@/db/client';
import { Cellar, Invitation } from '@/db/models';
import { hashLinkToken, linkTokenOf } from '@/lib/auth/link-tokens';
import { systemClock, type Clock } from '@/lib/clock';
import { env } from '@/lib/config/env';
import { foundCellar as form, type FoundCellar } from '@/lib/contracts/people';
import { audit } from '../audit/write';

const OPEN_MS = 24 * 3_600_000;

/**
 * Makes a cellar without people and an invitation to keep it: how the first
 * person comes into an empty house. Only who runs the house can call it, from
 * its own terminal; no route leads here.
 * @returns the address to open once, within a day
 * @throws z.ZodError where the address, the name or the time zone is none
 */
export async function foundCellar(input: FoundCellar, clock: Clock = systemClock): Promise<{ url: string }> {
  const { email, name, time_zone: timeZone } = form.parse(input);
  return inTransaction(async (transaction) => {
    const cellar = await Cellar.create({ name, timeZone }, { transaction });
    const id = randomUUID();
    const token = linkTokenOf('invitation', id);
    const now = clock.now();
    await Invitation.create({ id, cellarId: cellar.id, email, role: 'keeper', tokenHash: hashLinkToken(token), invitedBy: null, createdAt: new Date(now), expiresAt: new Date(now + OPEN_MS) }, { transaction });
    await audit({ action: 'cellar.created', subject: cellar.id, personId: null, cellarId: cellar.id, detail: { name, keeper: email } }, transaction);
    return { url: `${env().PUBLIC_URL}/invitation#${token}` };
  });
}
