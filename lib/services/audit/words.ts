import type { TrailRow } from '@/db/queries/trail';
import { FININGS } from '@/lib/core/additions/fining';

const text = (value: unknown): string => (typeof value === 'string' ? value : typeof value === 'number' ? String(value) : '');

/** Whose address went with their account. */
const GONE = 'somebody who has gone';

type Says = (detail: Record<string, unknown>, subject: string | null) => string;

/** What was done, as a sentence without its first word: who did it stands before it. */
const SAYS: Record<string, Says> = {
  'member.role-changed': (d, who) => `made ${who ?? 'a member'} ${text(d.to)}, before ${text(d.from)}`,
  'member.removed': (d, who) => `took ${who ?? (text(d.name) || 'a member')} out of the cellar`,
  'member.left': () => 'left the cellar',
  'member.joined': (d) => `joined as ${text(d.role)}${d.invited ? `, invited at ${text(d.invited)}` : ''}`,
  'invitation.sent': (d) => `invited ${text(d.email) || GONE} as ${text(d.role)}`,
  'invitation.revoked': (d) => `took back the invitation of ${text(d.email) || GONE}`,
  'cellar.created': () => 'made the cellar',
  'cellar.updated': () => 'changed the cellar’s name or clock',
  'cellar.handed-over': (_, heir) => `handed the cellar over${heir === null ? '' : ` to ${heir}`}`,
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
  'account.deleted': () => 'an account was deleted',
  'account.made': () => 'made the account',
  'person.updated': () => 'changed the profile',
  'batch.created': (d) => `started ${text(d.name)}`,
  'batch.updated': () => 'changed a batch',
  'batch.racked': () => 'racked a batch',
  'batch.topped_up': (d) => `topped up a batch with ${text(d.what)}`,
  'batch.split': () => 'split a batch',
  'batch.blended': () => 'blended batches',
  'batch.muted': () => 'muted a vessel',
  'batch.unmuted': () => 'ended a mute',
  'entry.created': (d) => `logged: ${text(d.kind)}`,
  'entry.updated': (d) => `corrected an entry: ${text(d.kind)}`,
  'entry.removed': (d) => `took back an entry: ${text(d.kind)}`,
  'alert.acknowledge': () => 'took an alert in hand',
  'alert.resolve': () => 'cleared an alert',
  'sensor.created': (d) => `made the sensor ${text(d.name)}`,
  'sensor.updated': (_, sensor) => `changed the sensor ${sensor ?? ''}`,
  'sensor.rotated': (_, sensor) => `gave the sensor ${sensor ?? ''} a new secret`,
  'sensor.removed': (_, sensor) => `removed the sensor ${sensor ?? ''}`,
  'job.done': (d) => `ticked: ${text(d.title)}`,
  'job.undone': (d) => `took a tick back: ${text(d.title)}`,
  'job.created': (d) => `put on the rounds: ${text(d.title)}`,
  'job.taken': (d) => `took in hand: ${text(d.title)}`,
  'job.left': (d) => `left to others: ${text(d.title)}`,
  'fining.started': (d) => `fined with ${FININGS.find(({ key }) => key === d.fining)?.name ?? text(d.fining)}`,
  'fining.second': () => 'gave the second dose of a fining',
  'must.created': (d) => `wrote the must sheet ${text(d.name)}`,
  'must.updated': () => 'changed a must sheet',
  'must.copied': () => 'copied a must sheet',
  'must.archived': (d) => `put the must sheet ${text(d.name)} away`,
  'lot.bottled': (d) => `bottled the lot ${text(d.code)}`,
  'lot.updated': () => 'changed a lot',
  'lot.moved': () => 'moved bottles',
  'lot.caution-lifted': (d) => `took the caution off the lot ${text(d.code)}`,
  'lot.opened': (d) => `opened ${text(d.count)} of a lot`,
  'lot.given': (d) => `gave away ${text(d.count)} of a lot`,
  'lot.broken': (d) => `broke ${text(d.count)} of a lot`,
  'lot.gushed': (d) => `had ${text(d.count)} of a lot gush`,
  'tasting.written': () => 'wrote a tasting note',
  'tasting.removed': () => 'took a tasting note back',
  'sensor.set': (d, sensor) => `told the sensor ${sensor ?? ''} to speak every ${Math.round(Number(d.interval_s) / 60)} min`,
  'sensor-limits.changed': () => 'changed the limits of the sensors',
  'calibration.added': (_, sensor) => `gave ${sensor ?? 'a sensor'} a new calibration`,
  'calibration.removed': (_, sensor) => `took back a calibration of ${sensor ?? 'a sensor'}`,
  'calibration-point.added': (_, sensor) => `noted a calibration point of ${sensor ?? 'a sensor'}`,
  'calibration-point.removed': (_, sensor) => `struck out a calibration point of ${sensor ?? 'a sensor'}`,
  'catalogue.added': (d) => `added ${text(d.name) || 'something'} to the ingredients`,
  'catalogue.updated': (d) => `changed ${text(d.name) || 'one'} of the ingredients`,
  'catalogue.removed': () => 'took an ingredient out',
  'device.registered': () => 'lets a device be told',
  'device.removed': () => 'ended the messages to a device',
  'import.kept': (d) => `brought in ${text(d.file) || 'a file'}`,
  'import.undone': () => 'took out what a file had brought',
  'lot.opening-undone': () => 'took back an opening',
  'photo.added': () => 'added a photo',
  'photo.removed': () => 'removed a photo',
  'place.created': (d) => `named the place ${text(d.name)}`,
  'place.updated': () => 'changed a place',
  'place.removed': (d) => `removed the place ${text(d.name)}`,
  'webhook.created': (d) => `made a webhook to ${text(d.url)}`,
  'webhook.updated': () => 'changed a webhook',
  'webhook.removed': (d) => `removed the webhook to ${text(d.url)}`,
  'webhook.given-up': (d) => `the webhook to ${text(d.url)} was switched off: nothing arrived for days`,
  'rule.set': () => 'set a rule for alerts',
  'escalation.set': () => 'set who is told next',
  'account.exported': () => 'saved their data',
  'lot.bottled-against-a-stop': () => 'bottled against a stop',
  'lot.moved-against-a-stop': () => 'moved bottles against a stop',
};

type Named = Pick<TrailRow, 'action' | 'detail' | 'subject' | 'personId'>;

/** Identifiers of what a line is about, the nearest to a person's mind first. */
export const about = ({ detail, subject, ...row }: Named): string[] => [text(detail.batch), text(detail.lot), row.action === 'cellar.handed-over' ? text(detail.to) : subject].filter((key) => key !== '');

/** Whoever did it stands before it already. */
const ofThemselves = ({ subject, personId }: Named): boolean => subject === personId;

/** For all else the action's own name does: `place.removed` reads “place removed”. What it was done to follows, where that has a name still. */
export function says(row: Named, names: ReadonlyMap<string, string>): string {
  const thing = about(row).flatMap((key) => names.get(key) ?? [])[0] ?? null;
  const said = saidOf(row, thing);
  return thing === null || ofThemselves(row) || said.includes(thing) ? said : `${said}: ${thing}`;
}

function saidOf(row: Named, thing: string | null): string {
  const known = SAYS[row.action];
  if (known) return known(row.detail, row.action.startsWith('member.') || row.action === 'cellar.handed-over' ? thing : (thing ?? row.subject));
  const name = text(row.detail.name) || text(row.detail.title);
  return `${row.action.replace(/[._-]/g, ' ')}${name ? `: ${name}` : ''}`;
}
