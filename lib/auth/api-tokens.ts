import { createHash, randomBytes } from 'node:crypto';
import { ROLES, type Role } from '../core/roles';

/** Says what it is to whoever finds it in a log or a repository. */
export const API_TOKEN_PREFIX = 'fbt_';

/** 256 random bits; shown once, kept only as a hash. */
export const makeApiToken = (): string => `${API_TOKEN_PREFIX}${randomBytes(32).toString('base64url')}`;

/** A random key cannot be guessed from a dictionary, so a fast hash is enough. */
export const hashApiToken = (token: string): Buffer => createHash('sha256').update(token).digest();

/** The token of an `Authorization` header, or null where there is none of ours. */
export const apiTokenOf = (header: string | null): string | null => /^Bearer (fbt_[A-Za-z0-9_-]{43})$/i.exec(header?.trim() ?? '')?.[1] ?? null;

/** Of two roles the one that is allowed less: a token never does more than its person may by now. */
export const lesserRole = (a: Role, b: Role): Role => (ROLES.indexOf(a) >= ROLES.indexOf(b) ? a : b);
