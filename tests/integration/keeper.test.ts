import { execFile } from 'node:child_process';
import { resolve } from 'node:path';
import { promisify } from 'node:util';
import { describe, expect, it } from 'vitest';
import { Cellar, Membership } from '@/db/models';
import { ManualClock } from '@/lib/clock';
import { NotFoundError } from '@/lib/errors';
import { foundCellar } from '@/lib/services/cellars/found';
import { joinByInvitation, lookAtInvitation } from '@/lib/services/invitations/accept';
import { signIn } from '@/lib/services/people/sign-in';
import { useDatabase } from '../support/database';

const db = useDatabase();
const PASS = 'a lantern by the door';
const keeper = (...args: string[]) =>
  promisify(execFile)(process.execPath, ['--import', 'tsx', resolve('scripts/keeper.ts'), ...args], { env: { ...process.env, DATABASE_URL: db.url } });

describe('the first keeper of an empty house', () => {
  it('comes in by the link that the command prints, once', async () => {
    const { stdout } = await keeper('First@Loft.example', 'The loft');
    const token = /invitation#(\S+)/.exec(stdout)?.[1] ?? '';
    expect(await lookAtInvitation(token)).toMatchObject({ cellar: 'The loft', role: 'keeper', email: 'first@loft.example', has_account: false });
    await joinByInvitation({ token, name: 'First', passphrase: PASS, time_zone: 'UTC' });
    const cellar = await Cellar.findOne({ where: { name: 'The loft' }, rejectOnEmpty: true });
    expect(await Membership.findAll({ where: { cellarId: cellar.id } })).toMatchObject([{ role: 'keeper' }]);
    expect(await signIn({ email: 'first@loft.example', password: PASS }, false, { address: '192.0.2.7', userAgent: 'test', previous: null }, Date.now())).toHaveProperty('personId');
    await expect(lookAtInvitation(token)).rejects.toThrow(NotFoundError);
  });

  it('finds the link shut after a day', async () => {
    const clock = new ManualClock(Date.now());
    const { url } = await foundCellar({ email: 'late@loft.example', name: 'Late', time_zone: 'UTC' }, clock);
    const token = url.split('#')[1]!;
    expect(await lookAtInvitation(token, clock)).toMatchObject({ cellar: 'Late' });
    clock.advance(24 * 3_600_000);
    await expect(lookAtInvitation(token, clock)).rejects.toThrow(NotFoundError);
  });

  it('is told what is wrong with an address, and nothing is made', async () => {
    const before = await Cellar.count();
    await expect(keeper('nobody')).rejects.toMatchObject({ code: 1, stderr: expect.stringContaining('The email is not a mail address.') as string });
    await expect(keeper()).rejects.toMatchObject({ code: 2, stderr: expect.stringContaining('Usage:') as string });
    expect(await Cellar.count()).toBe(before);
  });
});
