import { beforeEach, describe, expect, it } from 'vitest';
import { Membership } from '@/db/models';
import { updateRule as ruleForm } from '@/lib/contracts/messages';
import { ForbiddenError, InvalidError } from '@/lib/errors';
import { oweDigests } from '@/lib/services/digest/owe';
import { getMessages } from '@/lib/services/messages/get';
import { muteBatch } from '@/lib/services/messages/mutes';
import { sendTestMessage } from '@/lib/services/messages/send-test';
import { updateEscalation, updateMessages, updateRule } from '@/lib/services/messages/update';
import { useDatabase } from '../support/database';
import { buildBatch, buildMember } from '../support/factories';
import { tellingCellar, type Told } from '../support/told';

const db = useDatabase();
const MINUTE = 60_000;
const HOUR = 60 * MINUTE;

const NIGHT = { from: 22 * 60, to: 7 * 60 };

let cellar: Told;
const at = (clock: string, day = 1) => Date.parse(`2027-05-0${day}T${clock}:00Z`);
const begin = async (clock: string) => (cellar = await tellingCellar({ start: at(clock) }));
const actor = (name: string) => cellar.people[name]!;

beforeEach(() => db.sequelize.query('delete from outbox; delete from cellars; delete from people'));

describe('the morning digest', () => {
  const EIGHT = 8 * 60;
  const digest = (name: string, digest_at: number | null = EIGHT) => updateMessages(actor(name), null, { digest_at }, { clock: cellar.clock });
  /** As the worker does, every half hour of virtual time. */
  const morning = async (until: number) => {
    while (cellar.clock.now() < until) {
      await oweDigests({ clock: cellar.clock });
      await cellar.send();
      cellar.clock.advance(30 * MINUTE);
    }
  };

  it('comes once a day at its hour, to those who want it', async () => {
    await begin('06:00');
    await digest('Una');
    await morning(at('06:00', 4));
    expect(cellar.lines).toEqual(['08:00 Una: digest', '08:00 Una: digest', '08:00 Una: digest']);
    expect(cellar.mails[0]).toMatchObject({ subject: 'Low barn: nothing due today' });
    expect(cellar.mails[0]!.text).toContain('Oat stout');
    expect(cellar.mails[0]!.text).toContain('Sat 1 May');
  });

  it('does not come late in the day when the house was off in the morning', async () => {
    await begin('06:00');
    await digest('Una');
    cellar.clock.advance(6 * HOUR);
    await morning(at('20:00'));
    expect(cellar.lines).toEqual([]);
  });

  it('holds the day’s jobs, what is late, and every vessel by need, in one mail for all cellars of a person', async () => {
    await begin('06:00');
    await digest('Una');
    const { cellarId, personId } = actor('Una');
    await db.sequelize.query(
      `insert into jobs (cellar_id, batch_id, kind, source, title, due_at, exact) values ($1, $2, 'reading', 'schedule', 'Read Oat stout', '2027-04-29T10:00Z', false), ($1, $2, 'fining_b', 'timer', 'Second dose into Oat stout', '2027-05-01T15:30Z', true), ($1, $2, 'airlock', 'schedule', 'Water in the airlock', '2027-05-09T10:00Z', false)`,
      { bind: [cellarId, cellar.batch.id] },
    );
    const other = await buildMember('keeper', { name: 'Tove' });
    await buildBatch({ cellarId: other.cellarId, name: 'Sloe mead' });
    await Membership.create({ cellarId: other.cellarId, personId, role: 'hand' });
    const asGuest = await buildBatch({ name: 'Not hers to hear of' });
    await Membership.create({ cellarId: asGuest.cellarId, personId, role: 'guest' });
    await morning(at('09:00'));
    expect(cellar.lines).toEqual(['08:00 Una: digest + digest']);
    const { text } = cellar.mails[0]!;
    expect(text).toContain('late, Thu 29 Apr 10:00: Read Oat stout');
    expect(text).toContain('15:30: Second dose into Oat stout');
    expect(text).not.toContain('Water in the airlock');
    expect(text).toContain('Sloe mead');
    expect(text).not.toContain('Not hers');
  });

  it('names the next job on a day with none, and who muted what', async () => {
    await begin('06:00');
    await digest('Una');
    await db.sequelize.query(`insert into jobs (cellar_id, batch_id, kind, source, title, due_at, exact) values ($1, $2, 'airlock', 'schedule', 'Water in the airlock', '2027-05-09T10:00Z', false)`, { bind: [cellar.cellar.id, cellar.batch.id] });
    await muteBatch(actor('Piet'), cellar.batch.id, { until: new Date(at('18:00')).toISOString() }, { clock: cellar.clock });
    await morning(at('08:30'));
    expect(cellar.mails[0]!.text).toContain('Nothing due today. Next: Water in the airlock, Sun 9 May 10:00.');
    expect(cellar.mails[0]!.text).toContain('Oat stout is muted until Sat 1 May 18:00 by Piet.');
  });

  it('goes out together with what the quiet hours held', async () => {
    await begin('23:00');
    await updateMessages(actor('Una'), null, { quiet: { from: 22 * 60, to: EIGHT } }, { clock: cellar.clock });
    await digest('Una');
    cellar.set(['stall']);
    await cellar.run(at('07:55', 2));
    cellar.clock.set(at('08:00', 2));
    await oweDigests({ clock: cellar.clock });
    await cellar.send();
    expect(cellar.lines.at(-1)).toBe('08:00 Una: stalled opened + digest');
  });

  it('is not sent to somebody who has left the cellar in the meantime', async () => {
    await begin('07:59');
    await digest('Piet');
    cellar.clock.advance(2 * MINUTE);
    await oweDigests({ clock: cellar.clock });
    await Membership.destroy({ where: { personId: actor('Piet').personId } });
    await cellar.send();
    expect(cellar.lines).toEqual([]);
  });
});

describe('settings', () => {
  beforeEach(() => begin('12:00'));

  it('are one’s own but for the cellar’s rules and turns, which its keeper sets', async () => {
    await expect(updateRule(actor('Piet'), null, ruleForm.parse({ rule: 'stalled', enabled: false }))).rejects.toThrow(ForbiddenError);
    await expect(updateEscalation(actor('Inga'), null, { after_min: 30, people: [] })).rejects.toThrow(ForbiddenError);
    await updateMessages(actor('Inga'), null, { quiet: NIGHT, digest_at: 450, choices: [{ rule: 'rack', means: 'mail', wanted: false }] });
    expect(await getMessages(actor('Inga'), null)).toMatchObject({ quiet: NIGHT, digest_at: 450 });
    const una = await getMessages(actor('Una'), null);
    expect(una).toMatchObject({ quiet: null, digest_at: null });
    expect(una.choices.find((choice) => choice.rule === 'rack' && choice.means === 'mail')?.wanted).toBe(true);
  });

  it('tell nobody in turn who is a stranger or a guest', async () => {
    const guest = await buildMember('guest', { cellarId: cellar.cellar.id });
    const stranger = await buildMember('keeper');
    for (const person of [guest, stranger]) await expect(updateEscalation(actor('Una'), null, { after_min: 30, people: [person.personId] })).rejects.toThrow(InvalidError);
  });

  it('keep what somebody left out as it was, and forget what is as usual', async () => {
    await updateMessages(actor('Una'), null, { quiet: NIGHT });
    await updateMessages(actor('Una'), null, { digest_at: 450 });
    expect(await getMessages(actor('Una'), null)).toMatchObject({ quiet: NIGHT, digest_at: 450 });
    await updateRule(actor('Una'), null, ruleForm.parse({ rule: 'stalled', for_min: 180 }));
    expect((await getMessages(actor('Una'), null)).rules.find(({ rule }) => rule === 'stalled')).toMatchObject({ changed: true, for_min: 180, begins: 'Told when the fall is slow, stuck or stopped by cold for 3 h.' });
    await updateRule(actor('Una'), null, ruleForm.parse({ rule: 'stalled', usual: true }));
    expect((await getMessages(actor('Una'), null)).rules.find(({ rule }) => rule === 'stalled')).toMatchObject({ changed: false, for_min: 60 });
  });

  it('send a try to the asker alone, and not without end', async () => {
    for (let index = 0; index < 6; index += 1) await sendTestMessage(actor('Una'), { clock: cellar.clock });
    await expect(sendTestMessage(actor('Una'), { clock: cellar.clock })).rejects.toThrow('enough for now');
    await cellar.send();
    expect(cellar.lines).toEqual([`12:00 Una: ${Array(6).fill('test').join(' + ')}`]);
  });
});
