import { DatabaseError, ForeignKeyConstraintError, UniqueConstraintError } from 'sequelize';
import { describe, expect, it } from 'vitest';
import { NotFoundError, ThrottledError, UnauthenticatedError } from '@/lib/errors';
import { problemOf } from '@/lib/http/problem';

const request = { method: 'GET', path: '/api/v1/batches' };
const refusedBy = (code: string) => new DatabaseError(Object.assign(new Error('x'), { code, sql: '' }));

describe('an error as a problem document (RFC 9457)', () => {
  it('has its type, title, status and sentence', async () => {
    const answer = problemOf(new NotFoundError('batch'), request);
    expect(answer.status).toBe(404);
    expect(answer.headers.get('content-type')).toBe('application/problem+json');
    expect(await answer.json()).toEqual({ type: 'urn:fallbright:problem:not-found', title: 'Not found', status: 404, detail: 'There is no such batch here.' });
  });

  it('says how to sign in where nobody has (RFC 9110 15.5.2), and when to try again where there were too many', () => {
    expect(problemOf(new UnauthenticatedError(), request).headers.get('www-authenticate')).toBe('Bearer');
    expect(problemOf(new NotFoundError(), request).headers.get('www-authenticate')).toBeNull();
    expect(problemOf(new ThrottledError(30), request).headers.get('retry-after')).toBe('30');
  });

  it.each([
    ['is shutting down', '57P01'],
    ['has no connection left', '53300'],
    ['ended one of two that waited for each other', '40P01'],
  ])('is “not now” where the database %s', (_, code) => {
    const answer = problemOf(refusedBy(code), request);
    expect(answer.status).toBe(503);
    expect(Number(answer.headers.get('retry-after'))).toBeGreaterThan(0);
  });

  it.each([new UniqueConstraintError({}), new ForeignKeyConstraintError({})])('is a conflict where somebody else was there first: %s', async (error) => {
    const answer = problemOf(error, request);
    expect(answer.status).toBe(409);
    expect((await answer.json()) as object).toMatchObject({ type: 'urn:fallbright:problem:conflict', detail: expect.stringMatching(/same moment/) as string });
  });

  it('tells nothing of what went wrong inside', async () => {
    for (const error of [refusedBy('23503'), new Error('secret of the house'), 'thrown text']) {
      const answer = problemOf(error, request);
      expect(answer.status).toBe(500);
      expect(JSON.stringify(await answer.json())).not.toMatch(/secret|23503|thrown/);
    }
  });
});
