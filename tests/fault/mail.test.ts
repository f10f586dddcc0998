import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { OutboxMail } from '@/db/models';
import { ManualClock } from '@/lib/clock';
import { smtpTransport } from '@/lib/mail/smtp';
import { sendDue } from '@/lib/services/outbox/send';
import { useDatabase } from '../support/database';
import { buildMember } from '../support/factories';
import { startMailServer, type MailServer, type Temper } from '../support/mail-server';
import { alertMail, owe } from '../support/owed';
import { seeded } from '../support/random';

const db = useDatabase();

let server: MailServer;
beforeEach(async () => {
  await db.sequelize.query('delete from outbox');
  server = await startMailServer();
});
afterEach(() => server.stop());

const PEOPLE = 8;
const MAILS_EACH = 3;
const TEMPERS: readonly Temper[] = ['takes', 'takes', 'takes', 'later', 'refuses', 'drops', 'hangs'];

describe('a mail server that says later, says no, hangs, drops and goes away', () => {
  it.each([1, 2, 3, 4, 5])('gets every mail at least once and none more than twice (seed %i)', async (seed) => {
    const random = seeded(seed);
    // The same trouble does not come twice to one mail after it was taken: then it is taken for good.
    const dropped = new Set<number>();
    server.temper = (count) => {
      const temper = TEMPERS[Math.floor(random() * TEMPERS.length)]!;
      if (temper !== 'drops') return temper;
      dropped.add(count);
      return dropped.size > 1 ? 'takes' : temper;
    };
    const clock = new ManualClock(Date.now() + 1_000);
    const people = await Promise.all(Array.from({ length: PEOPLE }, () => buildMember('hand')));
    const names: string[] = [];
    for (const [who, person] of people.entries())
      for (let index = 0; index < MAILS_EACH; index += 1) {
        const name = `Batch ${who}-${index}.`;
        names.push(name);
        await owe(person.personId, name, clock.now() + Math.floor(random() * 600_000), { payload: alertMail({ name }) });
      }

    let rounds = 0;
    let away = false;
    while ((await OutboxMail.count({ where: { sentAt: null } })) > 0) {
      rounds += 1;
      expect(rounds).toBeLessThan(400);
      if (!away && random() < 0.05) {
        away = true;
        await server.stop();
      } else if (away && random() < 0.4) {
        away = false;
        const { taken, temper, port } = server;
        server = await startMailServer(port);
        Object.assign(server, { taken, temper });
      }
      const transport = smtpTransport({ url: server.url, from: 'watch@barn.example', connectTimeoutMs: 400, sendTimeoutMs: 400 });
      await sendDue({ transport, clock, publicUrl: 'https://barn.example', messageHost: 'barn.example', leaseMs: 2_000, random });
      transport.close();
      clock.advance(Math.floor(random() * 120_000));
    }

    expect(await OutboxMail.count({ where: { failedAt: null } })).toBe(names.length);
    const times = names.map((name) => server.taken.filter((mail) => mail.text.includes(name)).length);
    expect(Math.min(...times)).toBeGreaterThanOrEqual(1);
    expect(Math.max(...times)).toBeLessThanOrEqual(2);
  });
});
