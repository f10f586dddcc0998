import { describe, expect, it } from 'vitest';
import { timestamp } from '@/lib/contracts/common';
import { instantOf } from '@/lib/contracts/logfile';

describe('a time as RFC 3339 writes it', () => {
  it.each([
    ['2026-03-04T06:00:00Z', '2026-03-04T06:00:00Z'],
    ['2026-03-04t06:00:00z', '2026-03-04T06:00:00Z'],
    ['2026-03-04t06:00:00.25+01:00', '2026-03-04T05:00:00.25Z'],
    // The two leap seconds of the RFC's own examples (5.8).
    ['1990-12-31T23:59:60Z', '1991-01-01T00:00:00Z'],
    ['1990-12-31T15:59:60-08:00', '1991-01-01T00:00:00Z'],
    ['2016-12-31T23:59:60.75Z', '2017-01-01T00:00:00Z'],
  ])('may be %s', (text, same) => {
    expect(Date.parse(timestamp.parse(text))).toBe(Date.parse(same));
    expect(instantOf(text)).toBe(Date.parse(same));
  });

  it.each(['2026-03-04T12:00:60Z', '2016-12-31T23:59:61Z', '2016-12-30T23:59:60Z', '2016-12-31T23:59:60', '2026-03-04z06:00:00t', ':60', 'tz', ''])('is none where it says %j', (text) => {
    expect(timestamp.safeParse(text).error?.issues.map(({ message }) => message)).toEqual(['must be a time with a zone, such as 2026-03-04T06:00:00Z']);
    expect(instantOf(text)).toBeNull();
  });
});
