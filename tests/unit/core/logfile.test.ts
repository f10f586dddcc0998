import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { checkSpan, instantOf, parseBatchFile, parseReadings } from '../../../lib/contracts/logfile';

const rows = (...lines: string[]) => lines.map((line, i) => ({ line: i + 1, cells: line.split(',') }));
const HEADER = 'measured_at,gravity,temperature_c';
const BATCH = { pitched_at: '2026-02-20T18:00:00Z', original_gravity: 1.05, volume_l: 4.5, vessel_l: 5, kind: 'cider' };

describe('the readers of a log', () => {
  it('take times with a zone and nothing else', () => {
    expect(instantOf('2026-03-04T06:00:00Z')).toBe(Date.UTC(2026, 2, 4, 6));
    expect(instantOf('2026-03-04T07:00:00+01:00')).toBe(Date.UTC(2026, 2, 4, 6));
    expect(instantOf('2026-03-04t06:00:00z')).toBe(Date.UTC(2026, 2, 4, 6));
    expect(instantOf('2028-02-29T06:00:00Z')).toBe(Date.UTC(2028, 1, 29, 6));
    for (const text of ['2026-03-04T06:00:00', '2026-02-30', 'yesterday', '1772604000', '', '2026-02-30T06:00:00Z', '2026-02-29T06:00:00Z', '2026-13-01T06:00:00Z', '2026-03-04T24:00:00Z']) expect(instantOf(text)).toBeNull();
  });

  it('name the line of a wrong reading', () => {
    expect(() => parseReadings(rows(HEADER, '2026-03-04T06:00:00Z,1.05,20', '2026-03-04T07:00:00Z,heavy,20'))).toThrow('line 3: gravity "heavy" is not a number.');
    expect(() => parseReadings(rows(HEADER, 'noon,1.05,20'))).toThrow(/^line 2: measured_at "noon"/);
    expect(() => parseReadings(rows('measured_at,gravity'))).toThrow(/no column "temperature_c"/);
  });

  it('refuse a decimal comma, which would put every value one column on, and a column that is there twice', () => {
    expect(() => parseReadings(rows(HEADER, '2026-03-04T06:00:00Z,1,050,20'))).toThrow('line 2: 4 values for 3 columns');
    expect(parseReadings(rows(HEADER, '2026-03-04T06:00:00Z,1.05,20,, '))).toHaveLength(1);
    expect(() => parseReadings(rows('measured_at,gravity,gravity,temperature_c'))).toThrow('line 1: the column "gravity" is there twice.');
  });

  it('note a reading that is no gravity, and refuse a file of another unit', () => {
    const notes: string[] = [];
    expect(parseReadings(rows(HEADER, '2026-03-04T06:00:00Z,1.05,20', '2026-03-04T07:00:00Z,1.3,20', '2026-03-04T08:00:00Z,0,20'), notes)).toHaveLength(3);
    expect(notes).toEqual(['line 3: gravity "1.3" is not a specific gravity between 0.970 and 1.200; 2 such readings are left out.']);
    expect(() => parseReadings(rows(HEADER, '2026-03-04T06:00:00Z,1050,20', '2026-03-04T07:00:00Z,1049,20'))).toThrow(/^line 2: gravity "1050" is not a specific gravity/);
  });

  it('refuse a clock that was never set, which would ask for a century of steps', () => {
    const lines = rows(HEADER, '2026-03-04T06:00:00Z,1.05,20', '2106-02-07T06:28:15Z,1.05,20');
    const readings = parseReadings(lines);
    expect(() => checkSpan(readings[0]!.at, lines, readings, [])).toThrow(/^line 3: measured_at is more than 10 years after the pitch/);
    expect(() => checkSpan(readings[0]!.at, lines, readings.slice(0, 1), [])).not.toThrow();
    const { events } = parseBatchFile(JSON.stringify({ ...BATCH, events: [{ at: '2106-03-04T06:00:00Z', kind: 'rack' }] }), null).setup;
    expect(() => checkSpan(readings[0]!.at, [], [], events)).toThrow(/^events\.0\.at: is more than 10 years/);
  });

  it('take columns in any order, and what is optional', () => {
    const [reading] = parseReadings(rows('gravity,received_at,temperature_c,measured_at', '1.05,2026-03-04T09:00:00Z,,2026-03-04T06:00:00Z'));
    expect(reading).toMatchObject({ gravity: 1.05, temperature: null, receivedAt: Date.UTC(2026, 2, 4, 9) });
  });

  it('do without what can be missed, and say so', () => {
    const { setup, notes } = parseBatchFile(JSON.stringify({ volume_l: 10, kind: 'kefir' }), 1000);
    expect(setup).toMatchObject({ kind: 'wine', pitchedAt: 1000, originalGravity: null, vesselL: 11 });
    expect(notes).toHaveLength(4);
  });

  it('refuse what is wrong, by its name', () => {
    expect(() => parseBatchFile(JSON.stringify({ ...BATCH, original_gravity: 50 }), null)).toThrow(/^original_gravity: must be a specific gravity/);
    expect(() => parseBatchFile(JSON.stringify({ ...BATCH, events: [{ at: '2026-03-04T06:00:00Z', kind: 'party' }] }), null)).toThrow(/^events\.0\.kind: must be one of/);
    expect(() => parseBatchFile('{', null)).toThrow(/^not JSON/);
  });
});

describe('npm run assess', () => {
  let folder: string;
  beforeAll(() => {
    folder = mkdtempSync(join(tmpdir(), 'fallbright-assess-'));
    const lines = [HEADER];
    for (let h = 0; h < 100; h += 1) lines.push(`${new Date(Date.UTC(2026, 1, 20, 18 + h)).toISOString()},${(1.05 - 0.0003 * Math.max(0, h - 20)).toFixed(4)},19`);
    writeFileSync(join(folder, 'a.readings.csv'), lines.join('\n'));
    writeFileSync(join(folder, 'a.batch.json'), JSON.stringify(BATCH));
    writeFileSync(join(folder, 'wrong.csv'), `${HEADER}\n2026-02-20T18:00:00Z,x,1`);
  });
  afterAll(() => rmSync(folder, { recursive: true }));
  const run = (...args: string[]) => spawnSync(process.execPath, ['--import', 'tsx', 'scripts/assess.ts', ...args], { encoding: 'utf8' });

  it('prints one JSON object a step, in the shape of the contract', () => {
    const { stdout, status } = run('--readings', join(folder, 'a.readings.csv'), '--batch', join(folder, 'a.batch.json'), '--every', '24h', '--json');
    expect(status).toBe(0);
    const lines = stdout.trim().split('\n').map((line) => JSON.parse(line) as { at: string; calls: Record<string, { verdict: string }> });
    expect(lines).toHaveLength(5);
    expect(lines[4]!.at).toBe('2026-02-24T18:00:00.000Z');
    expect(lines[4]!.calls.started!.verdict).toBe('yes');
  });

  it('answers a wrong file with the line and the reason, and exit status 2', () => {
    const { stderr, status } = run('--readings', join(folder, 'wrong.csv'), '--batch', join(folder, 'a.batch.json'));
    expect(status).toBe(2);
    expect(stderr).toMatch(/wrong\.csv: line 2: gravity "x" is not a number\./);
  });

  it('does a folder of cases in one process', () => {
    const out = join(folder, 'out');
    expect(run('--cases', folder, '--out', out, '--every', '12h').status).toBe(0);
    expect(readFileSync(join(out, 'a.assess.jsonl'), 'utf8').trim().split('\n')).toHaveLength(9);
  });
});
