import { describe, expect, it, vi } from 'vitest';
import { hashPassword, passwordFits } from '@/lib/auth/passwords';
import { UnavailableError } from '@/lib/errors';

describe('passwords', () => {
  it('keeps argon2id with 19 MiB, 2 passes and 1 lane (OWASP Password Storage Cheat Sheet), salted anew each time', async () => {
    const [first, second] = [await hashPassword('three demijohns'), await hashPassword('three demijohns')];
    expect(first).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
    expect(second).not.toBe(first);
  });

  it('fits the right password, whole, and no other', async () => {
    const long = 'x'.repeat(200);
    const hash = await hashPassword(`${long}y`);
    expect(await passwordFits(hash, `${long}y`)).toBe(true);
    expect(await passwordFits(hash, `${long}z`)).toBe(false);
    expect(await passwordFits(hash, long)).toBe(false);
    expect(await passwordFits(hash, 'ž'.repeat(20))).toBe(false);
  });

  it('says no where there is no hash, after the same work', async () => {
    expect(await passwordFits(null, 'anything')).toBe(false);
  });

  it('refuses a flood rather than letting it wait for minutes, and serves the rest', async () => {
    const hash = await hashPassword('bung');
    const answers = await Promise.allSettled(Array.from({ length: 60 }, () => passwordFits(hash, 'bung')));
    const refused = answers.filter((answer) => answer.status === 'rejected');
    expect(refused.length).toBe(60 - 42);
    for (const answer of refused) expect(answer.reason).toBeInstanceOf(UnavailableError);
    expect(answers.filter((answer) => answer.status === 'fulfilled' && answer.value).length).toBe(42);
    expect(await passwordFits(hash, 'bung')).toBe(true);
  });

  it('says no again where there is no hash, once a crowd that left no room for it has gone', async () => {
    vi.resetModules();
    const fresh = await import('@/lib/auth/passwords');
    const hash = await fresh.hashPassword('bung');
    const crowd = Array.from({ length: 42 }, () => fresh.hashPassword('bung'));
    await expect(fresh.passwordFits(hash, 'bung')).rejects.toThrow('Too many people');
    await Promise.all(crowd);
    expect(await fresh.passwordFits(null, 'anything')).toBe(false);
    expect(await fresh.passwordFits(hash, 'bung')).toBe(true);
  });
});
