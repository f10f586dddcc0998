import { describe, expect, it } from 'vitest';
import { USUAL_UNITS } from '@/lib/core/units/chosen';
import { compose } from '@/lib/mail/compose';
import { composeLetter } from '@/lib/mail/compose-letter';
import { letterPayload } from '@/lib/mail/letters';
import { mailPayload } from '@/lib/mail/payload';
import { composePush } from '@/lib/push/compose';
import type { TextKey } from '@/lib/texts/catalogue';
import { en } from '@/lib/texts/en';
import { LANGUAGES, localeOf, LOCALES } from '@/lib/texts/languages';
import { textsFor, type Texts } from '@/lib/texts/texts';
import { EVERY_LETTER, EVERY_MESSAGE } from '../../support/every-message';
import { bracketed, escapedFrom } from '../../support/bracketed';
import { english, faultsOf } from '../../support/texts';

const publicUrl = 'https://barn.example';

describe('the catalogues', () => {
  it.each(LOCALES)('have every text with everything that it is given (%s)', async (locale) => {
    expect(faultsOf(await LANGUAGES[locale].texts())).toEqual([]);
  });

  it('are found out where a text or a name in braces is missing, foreign or unreadable', () => {
    const { sentence: _, ...short } = bracketed;
    expect(faultsOf(short)).toEqual(['sentence: is missing']);
    expect(faultsOf({ ...bracketed, greeting: 'x' })).toEqual(['greeting: is no text of this house']);
    expect(faultsOf({ ...bracketed, 'date.day': '{weekday} {month} {year}' })).toEqual(['date.day: lacks {day}', 'date.day: knows no {year}']);
    expect(faultsOf({ ...bracketed, 'digest.subject': '{cellar}: {jobs, plural, other {# ×}}' })).toEqual(['digest.subject: lacks {vessels}']);
    expect(faultsOf({ ...bracketed, sentence: '{text' })[0]).toMatch(/^sentence: cannot be read/);
    expect(faultsOf({ ...bracketed, 'span.days': '{days, plural, one {# d}}' })[0]).toMatch(/^span\.days: cannot be read/);
  });

  it('hold nothing that no message says, and the messages of these tests say all of it', () => {
    const said = new Set<TextKey>();
    const texts: Texts = { ...english, t: (key, ...given) => (said.add(key), english.t(key, ...given)) };
    for (const payloads of EVERY_MESSAGE) {
      compose(payloads, { publicUrl, texts });
      compose(payloads, { publicUrl, texts, takeUrls: new Map([['12', `${publicUrl}/take/x`]]) });
      composePush(payloads, texts);
    }
    for (const letter of EVERY_LETTER) composeLetter(letter, { publicUrl, token: '', texts });
    expect(Object.keys(en).filter((key) => !said.has(key as TextKey))).toEqual([]);
  });

  it('are tried with every kind of message', () => {
    const kinds = new Set(EVERY_MESSAGE.flat().map((payload) => ('event' in payload ? `${payload.template} ${payload.event}` : payload.template)));
    const wanted = mailPayload.options.flatMap(({ shape }): string[] => ('event' in shape ? shape.event.options.map((event) => `${shape.template.value} ${event}`) : [shape.template.value]));
    expect([...kinds].sort()).toEqual(wanted.sort());
    const letters = new Set(EVERY_LETTER.map((letter) => ('kind' in letter ? letter.kind : 'what' in letter ? letter.what : letter.role)));
    const wantedLetters = letterPayload.options.flatMap(({ shape }): string[] => ('kind' in shape ? shape.kind.options : 'what' in shape ? shape.what.options : shape.role.options));
    expect([...letters].sort()).toEqual(wantedLetters.sort());
  });
});

describe('a text', () => {
  const { t } = english;

  it('counts by the rules of its language', () => {
    expect([0, 1, 2].map((jobs) => t('digest.subject', { cellar: 'Low barn', jobs, vessels: jobs }))).toEqual(['Low barn: nothing due today', 'Low barn: 1 job today, 1 vessel wants you', 'Low barn: 2 jobs today, 2 vessels want you']);
    expect([1, 3].map((days) => t('span.days', { days }))).toEqual(['1 day', '3 days']);
  });

  it('puts in what people typed as they typed it, braces, tags and quotes included', () => {
    for (const name of ['{cellar}', "'{'", '<b>x</b>', '# {n, plural, other {#}}', '']) expect(t('digest.muted', { vessel: name, until: 'now' })).toBe(`${name} is muted until now.`);
  });

  it('cannot be asked for with a wrong key, or without what it is given', () => {
    const never = () => {
      // @ts-expect-error no such text
      t('greeting');
      // @ts-expect-error the name is missing
      t('digest.job.taken');
      // @ts-expect-error misspelt
      t('digest.job.taken', { nmae: 'Una' });
      // @ts-expect-error found inside the branches of a plural
      t('push.several', { count: 2 });
      // @ts-expect-error a plural counts
      t('span.days', { days: '3' });
      // @ts-expect-error it takes nothing
      t('digest.nothing', { name: 'Una' });
    };
    expect(never).toBeTypeOf('function');
  });

  it('is English where this house does not have the language that was kept', async () => {
    expect([localeOf('en'), localeOf('xx'), localeOf(null)]).toEqual(['en', 'en', 'en']);
    expect((await textsFor({ locale: 'toString', units: USUAL_UNITS })).t('digest.nothing')).toBe('Nothing due today.');
  });
});

describe('the search for what escaped the catalogue', () => {
  it('finds a word that is not accented, and one that is not bracketed', () => {
    expect(escapedFrom('⟦Ďúé⟧ Μηλίτης https://barn.example/x 06:00')).toEqual([]);
    expect(escapedFrom('⟦Ďúé today⟧')).toEqual(['today']);
    expect(escapedFrom('⟦Ďúé⟧ ťóďáý')).toEqual(['ťóďáý']);
    expect(escapedFrom('⟦⟦Ďúé⟧ Europe/Berlin⟧', ['Europe/Berlin'])).toEqual([]);
  });
});
