import type { Role } from '@/lib/core/roles';
import { database } from '../client';
import { runPrepared, type Prepared } from './prepared';

export interface OpenToken {
  id: string;
  personId: string;
  cellarId: string;
  lastFour: string;
  /** The role it was made with, and the one its person has now. */
  tokenRole: Role;
  personRole: Role;
  usedS: number | null;
}

const COLUMNS = `t.id, t.person_id as "personId", t.cellar_id as "cellarId", t.last_four as "lastFour", t.role as "tokenRole", m.role as "personRole", extract(epoch from now() - t.last_used_at)::float8 as "usedS"
     from api_tokens t join memberships m on m.person_id = t.person_id and m.cellar_id = t.cellar_id`;
const OPEN = 't.revoked_at is null and (t.expires_at is null or t.expires_at > now())';

const BY_HASH: Prepared = { name: 'open-token', text: `select ${COLUMNS} where t.token_hash = $1 and ${OPEN}` };
const BY_IDS: Prepared = { name: 'open-tokens-by-id', text: `select ${COLUMNS} where t.id = any($1::uuid[]) and ${OPEN}` };

/** The token with its person's role in its cellar; none once it is revoked or expired, or the person has left. Every request of a program asks. */
export async function openToken(tokenHash: Buffer): Promise<OpenToken | null> {
  return (await runPrepared<OpenToken>(database(), BY_HASH, [tokenHash])).rows[0] ?? null;
}

/** Of many tokens those that still open anything. */
export async function openTokens(ids: readonly string[]): Promise<OpenToken[]> {
  return (await runPrepared<OpenToken>(database(), BY_IDS, [[...new Set(ids)]])).rows;
}

export async function markTokenUsed(id: string, everyS: number): Promise<void> {
  await database().query(`update api_tokens set last_used_at = now() where id = $id and (last_used_at is null or last_used_at < now() - make_interval(secs => $everyS))`, { bind: { id, everyS } });
}
