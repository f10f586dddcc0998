import { ApiToken, Cellar, Invitation, Person } from '@/db/models';
import { hashApiToken, makeApiToken } from '@/lib/auth/api-tokens';
import { hashLinkToken, linkTokenOf } from '@/lib/auth/link-tokens';
import { hashPassword } from '@/lib/auth/passwords';
import type { endpointsPeople } from '@/lib/contracts/endpoints-people';
import type { Role } from '@/lib/core/roles';
import { randomUUID } from 'node:crypto';
import { buildCellar, buildMember } from './factories';
import { EVERYBODY, type RoleRow } from './role-rows';

/** What sharing a cellar has in it. */
export interface PeopleThings {
  /** Another member of the cellar. */
  memberId: string;
  invitationId: string;
  /** The secret of an invitation to a cellar that the asker is not in. */
  invitationSecret: string;
  /** A token of the asker's for the cellar. */
  tokenId: string;
  cellarName: string;
  /** The asker's own address. */
  email: string;
}

export const PASSPHRASE = 'a lantern by the door';
let hash: Promise<string> | undefined;

async function invitation(cellarId: string): Promise<string> {
  const id = randomUUID();
  await Invitation.create({ id, cellarId, email: `${id}@cellar.example`, role: 'hand', tokenHash: hashLinkToken(linkTokenOf('invitation', id)), expiresAt: new Date(Date.now() + 86_400_000) });
  return id;
}

/** A token of the person for the cellar, as if made on the settings page. */
export async function buildToken(personId: string, cellarId: string, role: Role, overrides: Partial<ApiToken> = {}): Promise<{ id: string; token: string }> {
  const token = makeApiToken();
  const row = await ApiToken.create({ personId, cellarId, role, name: 'script', tokenHash: hashApiToken(token), lastFour: token.slice(-4), ...overrides });
  return { id: row.id, token };
}

/** `personId` is who asks: they can show the passphrase, and are not the only keeper. */
export async function peopleThings(cellarId: string, personId: string): Promise<PeopleThings> {
  await buildMember('keeper', { cellarId });
  await Person.update({ passwordHash: await (hash ??= hashPassword(PASSPHRASE)) }, { where: { id: personId } });
  return {
    memberId: (await buildMember('hand', { cellarId })).personId,
    invitationId: await invitation(cellarId),
    invitationSecret: linkTokenOf('invitation', await invitation((await buildCellar()).id)),
    tokenId: (await buildToken(personId, cellarId, 'guest')).id,
    cellarName: (await Cellar.findByPk(cellarId, { rejectOnEmpty: true })).name,
    email: (await Person.findByPk(personId, { rejectOnEmpty: true })).email,
  };
}

const KEEPER = ['keeper'] as const;
const passphrase = PASSPHRASE;

type Elsewhere = 'lookAtInvitation' | 'joinByInvitation' | 'askForSignInLink' | 'askForPassphraseLink' | 'resetPassphrase' | 'confirmMail' | 'confirmSecondFactor' | 'endSecondFactor' | 'renewRecoveryCodes';

/** Who shares a cellar, accounts, tokens, the trail. Written out by hand on purpose, as the other rows are. */
export const peopleRows: Record<Exclude<keyof typeof endpointsPeople, Elsewhere>, RoleRow> = {
  updateMe: { may: EVERYBODY, good: 204, path: () => '/me', body: () => ({ name: 'Renamed' }) },
  updateMember: { may: KEEPER, good: 200, names: true, path: (t) => `/members/${t.memberId}`, body: () => ({ role: 'guest' }) },
  removeMember: { may: KEEPER, good: 204, names: true, path: (t) => `/members/${t.memberId}` },
  handOver: { may: KEEPER, good: 204, names: true, path: (t) => `/members/${t.memberId}/hand-over`, body: () => ({ passphrase }) },
  leaveCellar: { may: EVERYBODY, good: 204, path: () => '/cellar/leave' },
  listInvitations: { may: KEEPER, good: 200, path: () => '/invitations' },
  createInvitation: { may: KEEPER, good: 201, path: () => '/invitations', body: () => ({ email: `${randomUUID()}@cellar.example`, role: 'hand' }) },
  revokeInvitation: { may: KEEPER, good: 204, names: true, path: (t) => `/invitations/${t.invitationId}` },
  acceptInvitation: { may: EVERYBODY, good: 200, path: () => '/invitations/accept', body: (t) => ({ token: t.invitationSecret }) },
  createCellar: { may: EVERYBODY, good: 201, path: () => '/cellars', body: () => ({ name: 'Second shed', time_zone: 'UTC' }) },
  updateCellar: { may: KEEPER, good: 204, path: () => '/cellar', body: () => ({ name: 'Renamed' }) },
  deleteCellar: { may: KEEPER, good: 204, path: () => '/cellar', body: (t) => ({ name: t.cellarName, passphrase }) },
  listTokens: { may: EVERYBODY, good: 200, path: () => '/tokens' },
  createToken: { may: EVERYBODY, good: 201, path: () => '/tokens', body: () => ({ name: 'script', role: 'guest' }) },
  revokeToken: { may: EVERYBODY, good: 204, names: true, path: (t) => `/tokens/${t.tokenId}` },
  listTrail: { may: KEEPER, good: 200, path: () => '/audit' },
  exportTrailCsv: { may: KEEPER, good: 200, path: () => '/audit.csv' },
  exportTrailJson: { may: KEEPER, good: 200, path: () => '/audit.json' },
  getAccount: { may: EVERYBODY, good: 200, path: () => '/account' },
  listAccountTrail: { may: EVERYBODY, good: 200, path: () => '/account/trail' },
  changePassphrase: { may: EVERYBODY, good: 204, path: () => '/account/passphrase', body: () => ({ current: passphrase, passphrase: 'nine wet corks in a row' }) },
  changeMail: { may: EVERYBODY, good: 202, path: () => '/account/mail-address', body: () => ({ email: `${randomUUID()}@cellar.example`, passphrase }) },
  dropMailChange: { may: EVERYBODY, good: 204, path: () => '/account/mail-address' },
  beginSecondFactor: { may: EVERYBODY, good: 201, path: () => '/account/second-factor', body: () => ({ passphrase }) },
  exportAccount: { may: EVERYBODY, good: 200, path: () => '/account/export' },
  deleteAccount: { may: EVERYBODY, good: 204, path: () => '/account', body: (t) => ({ email: t.email, passphrase }) },
};
