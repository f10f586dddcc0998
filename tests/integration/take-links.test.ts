import { beforeEach, describe, expect, it } from 'vitest';
import { Membership, OutboxMail } from '@/db/models';
import { ConflictError, NotFoundError } from '@/lib/errors';
import { listAlerts } from '@/lib/services/alerts/list';
import { openTakeLink, useTakeLink } from '@/lib/services/alerts/take-links';
import { useDatabase } from '../support/database';
import { tellingCellar, type Told } from '../support/told';

const db = useDatabase();
const HOUR = 3_600_000;

let cellar: Told;
const at = (clock: string, day = 1) => Date.parse(`2027-05-0${day}T${clock}:00Z`);
const begin = async (clock: string) => (cellar = await tellingCellar({ start: at(clock) }));
const openAlert = async () => (await listAlerts(actor('Una'), { limit: 50 })).items[0]!;
const actor = (name: string) => cellar.people[name]!;

beforeEach(() => db.sequelize.query('delete from outbox; delete from cellars; delete from people'));

describe('the link in a mail', () => {
  let token: string;
  beforeEach(async () => {
    await begin('12:00');
    cellar.set(['stall']);
    await cellar.run(at('12:05'));
    token = linkOf('Inga');
  });
  const linkOf = (name: string) => /\/take\/([\w-]+)/.exec(cellar.mails.find((mail) => mail.to.name === name)!.text)![1]!;

  it('shows what it is about, and takes nothing by being looked at', async () => {
    for (let index = 0; index < 3; index += 1) expect(await openTakeLink(token, { clock: cellar.clock })).toMatchObject({ person: 'Inga', headline: 'Stopped at 1.041.', state: 'open', used: false });
    expect((await openAlert()).state).toBe('open');
  });

  it('takes the alert for its person, once', async () => {
    expect(await useTakeLink(token, { clock: cellar.clock })).toMatchObject({ state: 'acknowledged', taken_by: 'Inga', used: true });
    expect(await openAlert()).toMatchObject({ state: 'acknowledged', acknowledged_by: { name: 'Inga' } });
    await expect(useTakeLink(token, { clock: cellar.clock })).rejects.toThrow(ConflictError);
    expect(await openTakeLink(token, { clock: cellar.clock })).toMatchObject({ used: true });
  });

  it('takes it once where it is used twice in one instant', async () => {
    const tries = await Promise.allSettled(Array.from({ length: 5 }, () => useTakeLink(token, { clock: cellar.clock })));
    expect(tries.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
  });

  it('is each person’s own, and takes nothing out of another’s hands', async () => {
    expect(new Set(['Una', 'Piet', 'Inga'].map(linkOf)).size).toBe(3);
    await useTakeLink(linkOf('Piet'), { clock: cellar.clock });
    await expect(useTakeLink(token, { clock: cellar.clock })).rejects.toThrow('Somebody has it already.');
    expect(await openAlert()).toMatchObject({ acknowledged_by: { name: 'Piet' } });
  });

  it('opens nothing after three days, for somebody who left, for one who became a guest, or where it was made up', async () => {
    const neither = async (given: string) => {
      await expect(openTakeLink(given, { clock: cellar.clock })).rejects.toThrow(NotFoundError);
      await expect(useTakeLink(given, { clock: cellar.clock })).rejects.toThrow(NotFoundError);
    };
    await neither(`${token.slice(0, -1)}${token.endsWith('A') ? 'B' : 'A'}`);
    await Membership.update({ role: 'guest' }, { where: { personId: actor('Inga').personId } });
    await neither(token);
    await Membership.destroy({ where: { personId: actor('Piet').personId } });
    await neither(linkOf('Piet'));
    cellar.clock.advance(73 * HOUR);
    await neither(linkOf('Una'));
  });

  it('says that it has passed where it has', async () => {
    cellar.set([]);
    await cellar.run(at('21:00'));
    expect(await openTakeLink(token, { clock: cellar.clock })).toMatchObject({ state: 'resolved' });
    await expect(useTakeLink(token, { clock: cellar.clock })).rejects.toThrow('passed already');
  });

  it('is kept only as a hash', async () => {
    const [rows] = await db.sequelize.query(`select encode(token_hash, 'escape') as hash, take_links::text as row from take_links`);
    expect(rows.length).toBe(3);
    for (const row of rows as Array<{ row: string }>) expect(row.row).not.toContain(token);
    expect(JSON.stringify(await OutboxMail.findAll())).not.toContain(token);
  });
});
