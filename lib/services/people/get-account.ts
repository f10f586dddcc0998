import { AccountLink, Person, RecoveryCode } from '@/db/models';
import { soleKeptBy } from '@/db/queries/cellars';
import { systemClock, type Clock } from '@/lib/clock';
import type { AccountBody } from '@/lib/contracts/people';
import { NotFoundError } from '@/lib/errors';
import { iso } from '../iso';

/** How a person's account is secured, and what waits. */
export async function getAccount(personId: string, clock: Clock = systemClock): Promise<AccountBody> {
  const person = await Person.findByPk(personId);
  if (!person) throw new NotFoundError('account');
  const links = await AccountLink.findAll({ where: { personId, kind: ['mail-old', 'mail-new'] }, order: [['createdAt', 'DESC']], limit: 2 });
  const waiting = links.filter((link) => link.expiresAt.getTime() > clock.now());
  const confirmed = (kind: AccountLink['kind']) => waiting.some((link) => link.kind === kind && link.usedAt !== null);
  // Both used: it has changed, or was taken back.
  const open = waiting.find((link) => link.usedAt === null && link.newEmail !== null);
  return {
    email: person.email,
    has_passphrase: person.passwordHash !== null,
    second_factor: person.totpConfirmedAt && { since: iso(person.totpConfirmedAt), recovery_codes_left: await RecoveryCode.count({ where: { personId, usedAt: null } }) },
    new_mail: open ? { email: open.newEmail!, expires_at: iso(open.expiresAt), old_confirmed: confirmed('mail-old'), new_confirmed: confirmed('mail-new') } : null,
    sole_keeper_of: await soleKeptBy(personId),
  };
}
