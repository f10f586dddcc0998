import { inTransaction } from '@/db/client';
import { ApiToken } from '@/db/models';
import { hashApiToken, lesserRole, makeApiToken } from '@/lib/auth/api-tokens';
import { may, type Actor } from '@/lib/auth/policies';
import { systemClock, type Clock } from '@/lib/clock';
import type { CreatedToken, CreateToken, TokenBody } from '@/lib/contracts/people';
import { ConflictError, ForbiddenError, NotFoundError } from '@/lib/errors';
import { auditBy } from '../audit/write';
import { notifyAccess } from '../changes';
import { namesOf } from '../entries/names';
import { iso, isoOrNull } from '../iso';

const DAY_MS = 86_400_000;
const MOST_OPEN = 30;

/** Whose tokens of the cellar one sees and may revoke: a keeper everybody's, others their own. */
const scope = (actor: Actor) => ({ cellarId: actor.cellarId, revokedAt: null, ...(!may(actor.role, 'members.manage') && { personId: actor.personId }) });

function present(token: ApiToken, actor: Actor, names: ReadonlyMap<string, string>): TokenBody {
  return {
    id: token.id,
    name: token.name,
    role: token.role,
    person: { id: token.personId, name: names.get(token.personId) ?? '' },
    last_four: token.lastFour,
    created_at: iso(token.createdAt),
    expires_at: isoOrNull(token.expiresAt),
    last_used_at: isoOrNull(token.lastUsedAt),
    mine: token.personId === actor.personId,
  };
}

export async function listTokens(actor: Actor): Promise<{ items: TokenBody[] }> {
  const rows = await ApiToken.findAll({ where: scope(actor), order: [['createdAt', 'DESC']], limit: 200 });
  const names = await namesOf(rows.map((row) => row.personId));
  return { items: rows.map((row) => present(row, actor, names)) };
}

/** Makes a token for this cellar; the whole of it is told this once. @throws ForbiddenError for a role above the person's own. */
export async function createToken(actor: Actor, input: CreateToken, clock: Clock = systemClock): Promise<CreatedToken> {
  if (lesserRole(input.role, actor.role) !== input.role) throw new ForbiddenError(`A token does at most what you may do yourself: you are ${actor.role} here.`);
  const token = makeApiToken();
  const now = clock.now();
  return inTransaction(async (transaction) => {
    if ((await ApiToken.count({ where: { personId: actor.personId, cellarId: actor.cellarId, revokedAt: null }, transaction })) >= MOST_OPEN) throw new ConflictError(`A person has at most ${MOST_OPEN} tokens here. Revoke one first.`);
    const row = await ApiToken.create(
      {
        personId: actor.personId,
        cellarId: actor.cellarId,
        role: input.role,
        name: input.name,
        tokenHash: hashApiToken(token),
        lastFour: token.slice(-4),
        createdAt: new Date(now),
        expiresAt: input.expires_in_days === null ? null : new Date(now + input.expires_in_days * DAY_MS),
      },
      { transaction },
    );
    await row.reload({ transaction });
    await auditBy(actor, 'token.made', row.id, { name: input.name, role: input.role, last_four: row.lastFour, days: input.expires_in_days }, transaction);
    return { ...present(row, actor, await namesOf([actor.personId], transaction)), token };
  });
}

/** Revokes a token: its next request is refused, its open stream ends. */
export async function revokeToken(actor: Actor, id: string, clock: Clock = systemClock): Promise<void> {
  await inTransaction(async (transaction) => {
    const row = await ApiToken.findOne({ where: { ...scope(actor), id }, transaction, lock: transaction.LOCK.UPDATE });
    if (!row) throw new NotFoundError('token');
    await row.update({ revokedAt: new Date(clock.now()) }, { transaction });
    await auditBy(actor, 'token.revoked', id, { name: row.name, of: row.personId, last_four: row.lastFour }, transaction);
    await notifyAccess(actor.cellarId, row.personId, transaction);
  });
}
