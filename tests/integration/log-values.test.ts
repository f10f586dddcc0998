import { describe, expect, it } from 'vitest';
import { ApiToken, Person } from '@/db/models';
import { database } from '@/db/client';
import { errorLine } from '@/lib/log';
import { useDatabase } from '../support/database';
import { buildMember } from '../support/factories';

useDatabase();

const failed = (work: Promise<unknown>): Promise<unknown> => work.then(() => Promise.reject(new Error('it was to fail')), (error: unknown) => error);

describe('an error of the database, as a line of the log', () => {
  it('says what went wrong, and nothing of what was to be written or looked for', async () => {
    const { person } = await buildMember('keeper');
    const twin = await failed(Person.create({ name: 'Twin of the keeper', email: person.email, passwordHash: 'hash-of-a-passphrase', timeZone: 'UTC' }));
    const orphan = await failed(ApiToken.create({ personId: person.id, cellarId: '00000000-0000-4000-8000-000000000000', role: 'guest', name: 'script of hers', tokenHash: Buffer.from('hash-of-a-token'), lastFour: 'last' }));
    const looked = await failed(Person.findOne({ where: { email: 'looked-for@cellar.example', id: 'no-id-at-all' } }));
    const asked = await failed(database().query('select 1 / $divisor::int, $word::text', { bind: { divisor: 0, word: 'bound-word' } }));
    const lines = [twin, orphan, looked, asked].map((error) => JSON.stringify(errorLine(error)));
    expect(lines[0]).toContain('people_email');
    expect(lines[1]).toContain('api_tokens_cellar_id_fkey');
    expect(lines[2]).toMatch(/SELECT .*FROM .*people/);
    expect(lines[3]).toContain('division by zero');
    for (const line of lines) {
      expect(line).toMatch(/"stack":/);
      expect(line).not.toMatch(/hash-of|Twin|script of hers|looked-for|bound-word|last_four":"last/);
      expect(line).not.toContain(person.email);
      expect(line).not.toContain(Buffer.from('hash-of-a-token').toString('hex'));
      expect(line).not.toContain([...Buffer.from('hash-of')].join(','));
    }
  });

  it('leaves other errors as they are', () => {
    expect(errorLine(Object.assign(new Error('mail server said no'), { code: 'EENVELOPE', responseCode: 550 }))).toMatchObject({ type: 'Error', message: 'mail server said no', code: 'EENVELOPE', responseCode: 550 });
    expect(errorLine('thrown text')).toBe('thrown text');
  });
});
