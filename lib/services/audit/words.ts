import type { TrailRow } from '@/db/queries/trail';

const text = (value: unknown): string => (typeof value === 'string' ? value : typeof value === 'number' ? String(value) : '');

type Says = (detail: Record<string, unknown>, subject: string | null) => string;

/** What was done, as a sentence without its first word: who did it stands before it. */
const SAYS: Record<string, Says> = {
  'member.role-changed': (d, who) => `made ${who ?? 'a member'} ${text(d.to)}, before ${text(d.from)}`,
  'member.removed': (d, who) => `took ${who ?? (text(d.name) || 'a member')} out of the cellar`,
  'member.left': () => 'left the cellar',
  'member.joined': (d) => `joined as ${text(d.role)}, invited at ${text(d.invited)}`,
  'invitation.sent': (d) => `invited ${text(d.email)} as ${text(d.role)}`,
  'invitation.revoked': (d) => `took back the invitation of ${text(d.email)}`,
  'cellar.created': () => 'made the cellar',
  'cellar.updated': () => 'changed the cellar’s name or clock',
  'cellar.handed-over': () => 'handed the cellar over',
  'cellar.deleted': (d) => `deleted the cellar ${text(d.name)}`,
  'token.made': (d) => `made the token ${text(d.name)} (…${text(d.last_four)}) as ${text(d.role)}`,
  'token.revoked': (d) => `revoked the token ${text(d.name)} (…${text(d.last_four)})`,
  'share.created': (d) => `made a share link, open ${text(d.days)} days`,
  'share.revoked': () => 'revoked a share link',
  'calendar.made': () => 'made an own calendar address',
  'calendar.ended': () => 'took the calendar address back',
  'sign-in.opened': () => 'signed in',
  'sign-in.refused': (_, subject) => (subject === 'code' ? 'a wrong code' : 'a wrong passphrase'),
  'sign-in.ended': () => 'ended a sign-in',
  'sign-in.ended-all': () => 'signed out everywhere',
  'sign-in-link.asked': () => 'a link to sign in was asked for',
  'password-link.asked': () => 'a link for a new passphrase was asked for',
  'passphrase.changed': () => 'changed the passphrase',
  'passphrase.reset': () => 'chose a new passphrase by a mailed link',
  'mail-address.asked': () => 'asked for another mail address',
  'mail-address.kept': () => 'took back the change of address',
  'mail-address.changed': () => 'changed the mail address',
  'second-factor.on': () => 'turned the second factor on',
  'second-factor.off': () => 'took the second factor off',
  'recovery-codes.renewed': () => 'made new recovery codes',
  'account.made': () => 'made the account',
  'person.updated': () => 'changed the profile',
  'lot.bottled-against-a-stop': () => 'bottled against a stop',
  'lot.moved-against-a-stop': () => 'moved bottles against a stop',
};

/** For all else the action's own name does: `batch.topped_up` reads “batch topped up”. */
export function says(row: Pick<TrailRow, 'action' | 'detail' | 'subject'>, names: ReadonlyMap<string, string>): string {
  const known = SAYS[row.action];
  if (known) return known(row.detail, row.action.startsWith('member.') ? (names.get(row.subject) ?? null) : row.subject);
  const name = text(row.detail.name) || text(row.detail.title);
  return `${row.action.replace(/[._-]/g, ' ')}${name ? `: ${name}` : ''}`;
}
