import { describe, expect, it } from 'vitest';
import { waterDensity } from '@/lib/core/gravity/density';
import { parseMessage } from '@/lib/services/readings/parse';

const NOW = Date.parse('2026-03-04T06:00:00Z');
const parse = (pack: unknown, form: 'senml' | 'unknown' = 'senml') => parseMessage(Buffer.from(JSON.stringify(pack)), NOW, form);
const AT = NOW / 1000 - 900;

describe('SenML (RFC 8428)', () => {
  it('is turned into SG at 20 °C: the density over that of water', () => {
    const { accepted, refused } = parse([
      { bn: 'urn:dev:mac:0024befffe804ff1:', bt: AT, n: 'density', u: 'kg/m3', v: 1046.2 },
      { n: 'temperature', u: 'Cel', v: 19.5 },
      { n: 'voltage', u: 'V', v: 3.875 },
    ]);
    expect(refused).toEqual([]);
    expect(accepted).toMatchObject([{ measuredAt: AT * 1000, temperature: 19.5, battery: 3.875 }]);
    // Water at 20 °C: 998.2067 kg/m3 (Tanaka et al., Metrologia 38 (2001) 301, table 1).
    expect(accepted[0]?.gravity).toBeCloseTo(1046.2 / 998.2067, 6);
  });

  it('adds the base time, as in the example of section 5.1.3', () => {
    const { accepted } = parse([
      { bn: 'float/', bt: AT, n: 'density', u: 'kg/m3', v: 1040, t: -600 },
      { n: 'temperature', u: 'Cel', v: 19, t: -600 },
      { n: 'density', u: 'kg/m3', v: 1039 },
      { n: 'temperature', u: 'Cel', v: 18 },
    ]);
    expect(accepted.map(({ measuredAt, temperature }) => [measuredAt, temperature])).toEqual([
      [(AT - 600) * 1000, 19],
      [AT * 1000, 18],
    ]);
  });

  it('takes times below 2^28 as seconds from now (section 4.5.3), and none as now', () => {
    const { accepted } = parse([
      { n: 'density', u: 'kg/m3', v: 1040, t: -60 },
      { n: 'temperature', u: 'Cel', v: 19, t: -60 },
      { n: 'density', u: 'kg/m3', v: 1040 },
      { n: 'temperature', u: 'Cel', v: 19 },
    ]);
    expect(accepted.map((reading) => reading.measuredAt)).toEqual([NOW - 60_000, NOW]);
  });

  it('adds a base value and uses a base unit for records that name none (section 4.1)', () => {
    const { accepted } = parse([
      { bt: AT, bu: 'kg/m3', bv: 1000, n: 'density', v: 40 },
      { bv: 0, n: 'temperature', u: 'Cel', v: 19 },
    ]);
    expect(accepted[0]?.gravity).toBeCloseTo(1040 / waterDensity(20), 9);
    expect(accepted[0]?.temperature).toBe(19);
  });

  it('is told from plain readings by its shape, where no content type says it', () => {
    expect(parse([{ n: 'density', u: 'kg/m3', v: 1040 }, { n: 'temperature', u: 'Cel', v: 19 }], 'unknown').accepted).toHaveLength(1);
    expect(parse([{ gravity: 1.04, temperature: 19 }], 'unknown').accepted).toHaveLength(1);
  });

  it('passes over quantities that nobody here knows', () => {
    const { accepted, refused } = parse([{ bt: AT, n: 'density', u: 'kg/m3', v: 1040 }, { n: 'temperature', u: 'Cel', v: 19 }, { n: 'humidity', u: '%RH', v: 40 }, { n: 'constructor', v: 1 }]);
    expect(accepted).toHaveLength(1);
    expect(refused).toEqual([]);
  });

  it.each<[string, unknown[], RegExp]>([
    ['another unit', [{ n: 'density', u: 'g/ml', v: 1.04 }, { n: 'temperature', u: 'Cel', v: 19 }], /gravity must be in kg\/m3, not in g\/ml/],
    ['a unit of control characters', [{ n: 'temperature', u: '\u0000\r\n', v: 19 }], /temperature must be in Cel, not in another unit/],
    ['a value of text', [{ n: 'temperature', u: 'Cel', v: '19' }], /SenML record: v /],
    ['a record that is no object', [7], /SenML record/],
    ['a version that is not known', [{ bver: 11, n: 'temperature', u: 'Cel', v: 19 }], /bver is a SenML version/],
    ['a label that must be understood', [{ n: 'temperature', u: 'Cel', v: 19, x_: 1 }], /must be understood/],
    ['a time outside the calendar', [{ bt: 1e300, n: 'temperature', u: 'Cel', v: 19 }], /outside every calendar/],
    ['no temperature', [{ bt: AT, n: 'density', u: 'kg/m3', v: 1040 }], /^temperature /],
    ['a clock ahead by a day', [{ bt: AT + 86_400, n: 'density', u: 'kg/m3', v: 1040 }, { n: 'temperature', u: 'Cel', v: 19 }], /more than 10 min ahead/],
    ['nothing it knows', [{ n: 'humidity', u: '%RH', v: 40 }], /no density, temperature or voltage/],
  ])('is refused with a reason: %s', (_name, pack, reason) => {
    const { refused } = parse(pack);
    expect(refused.some((item) => reason.test(item.reason))).toBe(true);
  });
});
