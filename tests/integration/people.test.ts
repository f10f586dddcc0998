import { beforeEach, describe, expect, it } from 'vitest';
import { ApiToken, Cellar, Entry, Invitation, Membership, Person } from '@/db/models';
import type { Actor } from '@/lib/auth/policies';
import type { ManualClock } from '@/lib/clock';
import { createInvitation as invitationForm, createToken as tokenForm } from '@/lib/contracts/people';
import { ConflictError, ForbiddenError, InvalidError, NotFoundError, ThrottledError } from '@/lib/errors';
import { createCellar, deleteCellar } from '@/lib/services/cellars/own';
import { changeRole, handOver, leaveCellar, removeMember } from '@/lib/services/cellars/members';
import { acceptInvitation, joinByInvitation, lookAtInvitation } from '@/lib/services/invitations/accept';
import { createInvitation, listInvitations, revokeInvitation } from '@/lib/services/invitations/manage';
import { signIn } from '@/lib/services/people/sign-in';
import { createToken, listTokens, revokeToken } from '@/lib/services/tokens/manage';
import { from, member, opened, OTHER, PASS, useMail } from '../support/account';
import { useDatabase } from '../support/database';
import { buildBatch, buildEntry, buildSensor, writeReadings } from '../support/factories';
import { post, secretIn } from '../support/letters';

const db = useDatabase();
const DAY = 86_400_000;

const mail = useMail(db);
let clock: ManualClock;
beforeEach(() => {
  clock = mail.clock;
});

const invitation = (email: string, role: Actor['role'] = 'hand') => invitationForm.parse({ email, role });

describe('an invitation', () => {
  it('goes by mail, shows what it offers, and lets somebody new in once', async () => {
    const keeper = await member();
    const made = await createInvitation(keeper, invitation('Newcomer@Loft.example'), clock);
    expect(made).toMatchObject({ email: 'newcomer@loft.example', role: 'hand', state: 'open', mail: 'waiting' });
    const [letter] = await post(mail.server, clock);
    expect(letter!.to).toEqual(['newcomer@loft.example']);
    expect(letter!.text).toContain('It works once.');
    const token = secretIn(letter);
    expect(await lookAtInvitation(token, clock)).toMatchObject({ by: keeper.person.name, role: 'hand', email: 'newcomer@loft.example', has_account: false });

    expect(await joinByInvitation({ token, name: 'New Comer', passphrase: OTHER, time_zone: 'Europe/Lisbon' }, clock)).toEqual({ email: 'newcomer@loft.example' });
    const person = await Person.findOne({ where: { email: 'newcomer@loft.example' }, rejectOnEmpty: true });
    expect(person).toMatchObject({ name: 'New Comer', timeZone: 'Europe/Lisbon' });
    expect(await Membership.findOne({ where: { personId: person.id, cellarId: keeper.cellarId } })).toMatchObject({ role: 'hand' });
    expect((await listInvitations(keeper, clock)).items).toMatchObject([{ state: 'accepted', accepted_by: 'New Comer', mail: 'sent' }]);
    await expect(joinByInvitation({ token, name: 'Second', passphrase: OTHER, time_zone: 'UTC' }, clock)).rejects.toThrow(NotFoundError);
    expect(opened(await signIn({ email: 'newcomer@loft.example', password: OTHER }, false, from(), clock.now())).personId).toBe(person.id);
  });

  it('is accepted by an account that is signed in, with the role it was made for', async () => {
    const [keeper, guest] = [await member(), await member('guest')];
    await createInvitation(keeper, invitation('second-address@loft.example', 'brewer'), clock);
    const [letter] = await post(mail.server, clock);
    expect(await acceptInvitation(guest.personId, secretIn(letter), clock)).toEqual({ id: keeper.cellarId });
    expect(await Membership.findOne({ where: { personId: guest.personId, cellarId: keeper.cellarId } })).toMatchObject({ role: 'brewer' });
    await expect(acceptInvitation((await member('guest')).personId, secretIn(letter), clock)).rejects.toThrow(NotFoundError);
  });

  it('opens nothing once it is taken back, has expired, or a newer one was sent: each with the same answer as one that never was', async () => {
    const keeper = await member();
    const token = async (email: string) => {
      const { id } = await createInvitation(keeper, invitation(email), clock);
      return { id, token: secretIn((await post(mail.server, clock))[0]) };
    };
    const [revoked, expired, older] = [await token('a@loft.example'), await token('b@loft.example'), await token('c@loft.example')];
    await revokeInvitation(keeper, revoked.id, clock);
    const newer = await token('c@loft.example');
    const answer = (secret: string) => lookAtInvitation(secret, clock).then(() => 'open', (error: Error) => error.message);
    const never = await answer('A'.repeat(32));
    expect(never).toMatch(/no such invitation/);
    expect(await answer(revoked.token)).toBe(never);
    expect(await answer(older.token)).toBe(never);
    expect(await answer(newer.token)).toBe('open');
    expect(await answer(expired.token)).toBe('open');
    clock.advance(7 * DAY);
    expect(await answer(expired.token)).toBe(never);
    expect((await listInvitations(keeper, clock)).items.find((item) => item.id === expired.id)?.state).toBe('expired');
  });

  it('is not sent any more once it was taken back before the mail went', async () => {
    const keeper = await member();
    const { id } = await createInvitation(keeper, invitation('soon@loft.example'), clock);
    await revokeInvitation(keeper, id, clock);
    expect(await post(mail.server, clock)).toEqual([]);
  });

  it('is for keepers to send and take back, of their own cellar', async () => {
    const [keeper, stranger] = [await member(), await member()];
    const brewer = await member('brewer', keeper.cellarId);
    await expect(createInvitation(brewer, invitation('x@loft.example'), clock)).rejects.toThrow(ForbiddenError);
    const { id } = await createInvitation(keeper, invitation('x@loft.example'), clock);
    await expect(revokeInvitation(stranger, id, clock)).rejects.toThrow(NotFoundError);
    expect((await listInvitations(stranger, clock)).items).toEqual([]);
    await expect(createInvitation(keeper, invitation(brewer.person.email), clock)).rejects.toThrow(/already/);
  });

  it('is not sent without end by one person', async () => {
    const keeper = await member();
    await expect(
      (async () => {
        for (let index = 0; index < 40; index += 1) await createInvitation(keeper, invitation(`many${index}@loft.example`), clock);
      })(),
    ).rejects.toThrow(ThrottledError);
    expect(await Invitation.count({ where: { cellarId: keeper.cellarId } })).toBeLessThanOrEqual(21);
  });
});

describe('who shares a cellar', () => {
  it('always has a keeper: the last one cannot leave, be lowered or be taken out, not even by two at once', async () => {
    const keeper = await member();
    const hand = await member('hand', keeper.cellarId);
    await expect(leaveCellar(keeper, clock)).rejects.toThrow(ConflictError);
    await expect(changeRole(keeper, keeper.personId, 'brewer')).rejects.toThrow(ConflictError);
    await expect(removeMember(keeper, keeper.personId, clock)).rejects.toThrow(ConflictError);
    await changeRole(keeper, hand.personId, 'keeper');
    const both = await Promise.allSettled([leaveCellar(keeper, clock), leaveCellar({ ...hand, role: 'keeper' }, clock)]);
    expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
    expect(await Membership.count({ where: { cellarId: keeper.cellarId, role: 'keeper' } })).toBe(1);
  });

  it('loses somebody with their tokens and calendar, and tells them; what they logged stays', async () => {
    const keeper = await member();
    const brewer = await member('brewer', keeper.cellarId);
    const entry = await buildEntry(await buildBatch({ cellarId: keeper.cellarId }), { text: 'x', personId: brewer.personId });
    const token = await createToken(brewer, tokenForm.parse({ name: 'script', role: 'hand' }), clock);
    await removeMember(keeper, brewer.personId, clock);
    expect((await ApiToken.findByPk(token.id))?.revokedAt).not.toBeNull();
    expect(await Entry.findByPk(entry.id)).toMatchObject({ personId: brewer.personId, text: 'x' });
    expect((await post(mail.server, clock)).map(({ to, subject }) => [to[0], subject])).toEqual([[brewer.person.email, expect.stringContaining('no longer share')]]);
    await expect(removeMember(keeper, brewer.personId, clock)).rejects.toThrow(NotFoundError);
  });

  it('is another cellar’s business only there', async () => {
    const [mine, theirs] = [await member(), await member()];
    const other = await member('hand', theirs.cellarId);
    await expect(removeMember(mine, other.personId, clock)).rejects.toThrow(NotFoundError);
    await expect(changeRole(mine, other.personId, 'guest')).rejects.toThrow(NotFoundError);
    await expect(handOver(mine, other.personId, PASS, clock)).rejects.toThrow(NotFoundError);
  });

  it('is handed over in one step, with the passphrase', async () => {
    const keeper = await member();
    const heir = await member('guest', keeper.cellarId);
    await expect(handOver(keeper, heir.personId, 'not it', clock)).rejects.toThrow(InvalidError);
    await handOver(keeper, heir.personId, PASS, clock);
    const roles = await Membership.findAll({ where: { cellarId: keeper.cellarId } });
    expect(Object.fromEntries(roles.map(({ personId, role }) => [personId, role]))).toEqual({ [keeper.personId]: 'brewer', [heir.personId]: 'keeper' });
  });

  it('can be one more cellar, and deleting it takes its readings along and no other’s', async () => {
    const keeper = await member();
    const { id } = await createCellar(keeper.personId, { name: 'Second shed', time_zone: 'UTC' });
    const actor: Actor = { personId: keeper.personId, cellarId: id, role: 'keeper' };
    const [gone, stays] = [await buildSensor({ cellarId: id }), await buildSensor({ cellarId: keeper.cellarId })];
    for (const { sensor } of [gone, stays]) await writeReadings(sensor.id, [{ at: Date.UTC(2026, 2, 1), gravity: 1.05 }]);
    await expect(deleteCellar(actor, { name: 'Second', passphrase: PASS })).rejects.toThrow(InvalidError);
    await expect(deleteCellar(actor, { name: 'Second shed', passphrase: 'no' })).rejects.toThrow(InvalidError);
    await deleteCellar(actor, { name: 'Second shed', passphrase: PASS });
    expect(await Cellar.findByPk(id)).toBeNull();
    const [rows] = await db.sequelize.query(`select sensor_id from readings where sensor_id in (${gone.sensor.id}, ${stays.sensor.id})`);
    expect(rows).toEqual([{ sensor_id: stays.sensor.id }]);
  });
});

describe('API tokens', () => {
  it('are shown whole once, kept as a hash, and never above the person’s own role', async () => {
    const brewer = await member('brewer');
    await expect(createToken(brewer, tokenForm.parse({ name: 'too much', role: 'keeper' }), clock)).rejects.toThrow(ForbiddenError);
    const made = await createToken(brewer, tokenForm.parse({ name: 'script', role: 'hand' }), clock);
    expect(made.token).toMatch(/^fbt_[A-Za-z0-9_-]{43}$/);
    expect(made.last_four).toBe(made.token.slice(-4));
    const row = await ApiToken.findByPk(made.id, { rejectOnEmpty: true });
    expect(JSON.stringify(row)).not.toContain(made.token);
    expect((await listTokens(brewer)).items).toMatchObject([{ id: made.id, mine: true, last_used_at: null }]);
    expect(JSON.stringify(await listTokens(brewer))).not.toContain(made.token);
  });

  it('are seen and revoked by their person and by keepers of that cellar, and by nobody else', async () => {
    const keeper = await member();
    const [brewer, hand, stranger] = [await member('brewer', keeper.cellarId), await member('hand', keeper.cellarId), await member()];
    const make = () => createToken(brewer, tokenForm.parse({ name: 'script', role: 'hand' }), clock);
    const [one, two] = [await make(), await make()];
    expect((await listTokens(hand)).items).toEqual([]);
    expect((await listTokens(keeper)).items).toHaveLength(2);
    for (const other of [hand, stranger]) await expect(revokeToken(other, one.id, clock)).rejects.toThrow(NotFoundError);
    await revokeToken(brewer, one.id, clock);
    await revokeToken(keeper, two.id, clock);
    await expect(revokeToken(keeper, two.id, clock)).rejects.toThrow(NotFoundError);
  });
});
