import { describe, expect, it } from 'vitest';
import { ALERT_RULES } from '@/lib/core/alerts/rules';
import { compose } from '@/lib/mail/compose';
import { mailPayload, type AlertPayload } from '@/lib/mail/payload';
import { figure, lasting, when } from '@/lib/mail/words';
import { en } from '@/lib/texts/en';
import { english as texts } from '../../support/texts';

const context = { publicUrl: 'https://barn.example', texts };
/** What may be done about these without hurting anybody; every other rule has a caution. */
const HARMLESS: readonly string[] = ['overdue', 'sensor'];

function payload(overrides: { event?: AlertPayload['event']; at?: string; alert?: Partial<AlertPayload['alert']>; batch?: Partial<AlertPayload['batch']>; cellar?: Partial<AlertPayload['cellar']> } = {}): AlertPayload {
  return {
    template: 'alert',
    event: overrides.event ?? 'opened',
    at: overrides.at ?? '2026-03-04T06:00:00Z',
    alert: {
      id: 'a1',
      rule: 'stalled',
      level: 'check',
      kind: 'cold',
      since: '2026-03-02T23:00:00Z',
      headline: 'Stopped at 1.041: flat for 31 h.',
      reason: '20 points above the expected end, 0.1 points a day. It is cold: 15.4 °C.',
      act: 'Warm it into its range, then rouse the yeast gently.',
      changes_it: 'Changes it: a fall of 1 point in a day.',
      evidence: [
        { name: 'gravity', value: 1.041, threshold: 1.014, unit: 'SG' },
        { name: 'fall', value: -0.1, threshold: 0.5, unit: 'points/d' },
      ],
      ...overrides.alert,
    },
    batch: { id: 'b1', name: 'Oat stout', tag: 5, place: 'back row', vessel: 'carboy', ...overrides.batch },
    cellar: { name: 'Low barn', time_zone: 'Europe/Berlin', ...overrides.cellar },
  };
}

const EVENTS = ['opened', 'repeated', 'look_again', 'resolved'] as const;

describe('a mail about an alert', () => {
  it('says which vessel, what, since when, the figure behind it, what to do first, and where to read on, as text and as HTML', () => {
    const { subject, text, html } = compose([payload()], context);
    expect(subject).toBe('Check: Oat stout, tag 5: Stopped at 1.041: flat for 31 h');
    for (const part of ['Oat stout, tag 5, back row', 'Since Tue 3 Mar 00:00, 31 h.', 'limit 1.014', '−0.1 points/d', 'Warm it into its range', 'https://barn.example/batches/b1', 'https://barn.example/alerts?alert=a1', 'Low barn', 'local law']) {
      expect(text).toContain(part);
      // The link's address is in a tag, the rest between tags.
      expect(html.replace(/<(?!a )[^>]+>/g, '')).toContain(part);
    }
  });

  it('carries the caution of every rule that has one', () => {
    for (const rule of ALERT_RULES) {
      const { text, html } = compose([payload({ alert: { rule: rule.name, level: rule.level } })], context);
      const caution = HARMLESS.includes(rule.name) ? null : en[`advice.${rule.name}.caution` as 'advice.foam.caution'];
      expect(text.includes('Take care.')).toBe(caution !== null);
      if (caution !== null) expect(text).toContain(`Take care. ${caution}`);
      expect(html.includes('Take care.')).toBe(caution !== null);
    }
  });

  it('says what to do first where the call itself does not', () => {
    expect(compose([payload({ alert: { rule: 'foam', act: null } })], context).text).toContain(en['advice.foam.first']);
  });

  it('names its state as the shelf does', () => {
    const word = (alert: Partial<AlertPayload['alert']>) => compose([payload({ alert })], context).subject.split(':')[0];
    expect(word({ level: 'act' })).toBe('Now');
    expect(word({ level: 'check' })).toBe('Check');
    expect(word({ level: 'know' })).toBe('Ready');
    expect(word({ kind: 'silent' })).toBe('Silent');
  });

  it('says in a repeat that nobody has it, and in a reminder that you have', () => {
    expect(compose([payload({ event: 'repeated' })], context).text).toContain('It has been so for 31 h, and nobody has it in hand.');
    expect(compose([payload({ event: 'look_again' })], context).text).toContain('You have this in hand');
  });

  it('tells the end in one line', () => {
    const { subject, text } = compose([payload({ event: 'resolved' })], context);
    expect(subject).toBe('Passed: Oat stout, tag 5: Stopped at 1.041: flat for 31 h');
    expect(text).toContain('It was so from Tue 3 Mar 00:00, for 31 h.');
    expect(text).not.toContain('Take care.');
  });

  it('warns aloud when "ready to bottle" is withdrawn', () => {
    const { subject, text } = compose([payload({ event: 'resolved', alert: { rule: 'bottle', level: 'know', headline: 'May be bottled: since Mon 17:50.' } })], context);
    expect(subject).toMatch(/^No longer so: /);
    expect(text).toContain('Take care. Do not bottle it now.');
  });

  it('cannot be made to carry a second header', () => {
    for (const name of ['Stout\r\nBcc: all@example.org', 'Stout\u2028Bcc: x@example.org', 'Stout\u0000\u0007', 'a\u202ecod.exe']) {
      for (const event of EVENTS) {
        const { subject } = compose([payload({ event, batch: { name } })], context);
        expect(subject).not.toMatch(/[\u0000-\u001f\u007f\u2028\u2029\u202e]/);
      }
    }
  });

  it('shows names as they were written, and runs none of them', () => {
    const name = `<script>alert(1)</script><img src=x onerror=alert(1)>"'&`;
    for (const event of EVENTS) {
      const { html } = compose([payload({ event, batch: { name, place: name }, cellar: { name }, alert: { headline: name, reason: name, act: name } })], context);
      expect(html).not.toMatch(/<script|<img/);
      expect(html).toContain('&lt;script&gt;');
    }
  });

  it('cannot be led elsewhere by a batch identifier', () => {
    expect(compose([payload({ batch: { id: '../../"><a href="//evil.example' } })], context).html).not.toContain('href="//evil');
  });

  it('is made also for a cellar whose time zone this machine does not know', () => {
    expect(compose([payload({ cellar: { time_zone: 'Mars/Olympus' } })], context).text).toContain('Since Mon 2 Mar 23:00');
  });
});

describe('several at once', () => {
  const foam = payload({ alert: { rule: 'foam', level: 'act', headline: 'Foam may reach the airlock.' }, batch: { name: 'Perry', tag: 1 } });
  const ready = payload({ alert: { rule: 'rack', level: 'know', headline: 'May be racked: since Sat 14:50.' }, batch: { name: 'Crab cider', tag: null } });
  const over = payload({ event: 'resolved', batch: { name: 'Quince wine', tag: 2 } });

  it('come as one mail, the most urgent first and what has passed last', () => {
    const { subject, text } = compose([over, ready, payload(), foam], context);
    expect(subject).toBe('Now: 4 messages: Perry, tag 1: Foam may reach the airlock, and more');
    const order = ['Perry', 'Oat stout', 'Crab cider', 'Quince wine'].map((name) => text.indexOf(name));
    expect(order).toEqual(order.toSorted((a, b) => a - b));
    expect(text.match(/https:\/\/barn\.example\/batches\//g)).toHaveLength(3);
  });

  it('keep each one’s caution', () => {
    const { text } = compose([foam, payload({ alert: { rule: 'refermentation', level: 'act' } })], context);
    expect(text).toContain(en['advice.foam.caution']);
    expect(text).toContain(en['advice.refermentation.caution']);
  });

  it('may hold a word about the house', () => {
    const house = { template: 'ingest', event: 'opened', at: '2026-03-04T06:00:00Z', since: '2026-03-04T05:00:00Z', time_zone: 'UTC' } as const;
    expect(compose([house, ready], context).text).toContain('no readings come in from any sensor');
    expect(compose([house], context).subject).toBe('Check: no readings come in from any sensor');
    expect(compose([{ ...house, event: 'resolved' }], context).text).toContain('Sensors send what they kept');
  });

  it('are at least one', () => {
    expect(() => compose([], context)).toThrow(RangeError);
  });
});

describe('what the outbox keeps', () => {
  it('is checked before a mail is made of it', () => {
    expect(mailPayload.safeParse(payload()).success).toBe(true);
    expect(mailPayload.safeParse({ ...payload(), event: 'shouted' }).success).toBe(false);
    expect(mailPayload.safeParse(null).success).toBe(false);
  });
});

describe('figures in a mail', () => {
  it('have the digits and the sign of the screen', () => {
    expect([figure(texts, 1.0406, 'SG'), figure(texts, 15.44, '°C'), figure(texts, -0.31, 'points/d'), figure(texts, 0.605, 'L/h'), figure(texts, 12.04, 'h'), figure(texts, NaN, 'L')]).toEqual(['1.041', '15.4 °C', '−0.3 points/d', '0.60 L/h', '12 h', '?']);
  });

  it('name the hour of the cellar, also on the day the clocks change', () => {
    expect(when(texts, '2026-03-29T00:30:00Z', 'Europe/Berlin')).toBe('Sun 29 Mar 01:30');
    expect(when(texts, '2026-03-29T01:30:00Z', 'Europe/Berlin')).toBe('Sun 29 Mar 03:30');
    expect(when(texts, '2028-02-29T23:30:00Z', 'Pacific/Auckland')).toBe('Wed 1 Mar 12:30');
  });

  it('say how long something lasted', () => {
    const lasted = (minutes: number) => lasting(texts, '2026-01-01T00:00:00Z', new Date(Date.UTC(2026, 0, 1) + minutes * 60_000).toISOString());
    expect([lasted(0), lasted(59), lasted(250), lasted(31 * 60), lasted(4 * 24 * 60), lasted(-5)]).toEqual(['0 min', '59 min', '4 h 10 min', '31 h', '4 days', '0 min']);
  });
});
