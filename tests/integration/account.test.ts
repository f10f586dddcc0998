import { TOTP } from 'otpauth';
import { beforeEach, describe, expect, it } from 'vitest';
import { AccountLink, AuditRow, Cellar, Entry, Person, RecoveryCode, SignIn } from '@/db/models';
import type { ManualClock } from '@/lib/clock';
import { ConflictError, InvalidError, NotFoundError, ThrottledError } from '@/lib/errors';
import { createCellar } from '@/lib/services/cellars/own';
import { handOver } from '@/lib/services/cellars/members';
import { joinByInvitation, lookAtInvitation } from '@/lib/services/invitations/accept';
import { createInvitation, listInvitations } from '@/lib/services/invitations/manage';
import { askForLink } from '@/lib/services/people/ask-for-link';
import { askForMailChange, confirmMailChange, dropMailChange } from '@/lib/services/people/change-mail';
import { deleteAccount } from '@/lib/services/people/delete-account';
import { exportAccount } from '@/lib/services/people/export-account';
import { getAccount } from '@/lib/services/people/get-account';
import { changePassphrase, resetPassphrase } from '@/lib/services/people/passphrase';
import { beginSecondFactor, confirmSecondFactor, endSecondFactor, renewRecoveryCodes } from '@/lib/services/people/second-factor';
import { signIn } from '@/lib/services/people/sign-in';
import { signInByLink } from '@/lib/services/people/sign-in-by-link';
import { from, member, opened, OTHER, PASS, useMail } from '../support/account';
import { useDatabase } from '../support/database';
import { buildBatch, buildEntry } from '../support/factories';
import { post, secretIn } from '../support/letters';

const db = useDatabase();
const DAY = 86_400_000;
const MINUTE = 60_000;

const mail = useMail(db);
let clock: ManualClock;
beforeEach(() => {
  clock = mail.clock;
});


describe('a link by mail', () => {
  const ask = async (kind: 'sign-in' | 'password', email: string) => {
    await askForLink(kind, email, clock);
    return post(mail.server, clock);
  };

  it('signs in once, within ten minutes', async () => {
    const { person } = await member('brewer');
    const token = secretIn((await ask('sign-in', person.email))[0]);
    expect(opened(await signInByLink({ token }, from(), clock.now())).personId).toBe(person.id);
    expect(await signInByLink({ token }, from(), clock.now())).toBe('refused');
    const late = secretIn((await ask('sign-in', person.email))[0]);
    expect(await signInByLink({ token: late }, from(), clock.now() + 10 * MINUTE)).toBe('refused');
    const both = secretIn((await ask('sign-in', person.email))[0]);
    const twice = await Promise.all([signInByLink({ token: both }, from(), clock.now()), signInByLink({ token: both }, from(), clock.now())]);
    expect(twice.filter((outcome) => outcome === 'refused')).toHaveLength(1);
  });

  it('sends nothing to an address that nobody has, after writing as many rows as for one that somebody has', async () => {
    const { person } = await member('brewer');
    const rows = async (email: string) => {
      const before = await Promise.all([AccountLink.count(), AuditRow.count(), db.sequelize.query('select count(*)::int as n from letters').then(([[row]]) => (row as { n: number }).n)]);
      await askForLink('sign-in', email, clock);
      const after = await Promise.all([AccountLink.count(), AuditRow.count(), db.sequelize.query('select count(*)::int as n from letters').then(([[row]]) => (row as { n: number }).n)]);
      return after.map((count, index) => count - before[index]!);
    };
    expect(await rows('nobody@loft.example')).toEqual([1, 1, 1]);
    expect(await rows(person.email)).toEqual([1, 1, 1]);
    expect((await post(mail.server, clock)).map(({ to }) => to)).toEqual([[person.email]]);
  });

  it('does not flood a mailbox: after four asked for, the next has to wait, known or not', async () => {
    const { person } = await member('brewer');
    for (const email of [person.email, 'ghost@loft.example']) {
      for (let index = 0; index < 4; index += 1) await askForLink('sign-in', email, clock);
      await expect(askForLink('sign-in', email, clock)).rejects.toThrow(ThrottledError);
    }
  });

  it('lets a new passphrase be chosen once, which ends every open sign-in and every other link', async () => {
    const { person } = await member('brewer');
    const open = await SignIn.create({ personId: person.id, expiresAt: new Date(clock.now() + DAY) });
    const signInToken = secretIn((await ask('sign-in', person.email))[0]);
    const token = secretIn((await ask('password', person.email))[0]);
    await expect(resetPassphrase({ token, passphrase: 'password123' }, clock)).rejects.toThrow(InvalidError);
    await resetPassphrase({ token, passphrase: OTHER }, clock);
    await expect(resetPassphrase({ token, passphrase: `${OTHER}!` }, clock)).rejects.toThrow(NotFoundError);
    expect((await SignIn.findByPk(open.id))?.endedAt).not.toBeNull();
    expect(await signInByLink({ token: signInToken }, from(), clock.now())).toBe('refused');
    expect(await signIn({ email: person.email, password: PASS }, false, from(), clock.now())).toBe('refused');
    expect(opened(await signIn({ email: person.email, password: OTHER }, false, from(), clock.now())).personId).toBe(person.id);
    expect((await post(mail.server, clock)).map(({ subject }) => subject)).toEqual(['Your passphrase was changed']);
  });

  it('of one kind does not do what another kind does', async () => {
    const { person } = await member('brewer');
    const signInToken = secretIn((await ask('sign-in', person.email))[0]);
    await expect(resetPassphrase({ token: signInToken, passphrase: OTHER }, clock)).rejects.toThrow(NotFoundError);
    const passwordToken = secretIn((await ask('password', person.email))[0]);
    expect(await signInByLink({ token: passwordToken }, from(), clock.now())).toBe('refused');
    await expect(confirmMailChange(passwordToken, clock)).rejects.toThrow(NotFoundError);
    await expect(lookAtInvitation(passwordToken, clock)).rejects.toThrow(NotFoundError);
  });
});

describe('the passphrase and the address', () => {
  it('changes knowing the old one; other sign-ins end and this one stays', async () => {
    const { person } = await member('hand');
    const [here, there] = [await SignIn.create({ personId: person.id, expiresAt: new Date(clock.now() + DAY) }), await SignIn.create({ personId: person.id, expiresAt: new Date(clock.now() + DAY) })];
    await expect(changePassphrase(person.id, here.id, { current: 'no', passphrase: OTHER }, clock)).rejects.toThrow(InvalidError);
    await expect(changePassphrase(person.id, here.id, { current: PASS, passphrase: person.email }, clock)).rejects.toThrow(InvalidError);
    await changePassphrase(person.id, here.id, { current: PASS, passphrase: OTHER }, clock);
    expect((await SignIn.findByPk(here.id))?.endedAt).toBeNull();
    expect((await SignIn.findByPk(there.id))?.endedAt).not.toBeNull();
  });

  it('is not guessed at an open screen without end', async () => {
    const { person } = await member('hand');
    const guess = () => changePassphrase(person.id, person.id, { current: 'guess', passphrase: OTHER }, clock);
    for (let index = 0; index < 6; index += 1) await expect(guess()).rejects.toThrow(InvalidError);
    await expect(guess()).rejects.toThrow(ThrottledError);
  });

  it('changes the mail address once both addresses have confirmed, in either order', async () => {
    for (const order of [[0, 1], [1, 0]] as const) {
      const { person } = await member('hand');
      const wanted = `moved-${person.id}@loft.example`;
      await askForMailChange(person.id, { email: wanted, passphrase: PASS }, clock);
      const letters = await post(mail.server, clock);
      expect(letters.map(({ to }) => to[0]).sort()).toEqual([person.email, wanted].sort());
      const tokens = letters.map(secretIn);
      expect(await confirmMailChange(tokens[order[0]]!, clock)).toMatchObject({ changed: false });
      expect((await Person.findByPk(person.id))?.email).toBe(person.email);
      expect(await confirmMailChange(tokens[order[1]]!, clock)).toEqual({ changed: true, waits_for: null });
      expect((await Person.findByPk(person.id))?.email).toBe(wanted);
      // The old address is told.
      expect((await post(mail.server, clock)).map(({ to, subject }) => [to[0], subject])).toEqual([[person.email, 'Your mail address was changed']]);
      await expect(confirmMailChange(tokens[0]!, clock)).rejects.toThrow(NotFoundError);
    }
  });

  it('keeps the address where one side is missing, the change was taken back, a day has passed, or somebody else has it', async () => {
    const { person } = await member('hand');
    const other = await member('hand');
    const begin = async (email: string) => {
      await askForMailChange(person.id, { email, passphrase: PASS }, clock);
      return (await post(mail.server, clock)).map(secretIn);
    };
    const [first] = await begin('one@loft.example');
    expect(await confirmMailChange(first!, clock)).toMatchObject({ changed: false });
    const second = await begin('two@loft.example');
    await dropMailChange(person.id, clock);
    for (const token of second) await expect(confirmMailChange(token, clock)).rejects.toThrow(NotFoundError);
    const third = await begin('three@loft.example');
    clock.advance(DAY);
    for (const token of third) await expect(confirmMailChange(token, clock)).rejects.toThrow(NotFoundError);
    for (const token of await begin(other.person.email)) await expect(confirmMailChange(token, clock)).rejects.toThrow(ConflictError);
    expect((await Person.findByPk(person.id))?.email).toBe(person.email);
  });
});

describe('the second factor', () => {
  /** An authenticator that was shown the picture. */
  async function authenticator(personId: string) {
    const { uri, qr_svg } = await beginSecondFactor(personId, PASS);
    expect(qr_svg).toContain('<svg');
    const { secret } = (await import('otpauth')).URI.parse(uri) as TOTP;
    return (at = clock.now()) => new TOTP({ secret }).generate({ timestamp: at });
  }

  it('is asked for only after a first code, then at every sign-in, and each code works once', async () => {
    const { person } = await member('brewer');
    const form = { email: person.email, password: PASS };
    const code = await authenticator(person.id);
    opened(await signIn(form, false, from(), clock.now()));
    await expect(confirmSecondFactor(person.id, '000000', clock)).rejects.toThrow(InvalidError);
    const { recovery_codes } = await confirmSecondFactor(person.id, code(), clock);
    expect(new Set(recovery_codes).size).toBe(10);
    expect(await signIn(form, false, from(), clock.now())).toBe('code-needed');
    // The code that turned it on is used up.
    expect(await signIn({ ...form, code: code() }, false, from(), clock.now())).toBe('code-wrong');
    clock.advance(30_000);
    const now = code();
    opened(await signIn({ ...form, code: now }, false, from(), clock.now()));
    expect(await signIn({ ...form, code: now }, false, from(), clock.now())).toBe('code-wrong');
    expect(await signIn({ ...form, password: 'wrong', code: code(clock.now() + 30_000) }, false, from(), clock.now())).toBe('refused');
    expect((await getAccount(person.id, clock)).second_factor).toMatchObject({ recovery_codes_left: 10 });
    expect((await Person.findByPk(person.id))?.totpSealed?.toString('latin1')).not.toContain(code());
  });

  it('is stood in for by a recovery code once, and the person is told', async () => {
    const { person } = await member('brewer');
    const code = await authenticator(person.id);
    const { recovery_codes } = await confirmSecondFactor(person.id, code(), clock);
    await post(mail.server, clock);
    const recovery = recovery_codes[0]!.replace('-', '');
    const form = { email: person.email, password: PASS, code: recovery };
    opened(await signIn(form, false, from(), clock.now()));
    expect(await signIn(form, false, from(), clock.now())).toBe('code-wrong');
    expect((await post(mail.server, clock)).map(({ subject }) => subject)).toEqual(['A recovery code was used']);
    const rows = await RecoveryCode.findAll({ where: { personId: person.id } });
    expect(rows.some((row) => row.codeHash.toString('latin1').includes(recovery))).toBe(false);
    clock.advance(60_000);
    const renewed = await renewRecoveryCodes(person.id, { passphrase: PASS, code: code() }, clock);
    expect(renewed.recovery_codes).toHaveLength(10);
    expect(await signIn({ ...form, code: recovery_codes[1]!.replace('-', '') }, false, from(), clock.now())).toBe('code-wrong');
  });

  it('holds for a link by mail too, whose link stays good until the code is right', async () => {
    const { person } = await member('brewer');
    const code = await authenticator(person.id);
    await confirmSecondFactor(person.id, code(), clock);
    await post(mail.server, clock);
    await askForLink('sign-in', person.email, clock);
    const token = secretIn((await post(mail.server, clock))[0]);
    clock.advance(60_000);
    expect(await signInByLink({ token }, from(), clock.now())).toBe('code-needed');
    expect(await signInByLink({ token, code: '123456' === code() ? '654321' : '123456' }, from(), clock.now())).toBe('code-wrong');
    opened(await signInByLink({ token, code: code() }, from(), clock.now()));
  });

  it('cannot be guessed: wrong codes lock the account as wrong passphrases do', async () => {
    const { person } = await member('brewer');
    const code = await authenticator(person.id);
    await confirmSecondFactor(person.id, code(), clock);
    const form = { email: person.email, password: PASS, code: 'aaaaaaaaaa' };
    for (let index = 0; index < 6; index += 1) expect(await signIn(form, false, from(), clock.now())).toBe('code-wrong');
    await expect(signIn(form, false, from(), clock.now())).rejects.toThrow(ThrottledError);
  });

  it('costs nobody a try to be asked for it: the right passphrase was no guess', async () => {
    const { person } = await member('brewer');
    const code = await authenticator(person.id);
    await confirmSecondFactor(person.id, code(), clock);
    clock.advance(MINUTE);
    const form = { email: person.email, password: PASS };
    for (let index = 0; index < 8; index += 1) expect(await signIn(form, false, from(), clock.now())).toBe('code-needed');
    opened(await signIn({ ...form, code: code() }, false, from(), clock.now()));
    const [left] = await db.sequelize.query('select 1 from sign_in_tries where tries > 0');
    expect(left).toEqual([]);
  });

  it('forgives no wrong code for a right passphrase in between', async () => {
    const { person } = await member('brewer');
    const code = await authenticator(person.id);
    await confirmSecondFactor(person.id, code(), clock);
    const form = { email: person.email, password: PASS };
    for (let index = 0; index < 6; index += 1) {
      expect(await signIn(form, false, from(), clock.now())).toBe('code-needed');
      expect(await signIn({ ...form, code: 'aaaaaaaaaa' }, false, from(), clock.now())).toBe('code-wrong');
    }
    await expect(signIn(form, false, from(), clock.now())).rejects.toThrow(ThrottledError);
  });

  it('is taken off with passphrase and code, and not with one of them', async () => {
    const { person } = await member('brewer');
    const code = await authenticator(person.id);
    await confirmSecondFactor(person.id, code(), clock);
    clock.advance(60_000);
    await expect(endSecondFactor(person.id, { passphrase: 'no', code: code() }, clock)).rejects.toThrow(InvalidError);
    await expect(endSecondFactor(person.id, { passphrase: PASS, code: 'aaaaaaaaaa' }, clock)).rejects.toThrow(InvalidError);
    await endSecondFactor(person.id, { passphrase: PASS, code: code() }, clock);
    opened(await signIn({ email: person.email, password: PASS }, false, from(), clock.now()));
  });
});

describe('one’s own data', () => {
  it('comes as one file with what one wrote, and no secret', async () => {
    const hand = await member('hand');
    const other = await member('brewer', hand.cellarId);
    const batch = await buildBatch({ cellarId: hand.cellarId });
    await buildEntry(batch, { text: 'Smells clean.', personId: hand.personId });
    await buildEntry(batch, { text: 'Somebody else’s.', personId: other.personId });
    const text = await exportAccount(hand.personId);
    const file = JSON.parse(text) as { person: { email: string }; entries: unknown[]; cellars: unknown[] };
    expect(file.person.email).toBe(hand.person.email);
    expect(file.entries).toMatchObject([{ text: 'Smells clean.', batch: batch.name }]);
    expect(file.cellars).toMatchObject([{ role: 'hand' }]);
    for (const secret of ['argon2', 'Somebody else', other.person.email]) expect(text).not.toContain(secret);
  });

  it('leaves no address behind, neither in the invitation nor in what the trail says of it', async () => {
    const keeper = await member();
    await createInvitation(keeper, { email: 'guest@away.example', role: 'hand', expires_in_days: 7 }, clock);
    const token = secretIn((await post(mail.server, clock))[0]);
    await joinByInvitation({ token, name: 'Gil Ash', passphrase: OTHER, time_zone: 'UTC' }, clock);
    const person = await Person.findOne({ where: { email: 'guest@away.example' }, rejectOnEmpty: true });
    const trail = async () => JSON.stringify((await AuditRow.findAll({ where: { cellarId: keeper.cellarId } })).map(({ action, detail }) => [action, detail]));
    expect(await trail()).toContain('guest@away.example');
    await deleteAccount(person.id, { passphrase: OTHER, email: person.email }, clock);
    expect(await trail()).not.toContain('guest@away.example');
    expect(JSON.parse(await trail())).toContainEqual(['member.joined', expect.objectContaining({ role: 'hand' })]);
    expect((await listInvitations(keeper, clock)).items).toEqual([]);
  });

  it('goes with the account: the log stays without a name, a cellar of one’s own goes, a shared one has to be handed over first', async () => {
    const keeper = await member();
    const hand = await member('hand', keeper.cellarId);
    const entry = await buildEntry(await buildBatch({ cellarId: keeper.cellarId }), { text: 'x', personId: keeper.personId });
    const { id: alone } = await createCellar(keeper.personId, { name: 'Alone', time_zone: 'UTC' });
    const form = { passphrase: PASS, email: keeper.person.email };
    await expect(deleteAccount(keeper.personId, form, clock)).rejects.toThrow(/Hand it over/);
    await handOver(keeper, hand.personId, PASS, clock);
    await expect(deleteAccount(keeper.personId, { ...form, passphrase: 'no' }, clock)).rejects.toThrow(InvalidError);
    await expect(deleteAccount(keeper.personId, { ...form, email: 'other@loft.example' }, clock)).rejects.toThrow(InvalidError);
    await post(mail.server, clock);
    await deleteAccount(keeper.personId, form, clock);
    expect(await Person.findByPk(keeper.personId)).toBeNull();
    expect(await Cellar.findByPk(alone)).toBeNull();
    expect(await Cellar.findByPk(keeper.cellarId)).not.toBeNull();
    expect(await Entry.findByPk(entry.id)).toMatchObject({ personId: null, text: 'x' });
    expect((await post(mail.server, clock)).map(({ to, subject }) => [to[0], subject])).toEqual([[keeper.person.email, 'Your account was deleted']]);
  });
});
