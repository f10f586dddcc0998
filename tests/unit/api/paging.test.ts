import { describe, expect, it } from 'vitest';
import { InvalidError } from '@/lib/errors';
import { timestamp } from '@/lib/contracts/common';
import { decodeCursor, encodeCursor } from '@/lib/services/paging';

const key = '5f0c1f5e-5c39-4e0b-8c5e-0d7a3f1b2c4d';
const forged = (at: unknown, by: unknown = key) => Buffer.from(JSON.stringify([at, by])).toString('base64url');

describe('a place in a list', () => {
  it.each(['2026-12-01 10:00:00+00', '2026-12-01 10:00:00.123456+00', '2026-12-01 15:30:00.5+05:30', '2026-12-01 04:00:00-06', '2026-12-01T10:00:00.123Z'])('comes back as it was written: %s', (at) => {
    expect(decodeCursor(encodeCursor({ at, key }))).toEqual({ at, key });
  });

  it.each(['0000-01-01T00:00:00Z', '2026-02-31T10:00:00Z', '2026-12-01 10:00:00 (x)', '2026-12-01 10:00:00 2026', '2026-12-01 25:00:00+00', '2026-12-01 10:00:00+23:59', '9999-12-31 23:59:59+00', 'infinity', 7])(
    'is refused where it names no time that the table could have: %s',
    (at) => {
      expect(() => decodeCursor(forged(at))).toThrow(InvalidError);
    },
  );

  it('is refused where it names no row, or is no list at all', () => {
    expect(() => decodeCursor(forged('2026-12-01 10:00:00+00', 'x'))).toThrow(InvalidError);
    expect(() => decodeCursor('zzz')).toThrow(InvalidError);
  });
});

describe('a time over the wire', () => {
  it.each(['2026-03-04T06:00:00Z', '1900-01-01T00:00:00Z', '2026-03-04T06:00:00.123456+05:30'])('is taken: %s', (at) => {
    expect(timestamp.safeParse(at).success).toBe(true);
  });

  it.each(['0000-01-01T00:00:00Z', '0001-01-01T00:00:00+23:59', '9999-12-31T23:59:59-23:59', '2026-02-30T06:00:00Z', '2026-03-04T06:00:00'])('is refused with a sentence: %s', (at) => {
    const [issue] = timestamp.safeParse(at).error?.issues ?? [];
    expect(issue?.message).toMatch(/^must be a time/);
  });
});
