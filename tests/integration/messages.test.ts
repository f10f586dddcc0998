import { beforeEach, describe, expect, it } from 'vitest';
import { inTransaction } from '@/db/client';
import { SignIn } from '@/db/models';
import { keepDevice } from '@/db/queries/devices';
import { ForbiddenError, InvalidError, NotFoundError } from '@/lib/errors';
import { createMute as muteForm, updateEscalation as turnsForm, updateRule as ruleForm } from '@/lib/contracts/messages';
import { acknowledgeAlert } from '@/lib/services/alerts/acknowledge';
import { listAlerts } from '@/lib/services/alerts/list';
import { endMute, listMutes, muteBatch } from '@/lib/services/messages/mutes';
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

  it('say of what waits for quiet hours that it waits longer', async () => {
    await quiet('Una', { from: 11 * 60, to: 13 * 60 });
    cellar.set(['stall']);
    await cellar.run(at('12:10'));
    const una = async () => (await openAlert()).told.find(({ person }) => person.startsWith('Una'));
    expect(await una()).toMatchObject({ state: 'held', held_by: 'quiet', due: '2027-05-01T13:00:00.000Z' });
    await mute(at('18:00'));
    await cellar.run(at('12:20'));
    expect(await una()).toMatchObject({ state: 'held', held_by: 'mute', due: '2027-05-01T18:00:00.000Z' });
    const { id } = (await listMutes(actor('Una'), { clock: cellar.clock })).items[0]!;
    await endMute(actor('Piet'), id, { clock: cellar.clock });
    await cellar.run(at('12:25'));
    expect(await una()).toMatchObject({ state: 'held', held_by: 'quiet', due: '2027-05-01T13:00:00.000Z' });
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
