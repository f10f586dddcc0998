import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, test } from 'vitest';
import { parseOptions, plan } from '@/devices/simulator/options';
import { readSensorsFile, type SimulatedSensor } from '@/devices/simulator/sensors-file';

const HOUR = 3_600_000;
const DAY = 24 * HOUR;
const now = Date.UTC(2026, 2, 4, 6);
const planned = (argv: string[], listed: SimulatedSensor[] | null = null) => plan(parseOptions(argv, now), listed, now);
const mine = ['--sensor', 'float-9', '--secret', 'hush', '--scenario', 'stuck-cold'];

const listed: SimulatedSensor[] = [
  { sensor: 'float-1', secret: 'one', scenario: 'foaming', seed: 4, startedAt: new Date(now - 3 * DAY).toISOString(), interval_s: 900 },
  { sensor: 'float-2', secret: 'two', scenario: 'finished', seed: 7, startedAt: new Date(now - 96 * DAY).toISOString(), interval_s: 1800 },
];

describe('a sensor of one’s own', () => {
  test('plays its scenario from now on at the pace of the real clock', () => {
    const [only] = planned(mine);
    expect(only).toEqual({
      entry: { sensor: 'float-9', secret: 'hush', scenario: 'stuck-cold', seed: 1, startedAt: new Date(now).toISOString(), interval_s: 900 },
      clockFrom: now,
      sendFrom: now,
    });
  });

  test('starts a fast clock at the time given, in either form', () => {
    for (const from of ['20d', '20d ago', '480h', new Date(now - 20 * DAY).toISOString()]) {
      const [only] = planned([...mine, '--speed', '3600', '--from', from]);
      expect(only?.clockFrom).toBe(now - 20 * DAY);
      expect(only?.entry.startedAt).toBe(new Date(now - 20 * DAY).toISOString());
    }
  });

  test('starts a fast clock so long ago that the scenario has shown its point by now', () => {
    const [only] = planned([...mine, '--speed', '600']);
    expect(only?.clockFrom).toBe(now - 160 * HOUR);
  });

  test('takes a seed and an interval in minutes', () => {
    const [only] = planned([...mine, '--seed', '12', '--interval', '0.5']);
    expect(only?.entry).toMatchObject({ seed: 12, interval_s: 30 });
  });
});

describe('the demo’s sensors', () => {
  test('all run, and send again at once what their memory of two weeks holds', () => {
    const plans = planned([], listed);
    expect(plans.map(({ clockFrom }) => clockFrom)).toEqual([now, now]);
    expect(plans.map(({ sendFrom }) => sendFrom)).toEqual([now - 3 * DAY, now - 14 * DAY]);
    expect(plans.map(({ entry }) => entry)).toEqual(listed);
  });

  test('run alone where a scenario is named', () => {
    expect(planned(['--scenario', 'finished'], listed).map(({ entry }) => entry.sensor)).toEqual(['float-2']);
  });

  test('never start before their pitch', () => {
    expect(planned(['--from', '50d', '--speed', '100'], listed).map(({ clockFrom }) => clockFrom)).toEqual([now - 3 * DAY, now - 50 * DAY]);
  });

  test('are asked for in a sentence where there are none', () => {
    expect(() => planned([])).toThrow('There are no simulated sensors yet');
    expect(() => planned(['--scenario', 'bubbles'], listed)).toThrow('No sensor of the demo plays "bubbles"');
  });
});

test.each([
  [['--speed', '0.5'], '--speed must be a number'],
  [['--speed', 'fast'], '--speed must be a number'],
  [['--seed', '1.5'], '--seed must be a whole number'],
  [['--scenario', 'boiling'], 'There is no scenario "boiling"'],
  [['--from', 'yesterday'], '--from must be a time with a zone'],
  [['--from', '2026-01-01T00:00:00'], '--from must be a time with a zone'],
  [['--from', '2026-03-05T00:00:00Z'], 'must not lie in the future'],
  [['--sensor', 'float-9'], '--sensor and --secret go together'],
  [['--sensor', 'float-9', '--secret', 'x'], '--sensor needs a --scenario'],
  [['--frobnicate'], '--frobnicate'],
])('%j is answered with what is wrong', (argv, message) => {
  expect(() => planned(argv)).toThrow(message);
});

describe('the list of simulated sensors', () => {
  const folder = mkdtempSync(join(tmpdir(), 'floats-'));
  afterAll(() => rmSync(folder, { recursive: true }));
  const written = (text: string) => {
    const path = join(folder, 'simulators.json');
    writeFileSync(path, text);
    return path;
  };

  test('comes back as it was written', () => {
    expect(readSensorsFile(written(JSON.stringify(listed)))).toEqual(listed);
  });

  test('may be missing', () => {
    expect(readSensorsFile(join(folder, 'none.json'))).toBeNull();
  });

  test('is refused in a sentence when it is broken', () => {
    expect(() => readSensorsFile(written('[{'))).toThrow('is not JSON');
    expect(() => readSensorsFile(written(JSON.stringify([{ ...listed[0], sensor: 'UPPER case' }])))).toThrow('is wrong at 0.sensor');
  });
});
