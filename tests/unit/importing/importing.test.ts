import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { batchIn, guessBatches } from '@/lib/core/importing/batches';
import { defuse, undefuse } from '@/lib/core/importing/cells';
import { numberIn } from '@/lib/core/importing/numbers';
import { guessReadings, readingIn } from '@/lib/core/importing/readings';
import { orderOf, timeIn } from '@/lib/core/importing/times';

const NOW = Date.UTC(2026, 2, 20);
const iso = (at: number | null) => (at === null ? null : new Date(at).toISOString());

describe('cells', () => {
  it.each(['=1+1', '+1', '-2', '@cmd', '\t=x', '\r=x', "'=1", "''=1", '=HYPERLINK("http://x")'])('never begin a formula: %j', (text) => {
    expect(defuse(text)).toMatch(/^'/);
    expect(undefuse(defuse(text))).toBe(text);
  });
  it('come back as they were, whatever they hold', () => {
    fc.assert(fc.property(fc.string({ unit: fc.constantFrom("'", '=', '+', '-', '@', '\t', '\r', 'a', '1', ' ') }), (text) => undefuse(defuse(text)) === text && !/^[=+\-@\t\r]/.test(defuse(text))), { numRuns: 2_000, seed: 8 });
  });
});

describe('numbers', () => {
  it.each([['1.048', 1.048], ['1,048', 1.048], ['1 048,5', 1048.5], ['1.048,50', 1048.5], ['1,048.50', 1048.5], ['18.5 °C', 18.5], ['−3', -3], ['3.7V', 3.7], ['-71 dBm', -71], ['1e3', 1000]])('%j is %d', (text, value) => {
    expect(numberIn(text)).toBe(value);
  });
  it.each(['', ' ', 'n/a', '1.2.3', '1,2,3', '0x10', 'Infinity', 'NaN', '1e999', '--1', '1..2', '٣'])('%j is none', (text) => {
    expect(numberIn(text)).toBeNull();
  });
});

describe('times', () => {
  it.each([
    ['2026-03-04T06:00:00Z', '2026-03-04T06:00:00.000Z'],
    ['2026-03-04 06:00:00+02:00', '2026-03-04T04:00:00.000Z'],
    ['2026-03-04 06:00', '2026-03-04T05:00:00.000Z'],
    ['04.03.2026 06:00', '2026-03-04T05:00:00.000Z'],
    ['4/3/2026 6:05 pm', '2026-03-04T17:05:00.000Z'],
    ['4/3/2026 12:05 AM', '2026-03-03T23:05:00.000Z'],
    ['1772604000', '2026-03-04T06:00:00.000Z'],
    ['1772604000000', '2026-03-04T06:00:00.000Z'],
    ['2026-03-04', '2026-03-03T23:00:00.000Z'],
  ])('%j on the clock of Berlin is %s', (text, at) => {
    expect(iso(timeIn(text, 'Europe/Berlin', 'day'))).toBe(at);
  });
  it.each(['', 'yesterday', '2026-02-30', '2026-13-01', '2026-03-04 24:00', '2026-03-04 06:61', '31/4/2026', '13:00 pm 4/3/2026', '4/3/2026 13:00 pm', '99999999999999', '12'])('%j is none', (text) => {
    expect(timeIn(text, 'UTC', 'day')).toBeNull();
  });
  it('say themselves whether the day or the month comes first, where they can', () => {
    expect(orderOf(['03/04/2026', '03/13/2026'])).toBe('month');
    expect(orderOf(['03/04/2026', '13/03/2026'])).toBe('day');
    expect(orderOf(['03/04/2026'])).toBeNull();
  });
});

describe('a log file', () => {
  it('is understood from its header and its values', () => {
    const guess = guessReadings(['Timestamp', 'SG', 'Temp (°F)', 'Battery'], [['03/14/2026 06:00', '1048', '68', '3.9']], 'UTC');
    expect(guess).toMatchObject({ columns: { at: 0, gravity: 1, temperature: 2, battery: 3, signal: null }, gravityUnit: 'points', temperatureUnit: 'f', dateOrder: 'month' });
    expect(readingIn(['03/14/2026 06:00', '1048', '68', '3.9'], guess, NOW)).toEqual({ at: Date.UTC(2026, 2, 14, 6), gravity: 1.048, temperature: 20, battery: 3.9, signal: null });
  });
  it('may tell its gravity in degrees Plato', () => {
    const guess = guessReadings(['date', 'plato'], [['2026-03-04', '12']], 'UTC');
    expect(guess.gravityUnit).toBe('plato');
    expect((readingIn(['2026-03-04', '12'], guess, NOW) as { gravity: number }).gravity).toBeCloseTo(1.0484, 3);
  });
  it.each([
    [['', '1.05', '20'], 'the time is empty'],
    [['soon', '1.05', '20'], '“soon” is no time'],
    [['2031-01-01', '1.05', '20'], 'the time lies ahead'],
    [['1970-01-01', '1.05', '20'], 'the time is before 2000'],
    [['2026-03-01', '', '20'], 'the gravity is empty'],
    [['2026-03-01', '<b>', '20'], '“<b>” is no gravity'],
    [['2026-03-01', '7', '20'], 'a gravity of 7.000 cannot be'],
    [['2026-03-01', '1.05', '200'], 'a temperature of 200.0 °C cannot be'],
  ])('says what is wrong with %j', (row, says) => {
    const options = { columns: { at: 0, gravity: 1, temperature: 2, battery: null, signal: null }, gravityUnit: 'sg', temperatureUnit: 'c', timeZone: 'UTC', dateOrder: 'day' } as const;
    expect(readingIn(row, options, NOW)).toBe(says);
  });
});

describe('a list of old batches', () => {
  const header = ['Name', 'Style', 'Brewed on', 'Bottled', 'OG', 'FG', 'Batch size', 'Yeast', 'Notes'];
  const options = guessBatches(header, 'UTC');
  it('is understood from its header', () => {
    expect(batchIn(['Windfall', 'Perry', '2024-09-01', '2024-11-01', '1.050', '1.002', '9', 'cider yeast', 'tart'], options, NOW)).toEqual({
      name: 'Windfall', kind: 'cider', pitchedAt: Date.UTC(2024, 8, 1), endedAt: Date.UTC(2024, 10, 1), originalGravity: 1.05, finalGravity: 1.002, volumeL: 9, volumeTaken: false, vesselL: 9, yeast: 'cider yeast', notes: 'tart',
    });
  });
  // NIST Handbook 44 (2024), appendix C: a US gallon is 3.785 411 784 L, an imperial one 4.546 09 L.
  it.each([['5 L', 5], ['4,5', 4.5], ['750 ml', 0.75], ['1 US gal', 3.785411784], ['2 imp. gal', 9.09218], ['', 4.5]])('reads the volume “%s” in its own unit', (cell, litres) => {
    const read = batchIn(['A', 'beer', '', '', '', '', cell], options, NOW);
    if (typeof read === 'string') throw new Error(read);
    expect(read.volumeL).toBeCloseTo(litres, 9);
    expect(read.volumeTaken).toBe(cell === '');
  });
  it.each([
    [['', 'beer'], 'the name is empty'],
    [['x'.repeat(81), 'beer'], 'the name has more than 80 characters'],
    [['A\u0000', 'beer'], 'the name holds characters that cannot be kept'],
    [['A', 'beer', 'whenever'], '“whenever” is no time'],
    [['A', 'beer', '2024-11-01', '2024-09-01'], 'it ended before it was pitched'],
    [['A', 'beer', '', '', '3'], 'a gravity cannot be'],
    [['A', 'beer', '', '', '', '', '9000'], 'the volume must be 0.1 to 2000 L'],
    [['A', 'beer', '', '', '', '', '1 gal'], '“1 gal” is no volume: write litres, US gal or imp gal'],
    [['A', 'beer', '', '', '', '', 'two'], '“two” is no volume: write litres, US gal or imp gal'],
    [['A', 'beer', '', '', 'high'], '“high” is no gravity'],
  ])('says what is wrong with %j', (row, says) => {
    expect(batchIn(row, options, NOW)).toBe(says);
  });
});
