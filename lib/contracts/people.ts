import { z } from 'zod';
import { ROLES } from '../core/roles';
import { GRAVITY_UNITS, TEMPERATURE_UNITS, VOLUME_UNITS } from '../core/units/chosen';
import { LOCALES } from '../texts/languages';
import { id, line, pageQuery, timestamp } from './common';

export { ROLES, type Role } from '../core/roles';

const role = z.enum(ROLES, 'is not a role');

export const email = z.string('is not a mail address').trim().toLowerCase().max(254, 'is too long').pipe(z.email('is not a mail address'));

/** A passphrase as typed in to show who one is. */
const given = z.string().min(1, 'must not be empty').max(256, 'is too long');

/** A passphrase to be kept (OWASP ASVS 5.0 6.2.1, 6.2.8, 6.2.9): 8 characters or more, as it was typed; common ones are refused by the server. */
const chosen = z.string().min(8, 'must have at least 8 characters').max(256, 'is too long').refine((value) => value.isWellFormed(), 'holds characters that cannot be kept');

/** Six digits of an authenticator, or a recovery code; spaces and dashes do not matter. */
const code = z
  .string()
  .max(40)
  .transform((value) => value.replace(/[\s-]/g, '').toLowerCase())
  .pipe(z.string().regex(/^(\d{6}|[a-z0-9]{10})$/, 'is six digits, or a recovery code'));

export const signInForm = z.object({ email, password: given, code: code.optional() });
export type SignInForm = z.infer<typeof signInForm>;

/** The secret of a mailed link, from behind its `#`. */
export const linkSecret = z.string().regex(/^[A-Za-z0-9_-]{32}$/, 'is not such a link');
export const linkSignInForm = z.object({ token: linkSecret, code: code.optional() });

/** An IANA time zone that this machine knows. */
export const timeZone = z.string().max(64).refine((value) => {
  try {
    return new Intl.DateTimeFormat('en', { timeZone: value }).resolvedOptions().timeZone.length > 0;
  } catch {
    return false;
  }
}, 'is not a time zone, such as Europe/Lisbon');

/** An ISO 4217 currency that this machine knows. */
export const currency = z.string().refine((value) => Intl.supportedValuesOf('currency').includes(value), 'is not a currency, such as EUR');

export const unitsSchema = z.object({ gravity: z.enum(GRAVITY_UNITS), temperature: z.enum(TEMPERATURE_UNITS), volume: z.enum(VOLUME_UNITS) });

/** `GET /api/v1/me`: who asks, and in which cellar. */
export const meSchema = z.object({
  person: z.object({ id, name: z.string(), email: z.string(), time_zone: z.string(), locale: z.enum(LOCALES), units: unitsSchema }),
  cellar: z.object({ id, name: z.string(), time_zone: z.string(), /** What costs are counted in, ISO 4217; null: never told. */ currency: z.string().nullable(), role }),
  cellars: z.array(z.object({ id, name: z.string(), role })),
  /** What the person may do here, for showing or hiding a button; the server decides again. */
  may: z.array(z.string()),
});
export type MeBody = z.infer<typeof meSchema>;

export const updateMe = z.object({ name: line(80).optional(), time_zone: timeZone.optional(), locale: z.enum(LOCALES).optional(), units: unitsSchema.partial().optional() });
export type UpdateMe = z.infer<typeof updateMe>;

/** An open sign-in of the person, to be ended from afar. */
export const signInSchema = z.object({ id, created_at: z.string(), last_seen_at: z.string(), user_agent: z.string(), current: z.boolean() });
export const signInList = z.object({ items: z.array(signInSchema) });

export const memberSchema = z.object({ person: z.object({ id, name: z.string(), email: z.string() }), role, since: z.string() });
export type MemberBody = z.infer<typeof memberSchema>;
export const memberList = z.object({ items: z.array(memberSchema) });
export const updateMember = z.object({ role });
export const withPassphrase = z.object({ passphrase: given });

/** `POST /api/v1/cellars/active`: which of the person's cellars the browser shows. */
export const chooseCellar = z.object({ cellar_id: id });
export const createCellar = z.object({ name: line(80), time_zone: timeZone });
export type CreateCellar = z.infer<typeof createCellar>;
/** A cellar for somebody who has no account yet. */
export const foundCellar = createCellar.extend({ email });
export type FoundCellar = z.infer<typeof foundCellar>;
export const updateCellar = z.object({ name: line(80).optional(), time_zone: timeZone.optional(), currency: currency.nullable().optional() });
export const deleteCellar = z.object({ name: z.string().max(200), passphrase: given });
export const madeCellar = z.object({ id });

/** Strict, as all that gives access: a limit that was mistyped must not become the usual one. */
export const createInvitation = z.strictObject({ email, role, expires_in_days: z.number().int('must be whole days').min(1, 'must be 1 to 30 days').max(30, 'must be 1 to 30 days').default(7) });
export type CreateInvitation = z.infer<typeof createInvitation>;
export const invitationSchema = z.object({ id, email: z.string(), role, invited_by: z.string().nullable(), created_at: z.string(), expires_at: z.string(), state: z.enum(['open', 'expired', 'accepted']), accepted_by: z.string().nullable(), mail: z.enum(['waiting', 'sent', 'failed']) });
export type InvitationBody = z.infer<typeof invitationSchema>;
export const invitationList = z.object({ items: z.array(invitationSchema) });

export const byLink = z.object({ token: linkSecret });
/** What the holder of an invitation's link is shown. */
export const invitationView = z.object({ cellar: z.string(), by: z.string(), role, email: z.string(), expires_at: z.string(), has_account: z.boolean() });
export type InvitationView = z.infer<typeof invitationView>;
export const joinByInvitation = byLink.extend({ name: line(80), passphrase: chosen, time_zone: timeZone.default('UTC') });
export type JoinByInvitation = z.infer<typeof joinByInvitation>;
export const joinedSchema = z.object({ email: z.string() });

export const askForLink = z.object({ email });
export const resetPassphrase = byLink.extend({ passphrase: chosen });
export const changePassphrase = z.object({ current: given, passphrase: chosen });
export const changeMail = z.object({ email, passphrase: given });
export const mailConfirmed = z.object({ changed: z.boolean(), waits_for: z.enum(['old', 'new']).nullable() });

export const accountSchema = z.object({
  email: z.string(),
  has_passphrase: z.boolean(),
  second_factor: z.object({ since: z.string(), recovery_codes_left: z.number().int() }).nullable(),
  new_mail: z.object({ email: z.string(), expires_at: z.string(), old_confirmed: z.boolean(), new_confirmed: z.boolean() }).nullable(),
  /** Cellars that nobody else keeps: with others in them they must be handed over before the account can go; without, they go with it. */
  sole_keeper_of: z.array(z.object({ id, name: z.string(), others: z.number().int(), batches: z.number().int() })),
});
export type AccountBody = z.infer<typeof accountSchema>;
export const secondFactorSecret = z.object({ secret: z.string(), uri: z.string(), qr_svg: z.string() });
export const confirmSecondFactor = z.object({ code });
export const withCode = z.object({ passphrase: given, code });
export const recoveryCodes = z.object({ recovery_codes: z.array(z.string()) });
export const deleteAccount = z.object({ passphrase: given, code: code.optional(), email });

export const createToken = z.strictObject({ name: line(60), role, expires_in_days: z.number().int('must be whole days').min(1, 'must be 1 to 730 days').max(730, 'must be 1 to 730 days').nullable().default(90) });
export type CreateToken = z.infer<typeof createToken>;
export const tokenSchema = z.object({ id, name: z.string(), role, person: z.object({ id, name: z.string() }), last_four: z.string(), created_at: z.string(), expires_at: z.string().nullable(), last_used_at: z.string().nullable(), mine: z.boolean() });
export type TokenBody = z.infer<typeof tokenSchema>;
export const tokenList = z.object({ items: z.array(tokenSchema) });
/** The whole key, this once. */
export const createdToken = tokenSchema.extend({ token: z.string() });
export type CreatedToken = z.infer<typeof createdToken>;

/** What a line of the trail is about. */
export const TRAIL_KINDS = ['access', 'override', 'deletion', 'sensor', 'work'] as const;
export type TrailKind = (typeof TRAIL_KINDS)[number];
const trailFilter = { kind: z.enum(TRAIL_KINDS).optional(), person: id.optional(), from: timestamp.optional(), to: timestamp.optional() };
export const trailQuery = pageQuery.extend(trailFilter);
export type TrailQuery = z.infer<typeof trailQuery>;
export const trailExportQuery = z.object(trailFilter);
export const trailLine = z.object({ id: z.number().int(), at: z.string(), kind: z.enum(TRAIL_KINDS), action: z.string(), says: z.string(), subject: z.string(), person: z.object({ id, name: z.string() }).nullable(), address: z.string().nullable(), means: z.string().nullable(), detail: z.record(z.string(), z.unknown()) });
export type TrailLine = z.infer<typeof trailLine>;
export const trailList = z.object({ items: z.array(trailLine), next_cursor: z.string().nullable() });
