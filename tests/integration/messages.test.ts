import { beforeEach, describe, expect, it } from 'vitest';
import { inTransaction } from '@/db/client';
import { Membership, OutboxMail, SignIn } from '@/db/models';
import { keepDevice } from '@/db/queries/devices';
import { ConflictError, ForbiddenError, InvalidError, NotFoundError } from '@/lib/errors';
import { createMute as muteForm, updateEscalation as turnsForm, updateRule as ruleForm } from '@/lib/contracts/messages';
import { acknowledgeAlert } from '@/lib/services/alerts/acknowledge';
import { listAlerts } from '@/lib/services/alerts/list';
import { oweDigests } from '@/lib/services/digest/owe';
import { getMessages } from '@/lib/services/messages/get';
import { endMute, listMutes, muteBatch } from '@/lib/services/messages/mutes';
import { sendTestMessage } from '@/lib/services/messages/send-test';
import { updateEscalation, updateMessages, updateRule } from '@/lib/services/messages/update';
import { useDatabase } from '../support/database';
import { buildBatch, buildMember } from '../support/factories';
import { DEVICE_KEYS } from '../support/message-rows';
import { tellingCellar, type Told } from '../support/told';

const db = useDatabase();
const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
const NIGHT = { from: 22 * 60, to: 7 * 60 };

let cellar: Told;
const at = (clock: string, day = 1) => Date.parse(`2027-05-0${day}T${clock}:00Z`);
const begin = async (clock: string, options: Partial<Parameters<typeof tellingCellar>[0]> = {}) => (cellar = await tellingCellar({ start: at(clock), ...options }));
const actor = (name: string) => cellar.people[name]!;
const openAlert = async () => (await listAlerts(actor('Una'), { limit: 50 })).items[0]!;
const quiet = (name: string, hours: { from: number; to: number } | null = NIGHT) => updateMessages(actor(name), null, { quiet: hours }, { clock: cellar.clock });
const turns = (order: string[], after_min = 30) => updateEscalation(actor('Una'), null, turnsForm.parse({ after_min, people: order.map((name) => actor(name).personId) }), { clock: cellar.clock });
const device = async (name: string) => {
  const signIn = await SignIn.create({ personId: actor(name).personId, expiresAt: new Date('2030-01-01') });
  await inTransaction((transaction) => keepDevice({ personId: actor(name).personId, signInId: signIn.id, endpoint: `https://push.example/${signIn.id}`, ...DEVICE_KEYS, userAgent: '' }, transaction));
  return signIn;
};

beforeEach(() => db.sequelize.query('delete from outbox; delete from cellars; delete from people'));

/** Of one minute in the order of names: who of them is told first is nobody's promise. */
function inOrder(lines: readonly string[]): string[] {
  const minutes: string[][] = [];
  for (const line of lines) {
    const last = minutes.at(-1);
    if (last?.[0]?.slice(0, 5) === line.slice(0, 5)) last.push(line);
    else minutes.push([line]);
  }
  return minutes.flatMap((minute) => minute.toSorted());
}

interface Step {
  /** Wall time at which it happens. */
  at: string;
  do: () => Promise<unknown> | void;
}
interface Replay {
  name: string;
  start: string;
  before?: () => Promise<unknown>;
  steps: Step[];
  until: [string, number];
  lines: string[];
}

const set = (...conditions: string[]) => cellar.set(conditions);
const take = async () => acknowledgeAlert(actor('Piet'), (await openAlert()).id, { note: null, look_again_at: null }, { clock: cellar.clock });
const mute = (until: number, who = 'Piet') => muteBatch(actor(who), cellar.batch.id, muteForm.parse({ until: new Date(until).toISOString() }), { clock: cellar.clock });

/** The machine, the rules, the quiet hours, turns and mutes together, in virtual time: what goes out, when, to whom. */
const REPLAYS: Replay[] = [
  {
    name: 'tells everybody at once where nothing else is set, and that it has passed',
    start: '12:00',
    steps: [{ at: '12:00', do: () => set('stall') }, { at: '13:00', do: () => set() }],
    until: ['21:00', 1],
    lines: ['12:00 Una: stalled opened', '12:00 Piet: stalled opened', '12:00 Inga: stalled opened', '19:00 Una: stalled resolved', '19:00 Piet: stalled resolved', '19:00 Inga: stalled resolved'],
  },
  {
    name: 'puts what starts together into one message for each person',
    start: '12:00',
    steps: [{ at: '12:00', do: () => set('stall', 'cold', 'ready') }],
    until: ['13:00', 1],
    lines: ['Una', 'Piet', 'Inga'].map((name) => `12:00 ${name}: stalled opened + temperature opened + rack opened`),
  },
  {
    name: 'holds messages back in a person’s quiet hours and brings them as one after; the others are told',
    start: '23:00',
    before: () => quiet('Una'),
    steps: [{ at: '23:00', do: () => set('stall') }, { at: '01:00+', do: () => set('stall', 'cold') }],
    until: ['08:00', 2],
    lines: ['23:00 Piet: stalled opened', '23:00 Inga: stalled opened', '01:00 Piet: temperature opened', '01:00 Inga: temperature opened', '07:00 Una: stalled opened + temperature opened'],
  },
  {
    name: 'lets what can hurt somebody through quiet hours, and its end',
    start: '23:00',
    before: async () => Promise.all(['Una', 'Piet', 'Inga'].map((name) => quiet(name))),
    steps: [{ at: '23:00', do: () => set('foam') }, { at: '00:00+', do: () => set() }],
    until: ['04:00', 2],
    lines: ['23:00 opened', '03:00 resolved'].flatMap((line) => ['Una', 'Piet', 'Inga'].map((name) => `${line.slice(0, 5)} ${name}: foam ${line.slice(6)}`)),
  },
  {
    name: 'says nothing in the morning of what began and passed in the night',
    start: '22:30',
    before: async () => Promise.all(['Una', 'Piet', 'Inga'].map((name) => quiet(name))),
    steps: [{ at: '22:30', do: () => set('cold') }, { at: '23:30', do: () => set() }],
    until: ['08:00', 2],
    lines: [],
  },
  {
    name: 'tells one after another while nobody answers',
    start: '12:00',
    before: () => turns(['Piet', 'Inga']),
    steps: [{ at: '12:00', do: () => set('stall') }],
    until: ['14:00', 1],
    lines: ['12:00 Una: stalled opened', '12:30 Piet: stalled opened', '13:00 Inga: stalled opened'],
  },
  {
    name: 'tells nobody further once somebody has it',
    start: '12:00',
    before: () => turns(['Piet', 'Inga']),
    steps: [{ at: '12:00', do: () => set('stall') }, { at: '12:40', do: take }],
    until: ['14:00', 1],
    lines: ['12:00 Una: stalled opened', '12:30 Piet: stalled opened'],
  },
  {
    name: 'tells nobody further once it has passed, and its end only to those who heard of it',
    start: '12:00',
    before: () => turns(['Piet', 'Inga'], 600),
    steps: [{ at: '12:00', do: () => set('cold') }, { at: '12:30', do: () => set() }],
    until: ['23:00', 1],
    lines: ['12:00 Una: temperature opened', '14:30 Una: temperature resolved'],
  },
  {
    name: 'does not wait with what is no trouble',
    start: '12:00',
    before: () => turns(['Una', 'Piet', 'Inga']),
    steps: [{ at: '12:00', do: () => set('ready') }],
    until: ['12:30', 1],
    lines: ['12:00 Una: rack opened', '12:00 Piet: rack opened', '12:00 Inga: rack opened'],
  },
  {
    name: 'tells the first of the order at once where everybody is in it',
    start: '12:00',
    before: () => turns(['Inga', 'Una', 'Piet'], 15),
    steps: [{ at: '12:00', do: () => set('stall') }],
    until: ['13:00', 1],
    lines: ['12:00 Inga: stalled opened', '12:15 Una: stalled opened', '12:30 Piet: stalled opened'],
  },
  {
    name: 'goes on to the next while the first one sleeps',
    start: '23:00',
    before: async () => {
      await turns(['Piet', 'Inga']);
      await quiet('Una');
    },
    steps: [{ at: '23:00', do: () => set('stall') }, { at: '23:40', do: take }],
    until: ['08:00', 2],
    lines: ['23:30 Piet: stalled opened'],
  },
  {
    name: 'tells nobody of a muted vessel until the mute ends, and then what still stands',
    start: '12:00',
    steps: [{ at: '12:00', do: () => mute(at('18:00')) }, { at: '12:05', do: () => set('stall') }, { at: '13:00', do: () => set('stall', 'cold') }],
    until: ['19:00', 1],
    lines: ['Una', 'Piet', 'Inga'].map((name) => `18:00 ${name}: stalled opened + temperature opened`),
  },
  {
    name: 'lets what can hurt somebody through a mute',
    start: '12:00',
    steps: [{ at: '12:00', do: () => mute(at('18:00')) }, { at: '12:05', do: () => set('foam') }],
    until: ['13:00', 1],
    lines: ['12:05 Una: foam opened', '12:05 Piet: foam opened', '12:05 Inga: foam opened'],
  },
  {
    name: 'tells at once what a mute held when it is ended early',
    start: '12:00',
    steps: [
      { at: '12:00', do: () => mute(at('18:00')) },
      { at: '12:05', do: () => set('stall') },
      { at: '14:00', do: async () => endMute(actor('Inga'), (await listMutes(actor('Inga'), { clock: cellar.clock })).items[0]!.id, { clock: cellar.clock }) },
    ],
    until: ['15:00', 1],
    lines: ['14:00 Una: stalled opened', '14:00 Piet: stalled opened', '14:00 Inga: stalled opened'],
  },
  {
    name: 'goes over from a mute into the quiet hours',
    start: '20:00',
    before: () => quiet('Una'),
    steps: [{ at: '20:00', do: () => mute(at('23:00')) }, { at: '20:05', do: () => set('stall') }],
    until: ['08:00', 2],
    lines: ['23:00 Piet: stalled opened', '23:00 Inga: stalled opened', '07:00 Una: stalled opened'],
  },
  {
    name: 'keeps to the hours that hold when the message would go, not to those of the time it was owed',
    start: '23:00',
    before: () => quiet('Una'),
    steps: [{ at: '23:00', do: () => set('stall') }, { at: '00:30+', do: () => quiet('Una', null) }],
    until: ['02:00', 2],
    lines: ['23:00 Piet: stalled opened', '23:00 Inga: stalled opened', '00:30 Una: stalled opened'],
  },
  {
    name: 'sends to a device what wants somebody to go and look, and by mail everything',
    start: '12:00',
    before: () => device('Una'),
    steps: [{ at: '12:00', do: () => set('stall', 'ready') }],
    until: ['12:10', 1],
    lines: ['12:00 Una (device): stalled opened', '12:00 Una: stalled opened + rack opened', '12:00 Piet: stalled opened + rack opened', '12:00 Inga: stalled opened + rack opened'],
  },
  {
    name: 'tells a person by the means they chose',
    start: '12:00',
    before: async () => {
      await device('Una');
      await updateMessages(actor('Una'), null, { choices: [{ rule: 'stalled', means: 'mail', wanted: false }, { rule: 'rack', means: 'mail', wanted: false }] }, { clock: cellar.clock });
      await updateMessages(actor('Piet'), null, { choices: [{ rule: 'stalled', means: 'mail', wanted: false }] }, { clock: cellar.clock });
    },
    steps: [{ at: '12:00', do: () => set('stall', 'ready') }],
    until: ['12:10', 1],
    lines: ['12:00 Una (device): stalled opened', '12:00 Piet: rack opened', '12:00 Inga: stalled opened + rack opened'],
  },
  {
    name: 'opens no alert by a rule that is off, ends the one that is open, and begins anew when it is on again',
    start: '12:00',
    steps: [
      { at: '12:00', do: () => set('stall') },
      { at: '13:00', do: () => updateRule(actor('Una'), null, ruleForm.parse({ rule: 'stalled', enabled: false }), { clock: cellar.clock }) },
      { at: '15:00', do: () => updateRule(actor('Una'), null, ruleForm.parse({ rule: 'stalled', usual: true }), { clock: cellar.clock }) },
    ],
    until: ['16:00', 1],
    lines: ['Una', 'Piet', 'Inga'].flatMap((name) => [`12:00 ${name}: stalled opened`, `15:00 ${name}: stalled opened`]).sort(),
  },
  {
    name: 'is more patient where the vessel’s own rule says so',
    start: '12:00',
    before: async () => {
      await updateRule(actor('Una'), null, ruleForm.parse({ rule: 'temperature', batch_id: cellar.batch.id, for_min: 1440 }), { clock: cellar.clock });
    },
    steps: [{ at: '12:00', do: () => set('cold') }],
    until: ['23:00', 1],
    lines: [],
  },
];

describe('what goes out, when, to whom', () => {
  it.each(REPLAYS)('$name', async ({ start, before, steps, until, lines }) => {
    await begin(start);
    await before?.();
    for (const step of steps) {
      const next = step.at.endsWith('+');
      await cellar.run(at(step.at.replace('+', ''), next ? 2 : 1));
      await step.do();
    }
    await cellar.run(at(...until));
    expect(inOrder(cellar.lines)).toEqual(inOrder(lines));
  });

  it('goes by each person’s own clock', async () => {
    await begin('12:00', { zone: 'UTC' });
    await actor('Una').person.update({ timeZone: 'Pacific/Auckland' });
    await quiet('Una');
    cellar.set(['stall']);
    await cellar.run(at('20:00'));
    // 12:00 UTC is midnight there; their morning is 19:00 UTC.
    expect(inOrder(cellar.lines)).toEqual(['12:00 Inga: stalled opened', '12:00 Piet: stalled opened', '19:00 Una: stalled opened']);
  });

  it('says beside the alert who waits, for what, and who need not be told any more', async () => {
    await begin('23:00');
    await quiet('Una');
    await turns(['Piet']);
    cellar.set(['stall']);
    await cellar.run(at('23:10'));
    const told = () => openAlert().then((alert) => Object.fromEntries(alert.told.map(({ person, state, held_by, due }) => [person, [state, held_by, due]])));
    expect(await told()).toEqual({ Una: ['held', 'quiet', '2027-05-02T07:00:00.000Z'], Piet: ['held', 'turn', '2027-05-01T23:30:00.000Z'], Inga: ['sent', null, null] });
    await take();
    const why = 'somebody had it before its time came';
    expect(Object.fromEntries((await openAlert()).told.map(({ person, state, error }) => [person, [state, error]]))).toEqual({ Una: ['dropped', why], Piet: ['dropped', why], Inga: ['sent', null] });
  });
});

describe('mutes', () => {
  beforeEach(() => begin('12:00'));

  it('are for those who tend the vessels, for a time that lies ahead and ends', async () => {
    const guest = await buildMember('guest', { cellarId: cellar.cellar.id });
    await expect(muteBatch(guest, cellar.batch.id, { until: new Date(at('18:00')).toISOString() }, { clock: cellar.clock })).rejects.toThrow(ForbiddenError);
    await expect(mute(at('11:00'))).rejects.toThrow(InvalidError);
    await expect(mute(at('12:00') + 32 * 24 * HOUR)).rejects.toThrow(InvalidError);
    expect(await mute(at('18:00'), 'Inga')).toMatchObject({ by: { name: 'Inga' }, until: '2027-05-01T18:00:00.000Z', batch: { name: 'Oat stout' } });
  });

  it('are one a vessel: the new one takes the old one’s place, a shorter one lets go', async () => {
    await mute(at('23:00'));
    cellar.set(['stall']);
    await cellar.run(at('12:20'));
    await mute(at('14:00'), 'Una');
    expect((await listMutes(actor('Piet'), { clock: cellar.clock })).items).toMatchObject([{ by: { name: 'Una' }, until: '2027-05-01T14:00:00.000Z' }]);
    await cellar.run(at('15:00'));
    expect(cellar.lines.map((line) => line.slice(0, 5))).toEqual(['14:00', '14:00', '14:00']);
  });

  it('do not touch another vessel, or another cellar', async () => {
    const other = await buildBatch({ cellarId: cellar.cellar.id, name: 'Perry' });
    await mute(at('18:00'));
    cellar.set(['stall'], other);
    await cellar.run(at('12:10'));
    expect(cellar.lines).toHaveLength(3);
    const stranger = await buildMember('keeper');
    const { id } = (await listMutes(actor('Una'), { clock: cellar.clock })).items[0]!;
    await expect(endMute(stranger, id, { clock: cellar.clock })).rejects.toThrow(NotFoundError);
    await expect(muteBatch(stranger, cellar.batch.id, { until: new Date(at('18:00')).toISOString() }, { clock: cellar.clock })).rejects.toThrow(NotFoundError);
    expect((await listMutes(stranger, { clock: cellar.clock })).items).toEqual([]);
  });
});

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
    await mute(at('18:00'));
    await morning(at('08:30'));
    expect(cellar.mails[0]!.text).toContain('Nothing due today. Next: Water in the airlock, Sun 9 May 10:00.');
    expect(cellar.mails[0]!.text).toContain('Oat stout is muted until Sat 1 May 18:00 by Piet.');
  });

  it('goes out together with what the quiet hours held', async () => {
    await begin('23:00');
    await quiet('Una', { from: 22 * 60, to: EIGHT });
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

describe('the link in a mail', () => {
  let token: string;
  beforeEach(async () => {
    await begin('12:00');
    cellar.set(['stall']);
    await cellar.run(at('12:05'));
    token = linkOf('Inga');
  });
  const linkOf = (name: string) => /\/take\/([\w-]+)/.exec(cellar.mails.find((mail) => mail.to.name === name)!.text)![1]!;
  const links = () => import('@/lib/services/alerts/take-links');

  it('shows what it is about, and takes nothing by being looked at', async () => {
    const { openTakeLink } = await links();
    for (let index = 0; index < 3; index += 1) expect(await openTakeLink(token, { clock: cellar.clock })).toMatchObject({ person: 'Inga', headline: 'Stopped at 1.041.', state: 'open', used: false });
    expect((await openAlert()).state).toBe('open');
  });

  it('takes the alert for its person, once', async () => {
    const { useTakeLink, openTakeLink } = await links();
    expect(await useTakeLink(token, { clock: cellar.clock })).toMatchObject({ state: 'acknowledged', taken_by: 'Inga', used: true });
    expect(await openAlert()).toMatchObject({ state: 'acknowledged', acknowledged_by: { name: 'Inga' } });
    await expect(useTakeLink(token, { clock: cellar.clock })).rejects.toThrow(ConflictError);
    expect(await openTakeLink(token, { clock: cellar.clock })).toMatchObject({ used: true });
  });

  it('takes it once where it is used twice in one instant', async () => {
    const { useTakeLink } = await links();
    const tries = await Promise.allSettled(Array.from({ length: 5 }, () => useTakeLink(token, { clock: cellar.clock })));
    expect(tries.filter(({ status }) => status === 'fulfilled')).toHaveLength(1);
  });

  it('is each person’s own, and takes nothing out of another’s hands', async () => {
    const { useTakeLink } = await links();
    expect(new Set(['Una', 'Piet', 'Inga'].map(linkOf)).size).toBe(3);
    await useTakeLink(linkOf('Piet'), { clock: cellar.clock });
    await expect(useTakeLink(token, { clock: cellar.clock })).rejects.toThrow('Somebody has it already.');
    expect(await openAlert()).toMatchObject({ acknowledged_by: { name: 'Piet' } });
  });

  it('opens nothing after three days, for somebody who left, for one who became a guest, or where it was made up', async () => {
    const { openTakeLink, useTakeLink } = await links();
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
    const { openTakeLink, useTakeLink } = await links();
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
