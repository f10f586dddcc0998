import { describe, expect, it } from 'vitest';
import { MAX_READINGS_PER_MESSAGE } from '@/lib/contracts/telemetry';
import { parseMessage } from '@/lib/services/readings/parse';

const NOW = Date.parse('2026-03-04T06:00:00Z');
const parse = (body: unknown) => parseMessage(Buffer.isBuffer(body) ? body : Buffer.from(typeof body === 'string' ? body : JSON.stringify(body)), NOW);
const good = { at: '2026-03-04T05:45:00Z', gravity: 1.048, temperature: 19.5 };
const reasons = (body: unknown) => parse(body).refused.map((refused) => refused.reason);

describe('a message that is right', () => {
  it('becomes a reading with every field', () => {
    const { accepted, refused } = parse({ ...good, inclination: 41.5, battery: 3.9, signal: -67, foam: 12, sequence: 7 });
    expect(refused).toEqual([]);
    expect(accepted).toEqual([
      { measuredAt: NOW - 900_000, gravity: 1.048, temperature: 19.5, battery: Math.fround(3.9), signal: -67, inclination: 41.5, foam: 12, sequence: 7 },
    ]);
  });

  it('counts as measured when it arrived where it names no time', () => {
    expect(parse({ gravity: 1.048, temperature: 19.5 }).accepted[0]?.measuredAt).toBe(NOW);
  });

  it('is taken with an inclination alone, its gravity left open', () => {
    expect(parse({ inclination: 41.5, temperature: 19.5 }).accepted[0]).toMatchObject({ gravity: null, inclination: 41.5 });
  });

  it('may name its time in any zone and finer than a millisecond', () => {
    expect(parse({ ...good, at: '2026-03-04T07:45:00.1234567+02:00' }).accepted[0]?.measuredAt).toBe(NOW - 900_000 + 123);
  });

  it('may write its time in small letters, and in a leap second (RFC 3339, 5.6)', () => {
    expect(parse({ ...good, at: '2026-03-04t05:45:00.5z' }).accepted[0]?.measuredAt).toBe(NOW - 900_000 + 500);
    expect(parse({ ...good, at: '2016-12-31T23:59:60Z' }).accepted[0]?.measuredAt).toBe(Date.UTC(2017, 0, 1));
  });

  it.each([
    ['the lowest of everything', { ...good, gravity: 0.97, temperature: -10, battery: 0, signal: -130, foam: 0, sequence: 0 }],
    ['the highest of everything', { ...good, gravity: 1.2, temperature: 60, battery: 15, signal: 0, foam: 500, inclination: 90, sequence: Number.MAX_SAFE_INTEGER }],
    ['fields that nobody knows', { ...good, colour: 'red', deep: { er: [1, 2] }, '': null }],
    ['keys that JavaScript knows', '{"__proto__":{"x":1},"constructor":3,"gravity":1.048,"temperature":19.5}'],
    ['ten minutes ahead', { ...good, at: '2026-03-04T06:10:00Z' }],
    ['the first moment of 2015', { ...good, at: '2015-01-01T00:00:00Z' }],
    ['a leap day', { ...good, at: '2024-02-29T23:59:59Z' }],
    ['a twin key: the last one counts, as in every JSON parser', '{"gravity":9,"gravity":1.048,"temperature":19.5}'],
    ['unknown keys with lone surrogates, right-to-left marks and emoji', '{"\\ud800":"\\u202e","🍎":"\\u0000","gravity":1.048,"temperature":19.5}'],
    ['deep nesting beside the reading', `{"gravity":1.048,"temperature":19.5,"x":${'['.repeat(10_000)}${']'.repeat(10_000)}}`],
  ])('is taken with %s', (_name, body) => {
    expect(parse(body)).toMatchObject({ accepted: [{}], refused: [] });
  });

  it('keeps a number too small for the database as zero', () => {
    const accepted = parse('{"gravity":1.048,"temperature":1e-50,"battery":1e-300,"signal":-0}').accepted[0];
    expect(accepted).toMatchObject({ temperature: 0, battery: 0 });
    expect(Object.is(accepted?.signal, 0)).toBe(true);
  });
});

describe('a message that is wrong is refused whole, with a reason', () => {
  it.each<[string, unknown, RegExp]>([
    ['nothing', Buffer.alloc(0), /empty/],
    ['white space', '   ', /not JSON/],
    ['text', 'gravity=1.048', /not JSON/],
    ['half a message', '{"gravity":1.048,"tempera', /not JSON/],
    ['two objects', '{"gravity":1.048,"temperature":20}{"gravity":1.048,"temperature":20}', /not JSON/],
    ['a decimal comma', '{"gravity":1,048,"temperature":19.5}', /not JSON/],
    ['NaN', '{"gravity":NaN,"temperature":19.5}', /not JSON/],
    ['a byte order mark', '\ufeff{"gravity":1.048,"temperature":19.5}', /not JSON/],
    ['a number', '42', /object or an array/],
    ['null', 'null', /object or an array/],
    ['a string', '"1.048"', /object or an array/],
    ['an empty array', '[]', /no reading/],
    ['bytes that are no UTF-8', Buffer.from([0x7b, 0x22, 0xff, 0xfe, 0x22, 0x3a, 0x31, 0x7d]), /UTF-8/],
    ['gzip', Buffer.from('1f8b0800000000000003', 'hex'), /UTF-8/],
    ['CBOR', Buffer.from('a267677261766974', 'hex'), /UTF-8/],
    ['zero bytes', Buffer.alloc(64), /not JSON/],
    ['too many readings', Array.from({ length: MAX_READINGS_PER_MESSAGE + 1 }, () => good), /at most 500/],
  ])('%s', (_name, body, reason) => {
    const { accepted, refused } = parse(body);
    expect(accepted).toEqual([]);
    expect(refused).toHaveLength(1);
    expect(refused[0]?.reason).toMatch(reason);
  });

  it('keeps the first two kilobytes of it', () => {
    const { refused } = parse('x'.repeat(10_000));
    expect(refused[0]?.body.length).toBe(2048);
  });
});

describe('a reading that is wrong is refused alone, and the reason names the field', () => {
  it.each<[string, unknown, RegExp]>([
    ['no temperature', { gravity: 1.048 }, /^temperature /],
    ['neither gravity nor inclination', { temperature: 19.5 }, /^gravity or inclination/],
    ['a gravity of text', { ...good, gravity: '1.048' }, /^gravity must be a number/],
    ['a gravity in points', { ...good, gravity: 48 }, /^gravity must be between/],
    ['a gravity in Plato', { ...good, gravity: 12 }, /^gravity must be between/],
    ['a gravity below every drink', { ...good, gravity: 0.9699 }, /^gravity must be between/],
    ['a gravity of null', { ...good, gravity: null }, /^gravity must be a number/],
    ['a gravity in a list', { ...good, gravity: [1.048] }, /^gravity must be a number/],
    ['infinity', `{"gravity":1e999,"temperature":19.5}`, /^gravity must be/],
    ['a temperature in Fahrenheit', { ...good, temperature: 68 }, /^temperature must be between/],
    ['a temperature of ice', { ...good, temperature: -10.01 }, /^temperature must be between/],
    ['a battery in mV', { ...good, battery: 3900 }, /^battery must be 0 to 15/],
    ['a battery of text', { ...good, battery: '3.9' }, /^battery must be a number/],
    ['a signal above zero', { ...good, signal: 40_000 }, /^signal must be -130 to 0/],
    ['a foam below the liquid', { ...good, foam: -1 }, /^foam must be 0 to 500/],
    ['an inclination upside down', { ...good, inclination: 91 }, /^inclination must be 0 to 90/],
    ['half a sequence', { ...good, sequence: 1.5 }, /^sequence must be a whole number/],
    ['a sequence below zero', { ...good, sequence: -1 }, /^sequence must not be negative/],
    ['a sequence of 2^63', `{"gravity":1.048,"temperature":19.5,"sequence":9223372036854775808}`, /^sequence /],
    ['a time without a zone', { ...good, at: '2026-03-04T05:45:00' }, /^at must be RFC 3339/],
    ['a time in seconds', { ...good, at: 1_772_603_100 }, /^at must be RFC 3339/],
    ['a time in words', { ...good, at: 'yesterday' }, /^at must be RFC 3339/],
    ['a 30th of February', { ...good, at: '2026-02-30T00:00:00Z' }, /^at must be RFC 3339/],
    ['an hour 24', { ...good, at: '2026-03-03T24:00:00Z' }, /^at must be RFC 3339/],
    ['a second 60 at noon', { ...good, at: '2016-12-31T12:00:60Z' }, /^at must be RFC 3339/],
    ['a clock never set', { ...good, at: '1970-01-01T00:00:12Z' }, /^at is before 2015/],
    ['just before 2015', { ...good, at: '2014-12-31T23:59:59.999Z' }, /^at is before 2015/],
    ['just over ten minutes ahead', { ...good, at: '2026-03-04T06:10:00.001Z' }, /^at is more than 10 min ahead/],
    ['an hour ahead', { ...good, at: '2026-03-04T07:00:00Z' }, /^at is more than 10 min ahead/],
    ['2106', { ...good, at: '2106-02-07T06:28:16Z' }, /^at is more than 10 min ahead/],
    ['a time of markup', { ...good, at: "2026-03-04T05:45:00Z'); drop table readings; --" }, /^at must be RFC 3339/],
    ['a list in a list', [[good]], /must be a JSON object/],
    ['null in a list', [null], /must be a JSON object/],
    ['text in a list', ['x'], /must be a JSON object/],
  ])('%s', (_name, body, reason) => {
    expect(parse(body).accepted).toEqual([]);
    expect(reasons(body)).toHaveLength(1);
    expect(reasons(body)[0]).toMatch(reason);
  });

  it('and the 499 others of its message are taken', () => {
    const many = Array.from({ length: 500 }, (_, index) => ({ ...good, at: new Date(NOW - index * 1000).toISOString() }));
    const { accepted, refused } = parse(many.map((item, index) => (index === 321 ? { ...item, temperature: 'warm' } : item)));
    expect(accepted).toHaveLength(499);
    expect(refused).toMatchObject([{ index: 321, reason: 'temperature must be a number' }]);
    expect(JSON.parse(refused[0]!.body.toString())).toMatchObject({ temperature: 'warm' });
  });

  it('even where it is nested so deeply that it cannot be written out again', () => {
    const { refused } = parse(`[${'['.repeat(50_000)}${']'.repeat(50_000)}]`);
    expect(refused).toMatchObject([{ index: 0, reason: 'a reading must be a JSON object' }]);
  });
});
