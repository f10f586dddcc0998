import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { Membership, OutboxMail, Person } from '@/db/models';
import { claimForOnePerson, holdBack, markDropped, markFailed, markForRetry, markSent } from '@/db/queries/outbox';
import { ManualClock } from '@/lib/clock';
import { smtpTransport } from '@/lib/mail/smtp';
import { sendDue } from '@/lib/services/outbox/send';
import { useDatabase } from '../support/database';
import { buildCellar, buildMember } from '../support/factories';
import { startMailServer, type MailServer } from '../support/mail-server';
import { alertMail, owe } from '../support/owed';

const db = useDatabase();
const LEASE_MS = 60_000;

let server: MailServer;
let clock: ManualClock;
let keeper: Awaited<ReturnType<typeof buildMember>>;

beforeEach(async () => {
  await db.sequelize.query('delete from outbox');
  server = await startMailServer();
  // Ahead of the database's own clock, which stamps when a mail was owed.
  clock = new ManualClock(Date.now() + 1_000);
  keeper = await buildMember('keeper', { cellarId: (await buildCellar()).id, name: 'Una Thorne' });
});
afterEach(() => server.stop());

function send(url = server.url) {
  const transport = smtpTransport({ url, from: 'Fallbright <watch@barn.example>', connectTimeoutMs: 1_000, sendTimeoutMs: 1_000 });
  return sendDue({ transport, clock, publicUrl: 'https://barn.example', messageHost: 'barn.example', leaseMs: LEASE_MS, random: () => 0.5 }).finally(() => transport.close());
}
const rows = () => OutboxMail.findAll({ order: ['id'] });

describe('the outbox', () => {
  it('sends what is due and says that it went', async () => {
    await owe(keeper.personId, 'one', clock.now());
    expect(await send()).toEqual({ mails: 1, unavailable: false });
    expect(server.taken).toMatchObject([{ to: [keeper.person.email], subject: 'Check: Oat stout, tag 5: Stopped at 1.041' }]);
    expect(server.taken[0]!.mail.headers.get('auto-submitted')).toBe('auto-generated');
    expect(server.taken[0]!.mail.to).toMatchObject({ value: [{ name: 'Una Thorne', address: keeper.person.email }] });
    expect(server.taken[0]!.mail.html).toContain('Oat stout');
    expect(await rows()).toMatchObject([{ attempts: 1, sentAt: new Date(clock.now()), lastError: null, leasedUntil: null }]);
    expect(await send()).toEqual({ mails: 0, unavailable: false });
  });

  it('waits until a mail is due', async () => {
    await owe(keeper.personId, 'one', clock.now() + 10_000);
    expect((await send()).mails).toBe(0);
    clock.advance(10_000);
    expect((await send()).mails).toBe(1);
  });

  it('owes the same thing to the same person once', async () => {
    await owe(keeper.personId, 'one', clock.now());
    await owe(keeper.personId, 'one', clock.now());
    expect(await rows()).toHaveLength(1);
  });

  it('puts what one person is owed into one mail, and each person’s into their own', async () => {
    const other = await buildMember('hand');
    for (const name of ['Perry', 'Medlar wine', 'Crab cider']) await owe(keeper.personId, name, clock.now(), { payload: alertMail({ name }) });
    await owe(other.personId, 'one', clock.now());
    expect((await send()).mails).toBe(2);
    const mine = server.taken.find((mail) => mail.to[0] === keeper.person.email);
    expect(mine?.subject).toContain('3 messages');
    for (const name of ['Perry', 'Medlar wine', 'Crab cider']) expect(mine?.text).toContain(name);
    expect((await rows()).every((row) => row.sentAt)).toBe(true);
  });

  it('hears nothing more from a sender that is late, but that it went', async () => {
    await owe(keeper.personId, 'one', clock.now());
    const claim = () => claimForOnePerson(new Date(clock.now()), new Date(clock.now() + LEASE_MS), 50);
    const [late] = await claim();
    clock.advance(LEASE_MS + 1);
    const [now] = await claim();
    const lease = { leasedUntil: new Date(clock.now() + LEASE_MS), failedAt: null, sentAt: null, lastError: null };
    // The other one has it in hand meanwhile: it is neither free nor given up.
    await markForRetry(late!, { nextAt: new Date(clock.now()), refusals: 1, error: 'late' });
    await markFailed(late!, new Date(clock.now()), 'late');
    await markDropped(late!, new Date(clock.now()), 'late');
    await holdBack(late!, new Date(clock.now()), 'mute');
    expect(await rows()).toMatchObject([lease]);
    await markSent([now!.id], new Date(clock.now()));
    await markFailed(now!, new Date(clock.now()), 'after all');
    expect(await rows()).toMatchObject([{ sentAt: new Date(clock.now()), failedAt: null }]);
  });

  it('keeps the mails about one alert together in the reader', async () => {
    await owe(keeper.personId, 'alert:a7:opened', clock.now(), { payload: alertMail({ alertId: 'a7' }) });
    await send();
    await owe(keeper.personId, 'alert:a7:resolved', clock.now(), { payload: alertMail({ alertId: 'a7', event: 'resolved' }) });
    await send();
    expect(server.taken[1]!.inReplyTo).toBe(server.taken[0]!.messageId);
    expect(server.taken[1]!.messageId).not.toBe(server.taken[0]!.messageId);
  });

  it('does not tell a person who has left the cellar, or become a guest, since', async () => {
    const cellarId = keeper.cellarId;
    const guest = await buildMember('hand', { cellarId });
    await owe(keeper.personId, 'one', clock.now(), { cellarId });
    await owe(guest.personId, 'one', clock.now(), { cellarId });
    await Membership.destroy({ where: { personId: keeper.personId } });
    await Membership.update({ role: 'guest' }, { where: { personId: guest.personId } });
    await send();
    expect(server.taken).toEqual([]);
    expect((await rows()).map((row) => row.lastError)).toEqual(Array(2).fill('no longer told of alerts in this cellar'));
  });

  it('writes to the address that the person has now', async () => {
    await owe(keeper.personId, 'one', clock.now());
    await Person.update({ email: `new-${keeper.person.email}` }, { where: { id: keeper.personId } });
    await send();
    expect(server.taken[0]!.to).toEqual([`new-${keeper.person.email}`]);
  });

  it('does not let one mail that cannot be made hold up the others', async () => {
    await owe(keeper.personId, 'bad', clock.now(), { payload: { template: 'unheard of' } });
    await owe(keeper.personId, 'good', clock.now());
    expect((await send()).mails).toBe(1);
    expect((await rows()).map((row) => row.failedAt !== null)).toEqual([true, false]);
  });

  it('takes a mail again when its sender died, and not before', async () => {
    await owe(keeper.personId, 'one', clock.now());
    await db.sequelize.query(`update outbox set leased_until = to_timestamp(${(clock.now() + LEASE_MS) / 1000}), attempts = 1`);
    expect((await send()).mails).toBe(0);
    clock.advance(LEASE_MS + 1);
    expect((await send()).mails).toBe(1);
  });

  it('is shared by several senders without a mail going twice', async () => {
    const people = await Promise.all(Array.from({ length: 12 }, () => buildMember('hand')));
    for (const person of people) for (const key of ['a', 'b', 'c']) await owe(person.personId, key, clock.now());
    await Promise.all([send(), send(), send()]);
    const keys = (await rows()).map((row) => [row.attempts, row.sentAt !== null]);
    expect(keys).toEqual(Array(36).fill([1, true]));
    const told = server.taken.map((mail) => mail.messageId);
    expect(new Set(told).size).toBe(told.length);
  });
});

describe('names that try to be more', () => {
  it('stay names: no header, no recipient and no tag comes of them', async () => {
    const evil = 'Stout\r\nBcc: everyone@example.org\r\n\r\n<script>alert(1)</script>';
    await Person.update({ name: 'Eve" <eve@example.org>, "x\r\nBcc: other@example.org' }, { where: { id: keeper.personId } });
    await owe(keeper.personId, 'one', clock.now(), { payload: alertMail({ name: evil, headline: evil }) });
    await send();
    const [taken] = server.taken;
    expect(taken!.to).toEqual([keeper.person.email]);
    expect(taken!.mail.bcc).toBeUndefined();
    expect([...taken!.mail.headers.keys()]).not.toContain('bcc');
    expect(taken!.mail.to).toMatchObject({ value: [{ address: keeper.person.email }] });
    expect(taken!.mail.html).not.toContain('<script>');
  });
});

describe('a mail server in a temper', () => {
  const trySend = async () => {
    const result = await send();
    const [row] = await rows();
    return { ...result, row: row! };
  };
  beforeEach(() => owe(keeper.personId, 'one', clock.now()));

  it('that says later is asked again later', async () => {
    server.temper = () => 'later';
    const { row, unavailable } = await trySend();
    expect({ unavailable, attempts: row.attempts, wait: row.nextAttemptAt.getTime() - clock.now() }).toEqual({ unavailable: false, attempts: 1, wait: 30_000 });
    expect(row.lastError).toContain('451');
    server.temper = () => 'takes';
    expect((await send()).mails).toBe(0);
    clock.advance(30_000);
    expect((await send()).mails).toBe(1);
    expect(await rows()).toMatchObject([{ attempts: 2, lastError: null }]);
  });

  it('that refuses is asked five times, and then the failure stands with its reason', async () => {
    server.temper = () => 'refuses';
    let tries = 0;
    for (; tries < 20; tries += 1) {
      const { row } = await trySend();
      if (row.failedAt) break;
      clock.set(row.nextAttemptAt.getTime());
    }
    expect(tries + 1).toBe(5);
    expect(await rows()).toMatchObject([{ attempts: 5, sentAt: null }]);
    expect((await rows())[0]!.lastError).toContain('no such mailbox');
    expect((await send()).mails).toBe(0);
  });

  it('that was long away and then says no once is asked again', async () => {
    await db.sequelize.query('update outbox set attempts = 30');
    server.temper = (count) => (count === 0 ? 'refuses' : 'takes');
    const { row } = await trySend();
    expect(row).toMatchObject({ failedAt: null, refusals: 1 });
    clock.set(row.nextAttemptAt.getTime());
    expect((await send()).mails).toBe(1);
  });

  it('that is not there leaves the mail waiting, and the next one untried', async () => {
    const other = await buildMember('hand');
    await owe(other.personId, 'two', clock.now());
    const { port } = server;
    await server.stop();
    const { unavailable } = await trySend();
    expect(unavailable).toBe(true);
    expect((await rows()).map((row) => row.attempts).toSorted()).toEqual([0, 1]);
    server = await startMailServer(port);
    clock.advance(10_000);
    expect((await send()).mails).toBe(2);
  });

  it('that hangs is left after a while', async () => {
    server.temper = () => 'hangs';
    const { unavailable, row } = await trySend();
    expect(unavailable).toBe(true);
    expect(row).toMatchObject({ attempts: 1, sentAt: null, leasedUntil: null });
    expect(row.lastError).toBeTruthy();
  });

  it('that takes a mail and hangs up gets it once more under the same identifier', async () => {
    server.temper = (count) => (count === 0 ? 'drops' : 'takes');
    expect((await trySend()).unavailable).toBe(true);
    clock.advance(10_000);
    expect((await send()).mails).toBe(1);
    expect(server.taken).toHaveLength(2);
    expect(server.taken[0]!.messageId).toBe(server.taken[1]!.messageId);
  });

  it('that was away for an hour gets one mail for each person when it is back', async () => {
    const { port } = server;
    await server.stop();
    for (let minute = 0; minute < 60; minute += 1) {
      if (minute % 4 === 0) await owe(keeper.personId, `minute ${minute}`, clock.now());
      await send(`smtp://127.0.0.1:${port}`);
      clock.advance(60_000);
    }
    server = await startMailServer(port);
    clock.advance(300_000);
    await send();
    expect(server.taken).toHaveLength(1);
    expect(server.taken[0]!.subject).toContain('16 messages');
    expect((await rows()).every((row) => row.sentAt !== null && row.failedAt === null)).toBe(true);
  });
});
