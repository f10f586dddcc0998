import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import webpush from 'web-push';
import { inTransaction } from '@/db/client';
import { AccountLink, Invitation, SignIn, type Person } from '@/db/models';
import { oweLetter } from '@/db/queries/letters';
import { oweMails } from '@/db/queries/outbox';
import { hashLinkToken, linkTokenOf } from '@/lib/auth/link-tokens';
import { ManualClock } from '@/lib/clock';
import { createDevice as deviceForm } from '@/lib/contracts/messages';
import { meSchema, updateMe as meForm } from '@/lib/contracts/people';
import { compose } from '@/lib/mail/compose';
import { composeLetter } from '@/lib/mail/compose-letter';
import type { LetterPayload } from '@/lib/mail/letters';
import type { OutgoingMail } from '@/lib/mail/transport';
import { composePush, type Notice } from '@/lib/push/compose';
import { webPushTransport } from '@/lib/push/transport';
import { createInvitation } from '@/lib/services/invitations/manage';
import { sendLetters } from '@/lib/services/letters/send';
import { oweDigests } from '@/lib/services/digest/owe';
import { updateMessages } from '@/lib/services/messages/update';
import { byPush } from '@/lib/services/outbox/by-push';
import { sendDue } from '@/lib/services/outbox/send';
import { deleteAccount } from '@/lib/services/people/delete-account';
import { getMe } from '@/lib/services/people/get-me';
import { updateMe } from '@/lib/services/people/update-me';
import { createDevice } from '@/lib/services/push/devices';
import { hashPassword } from '@/lib/auth/passwords';
import { alertOf, EVERY_LETTER, EVERY_MESSAGE } from '../support/every-message';
import { useDatabase } from '../support/database';
import { buildMember } from '../support/factories';
import { startPushService, type FakeBrowser, type PushService } from '../support/push-service';
import { BRACKETED, escapedFrom } from '../support/bracketed';
import { english } from '../support/texts';
import { tellingCellar } from '../support/told';

// One language more, as a contributor would add it.
vi.mock('@/lib/texts/languages', async (original) => (await import('../support/bracketed')).withBracketed(await original()));

const db = useDatabase();
const BARN = 'https://barn.example';
const ZONE = 'Europe/Berlin';
const KEYS = webpush.generateVAPIDKeys();
/** The house's name is the same in every language. */
const KNOWN = [ZONE, 'Fallbright'];

let service: PushService;
let clock: ManualClock;
let posted: OutgoingMail[];
let reader: Awaited<ReturnType<typeof buildMember>>;
let other: Awaited<ReturnType<typeof buildMember>>;
beforeAll(async () => {
  service = await startPushService();
});
afterAll(() => service.stop());
beforeEach(async () => {
  await db.sequelize.query('delete from outbox; delete from letters; delete from cellars; delete from people');
  clock = new ManualClock(Date.now() + 60_000);
  posted = [];
  reader = await buildMember('keeper', { name: 'Άννα' });
  await reader.person.update({ locale: BRACKETED, timeZone: ZONE });
  other = await buildMember('keeper', { name: 'Ίρις' });
  await other.person.update({ timeZone: ZONE });
});

const transport = { send: async (mail: OutgoingMail) => void posted.push(mail), close: () => undefined };
const deps = () => ({ transport, clock, publicUrl: BARN, messageHost: 'barn.example', leaseMs: 60_000, random: () => 0.5 });
const mailTo = ({ email }: Person) => posted.filter(({ to }) => to.address === email);

async function phoneOf(member: typeof reader): Promise<FakeBrowser> {
  const browser = service.browser();
  const signIn = await SignIn.create({ personId: member.personId, expiresAt: new Date('2040-01-01') });
  await createDevice(member, signIn.id, deviceForm.parse({ endpoint: browser.endpoint, keys: browser.keys }), 'Mozilla/5.0 (Android 15; Mobile)');
  return browser;
}
async function send(): Promise<void> {
  const push = webPushTransport({ keys: () => KEYS, contact: 'mailto:watch@barn.example', allowPrivate: true, timeoutMs: 2_000 });
  await sendDue({ ...deps(), means: [byPush({ transport: push, now: () => clock.now() })] });
}
const said = (browser: FakeBrowser) => browser.read().map((body) => JSON.parse(body) as Notice);

/** What a mail shows, tags and styles taken off. */
const shown = (html: string) => html.replace(/<style>.*?<\/style>/s, ' ').replace(/<[^>]+>/g, ' ').replaceAll('&quot;', '"').replaceAll('&#39;', "'").replaceAll('&amp;', '&');

/** @param known data in Latin letters */
function expectBracketed({ subject, text, html }: Pick<OutgoingMail, 'subject' | 'text' | 'html'>, known: readonly string[] = []): void {
  for (const part of [subject, text, shown(html)]) {
    expect(part).toContain('⟦');
    expect(escapedFrom(part, [...KNOWN, ...known]), part).toEqual([]);
  }
  expect(html).toContain(`<html lang="${BRACKETED}">`);
}

describe('a message of every kind', () => {
  it('is wholly in the language of its reader, by mail and on the phone, and in English for others', async () => {
    const phones = [await phoneOf(reader), await phoneOf(other)] as const;
    for (const [index, payloads] of EVERY_MESSAGE.entries()) {
      const owed = [reader, other].flatMap(({ personId }) =>
        (['mail', 'push'] as const).flatMap((means) => payloads.map((payload, part) => ({ cellarId: null, alertId: null, personId, means, dedupeKey: `${index}:${part}:${personId}:${means}`, payload, notBefore: new Date(clock.now()) }))),
      );
      await inTransaction((transaction) => oweMails(owed, transaction));
      await send();
    }
    const theirs = mailTo(reader.person);
    expect(theirs).toHaveLength(EVERY_MESSAGE.length);
    for (const mail of theirs) expectBracketed(mail);
    expect(mailTo(other.person).map(({ subject, text, html }) => ({ subject, text, html }))).toEqual(EVERY_MESSAGE.map((payloads) => compose(payloads, { publicUrl: BARN, texts: english })));

    const [bracketed, plain] = phones.map(said);
    expect(bracketed).toHaveLength(EVERY_MESSAGE.length);
    for (const { title, body, take, lang } of bracketed!) {
      expect(lang).toBe(BRACKETED);
      expect(escapedFrom([title, body, take].join('\n'), KNOWN)).toEqual([]);
      expect(take).toContain('⟦');
    }
    expect(plain).toEqual(EVERY_MESSAGE.map((payloads) => composePush(payloads, english)));
  });

  it('has the dates and figures of that language', async () => {
    await inTransaction((transaction) => oweMails([{ cellarId: null, alertId: null, personId: reader.personId, dedupeKey: 'one', payload: alertOf(), notBefore: new Date(clock.now()) }], transaction));
    await send();
    // Greek: a decimal comma, and the days and months by their Greek names.
    expect(posted[0]!.text).toContain('πυκνότητα: 1,041');
    expect(posted[0]!.text).toContain('⟦⟦Τετ 3 Μαρ⟧ ⟦00:00⟧⟧');
  });

  it('is written in what its reader reads when it is sent, in their units', async () => {
    const payload = alertOf({ alert: { headline: 'Stopped at 1.041: 15.4 °C.', act: null, evidence: [{ name: 'gravity', value: 1.04003, threshold: null, unit: 'SG' }, { name: 'temperature', value: 20, threshold: null, unit: '°C' }] } });
    await inTransaction((transaction) => oweMails([{ cellarId: null, alertId: null, personId: other.personId, dedupeKey: 'one', payload, notBefore: new Date(clock.now()) }], transaction));
    await updateMe(other.personId, meForm.parse({ locale: BRACKETED, units: { gravity: 'plato', temperature: 'f' } }));
    await send();
    const [mail] = posted;
    expect(mail!.subject).toContain('Stopped at 10.2 °P: 59.7 °F');
    // Bates et al., NBS Circular C440 (1942), table 114: 10 % sucrose is 1.04003.
    expect(mail!.text).toContain('gravity: 10,0 °P');
    expect(mail!.text).toContain('temperature: 68,0 °F');
    expectBracketed(mail!, ['Stopped at', 'gravity', 'temperature', '°P', '°F']);
  });

  it('is English where the language that was kept is no longer there', async () => {
    await reader.person.update({ locale: 'xx' });
    await inTransaction((transaction) => oweMails([{ cellarId: null, alertId: null, personId: reader.personId, dedupeKey: 'one', payload: alertOf(), notBefore: new Date(clock.now()) }], transaction));
    await send();
    expect(posted[0]!.subject).toBe('Check: Μηλίτης, tag 5: Στάση στο 1.041');
  });
});

describe('a language', () => {
  it('can be chosen once it is in the list, and is kept', async () => {
    await updateMe(other.personId, meForm.parse({ locale: BRACKETED }));
    expect(meSchema.shape.person.shape.locale.safeParse((await getMe(other)).person.locale)).toMatchObject({ success: true, data: BRACKETED });
    expect(meForm.safeParse({ locale: 'xx' }).success).toBe(false);
  });

  it('reaches what the watch and the digest owe by themselves', async () => {
    const cellar = await tellingCellar({ start: Date.parse('2027-05-01T06:00:00Z'), people: { Una: 'keeper', Piet: 'keeper' } });
    await cellar.people.Una!.person.update({ locale: BRACKETED });
    await updateMessages(cellar.people.Una!, null, { digest_at: 8 * 60 }, { clock: cellar.clock });
    cellar.set(['stall', 'foam']);
    await cellar.run(Date.parse('2027-05-01T08:00:00Z'));
    cellar.clock.set(Date.parse('2027-05-01T08:00:00Z'));
    await oweDigests({ clock: cellar.clock });
    await cellar.send();
    const of = (name: string) => cellar.mails.filter(({ to }) => to.name === name);
    expect(cellar.lines.at(-1)).toContain('Una: digest');
    // The watch's own sentences are kept as it said them.
    const known = ['Low barn', 'Oat stout', 'Stopped at', 'Foam may reach the airlock', 'Because the test says so', 'UTC'];
    for (const mail of of('Una')) expectBracketed(mail, known);
    expect(of('Piet').length).toBeGreaterThan(0);
    for (const { subject, text } of of('Piet')) expect(subject + text).not.toContain('⟦');
  });
});

describe('a letter of every kind', () => {
  /** The row that a letter's link stands on. */
  async function withRow(letter: LetterPayload, person: Person): Promise<LetterPayload> {
    const id = randomUUID();
    const expiresAt = new Date(clock.now() + 3_600_000);
    if (letter.template === 'invitation') {
      await Invitation.create({ id, cellarId: other.cellarId, email: `${id}@barn.example`, role: letter.role, tokenHash: hashLinkToken(linkTokenOf('invitation', id)), invitedBy: other.personId, createdAt: new Date(clock.now()), expiresAt });
      return { ...letter, invitation: id };
    }
    if (letter.template === 'notice') return letter;
    await AccountLink.create({ id, kind: letter.kind, personId: person.id, tokenHash: hashLinkToken(linkTokenOf(letter.kind, id)), newEmail: null, expiresAt });
    return { ...letter, link: id };
  }
  const owe = (letter: LetterPayload, { id, email, name }: Person) => inTransaction((transaction) => oweLetter({ cellarId: null, personId: id, to: { email, name }, dedupeKey: randomUUID(), payload: letter }, transaction));
  const post = async () => (await sendLetters(deps()), posted.splice(0));

  it('is wholly in the language of its reader, and in English for others', async () => {
    for (const letter of EVERY_LETTER) {
      await owe(await withRow(letter, reader.person), reader.person);
      await owe(await withRow(letter, other.person), other.person);
    }
    await sendLetters(deps());
    expect(mailTo(reader.person)).toHaveLength(EVERY_LETTER.length);
    for (const mail of mailTo(reader.person)) expectBracketed(mail);
    const withoutSecret = (text: string) => text.replace(/#\S+/, '#');
    expect(mailTo(other.person).map(({ subject, text }) => [subject, withoutSecret(text)])).toEqual(
      EVERY_LETTER.map((letter) => composeLetter(letter, { publicUrl: BARN, token: '', texts: english })).map(({ subject, text }) => [subject, withoutSecret(text)]),
    );
  });

  it('speaks to somebody without an account as to whoever invites them, and to somebody with one as to them', async () => {
    const invite = (by: typeof reader, email: string) => createInvitation(by, { email, role: 'hand', expires_in_days: 7 }, clock);
    await invite(reader, 'nobody@barn.example');
    await invite(other, 'somebody@barn.example');
    await invite(other, reader.person.email);
    await invite(reader, other.person.email);
    const bracketed = (await post()).map(({ to, subject }) => [to.address, subject.startsWith('⟦')]);
    expect(Object.fromEntries(bracketed)).toEqual({ 'nobody@barn.example': true, 'somebody@barn.example': false, [reader.person.email]: true, [other.person.email]: false });
  });

  it('tells of a deleted account in what its owner read', async () => {
    await reader.person.update({ passwordHash: await hashPassword('clear by midwinter') });
    await deleteAccount(reader.personId, { passphrase: 'clear by midwinter', email: reader.person.email.toLowerCase() }, clock);
    const [mail] = await post();
    expectBracketed(mail!);
  });
});
