import { Op } from 'sequelize';
import { describe, expect, it } from 'vitest';
import { Entry } from '@/db/models';
import { oweMails } from '@/db/queries/outbox';
import { inTransaction } from '@/db/client';
import type { ManualClock } from '@/lib/clock';
import { finingForm, secondDoseForm } from '@/lib/contracts/family';
import { jobQuery } from '@/lib/contracts/jobs';
import { compose } from '@/lib/mail/compose';
import type { TimerPayload } from '@/lib/mail/payload';
import type { OutgoingMail } from '@/lib/mail/transport';
import { composePush } from '@/lib/push/compose';
import { secondDose } from '@/lib/services/finings/second';
import { startFining } from '@/lib/services/finings/start';
import { dropJob, snoozeJob } from '@/lib/services/jobs/change';
import { doJob, undoJob } from '@/lib/services/jobs/done';
import { listJobs } from '@/lib/services/jobs/list';
import { sendDue } from '@/lib/services/outbox/send';
import { ciderAt, clockAt, HOUR, isoAt, NOON } from '../support/cellar';
import { useDatabase } from '../support/database';
import { buildMember } from '../support/factories';
import { english } from '../support/texts';

useDatabase();

const MINUTE = 60_000;
const two = (at = NOON) => finingForm.parse({ at: isoAt(at), fining: 'two-part' });

/** What reaches the mail server when it is asked at that time. */
async function sentBy(clock: ManualClock): Promise<OutgoingMail[]> {
  const mails: OutgoingMail[] = [];
  await sendDue({ transport: { send: async (mail) => void mails.push(mail), close: () => undefined }, clock, publicUrl: 'https://barn.example', messageHost: 'barn.example', leaseMs: 60_000, random: () => 0.5 });
  return mails;
}

async function started() {
  const brewer = await buildMember('brewer');
  const batch = await ciderAt(brewer);
  const clock = clockAt();
  const run = await startFining(brewer, batch.id, two(), clock);
  const job = (await listJobs(brewer, jobQuery.parse({}), clock)).items.find((item) => item.kind === 'fining_b')!;
  return { brewer, batch, clock, run, job };
}

describe('the clock of a two-part fining', () => {
  it('reaches whoever put the first dose in, once, at its minute', async () => {
    const { brewer, clock } = await started();
    clock.advance(HOUR - MINUTE);
    // Something else that is due sooner does not take it along.
    await inTransaction((transaction) => oweMails([{ cellarId: brewer.cellarId, alertId: null, personId: brewer.personId, dedupeKey: `test:${brewer.personId}`, payload: { template: 'test', at: isoAt(clock.now()), time_zone: 'UTC' }, notBefore: new Date(clock.now()) }], transaction));
    expect((await sentBy(clock)).map((mail) => mail.subject)).toEqual(['A message to see whether messages arrive']);
    clock.advance(MINUTE);
    const [mail, ...more] = await sentBy(clock);
    expect(more).toEqual([]);
    expect(mail).toMatchObject({ subject: 'Now: Second dose into Orchard cider: gelatine or chitosan', to: { address: brewer.person.email } });
    expect(mail!.text).toContain('Keep the order');
    expect(mail!.text).toContain('https://barn.example/rounds');
    clock.advance(HOUR);
    expect(await sentBy(clock)).toEqual([]);
  });

  it('is silent once the second dose is in or the job is off the rounds, and rings again where the tick is taken back', async () => {
    const given = await started();
    await secondDose(given.brewer, given.run.id, secondDoseForm.parse({ at: isoAt(NOON + 50 * MINUTE) }), clockAt(NOON + 50 * MINUTE));
    const dropped = await started();
    await dropJob(dropped.brewer, dropped.job.id, dropped.clock);
    const back = await started();
    await doJob(back.brewer, back.job.id, null, back.clock);
    back.clock.advance(5_000);
    await undoJob(back.brewer, back.job.id, back.clock);
    const takenBack = await Entry.findOne({ where: { cellarId: back.brewer.cellarId, removedAt: { [Op.not]: null } }, rejectOnEmpty: true });
    expect(takenBack.removedAt?.getTime()).toBe(back.clock.now());
    const mails = await sentBy(clockAt(NOON + 2 * HOUR));
    expect(mails.map((mail) => mail.to.address)).toEqual([back.brewer.person.email]);
  });

  it('rings later where it is put off', async () => {
    const { brewer, job, clock } = await started();
    await snoozeJob(brewer, job.id, isoAt(NOON + 3 * HOUR), clock);
    expect(await sentBy(clockAt(NOON + 2 * HOUR))).toEqual([]);
    expect(await sentBy(clockAt(NOON + 3 * HOUR))).toHaveLength(1);
  });
});

const timer = (name: string): TimerPayload => ({ template: 'timer', due: isoAt(NOON), title: `Second dose into ${name}`, note: 'Keep the order.', batch: { id: name, name, tag: 3, place: null }, cellar: { name: 'Stone loft', time_zone: 'UTC' } });

describe('what it says', () => {
  it('on a phone: what to do now, with its caution, and the rounds behind a tap', () => {
    expect(composePush([timer('Perry')], english)).toMatchObject({ title: 'Now: Second dose into Perry', body: 'Perry, tag 3. Keep the order.', url: '/rounds', urgent: true });
    expect(composePush([timer('Perry'), timer('Mead')], english)).toMatchObject({ body: 'Second dose into Perry\nSecond dose into Mead', urgent: true });
  });

  it('first, among other mails', () => {
    const mail = compose([{ template: 'test', at: isoAt(NOON), time_zone: 'UTC' }, timer('Perry')], { publicUrl: 'https://barn.example', texts: english });
    expect(mail.subject).toBe('Now: Second dose into Perry, and more');
    expect(mail.text).toContain('Keep the order.');
  });
});
