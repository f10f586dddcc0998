import { IntlMessageFormat } from 'intl-messageformat';
import type { ChosenUnits } from '../core/units/chosen';
import type { Catalogue, Given, TextKey } from './catalogue';
import { LANGUAGES, localeOf, type Language } from './languages';

/** For whom a message is written. */
export interface Reader {
  /** As it is kept with the person. */
  locale: string | null;
  units: ChosenUnits;
}

/** The words in which one reader is written to. */
export interface Texts {
  /** The language's tag, for `lang`. */
  lang: string;
  /** The BCP 47 tag for dates and numbers. */
  usage: string;
  units: ChosenUnits;
  /** The text of that key with its values put in. */
  t<Key extends TextKey>(key: Key, ...given: Given<Key>): string;
}

/** Reading a text's braces costs more than filling them. */
const read = new WeakMap<Catalogue, Map<TextKey, IntlMessageFormat>>();

function formatOf(catalogue: Catalogue, usage: string, key: TextKey): IntlMessageFormat {
  const formats = read.get(catalogue) ?? new Map<TextKey, IntlMessageFormat>();
  read.set(catalogue, formats);
  // What people typed may hold `<`, and mails are escaped as a whole: no text has tags.
  const format = formats.get(key) ?? new IntlMessageFormat(catalogue[key], usage, undefined, { ignoreTag: true });
  formats.set(key, format);
  return format;
}

/** The words for a reader: their language, or English where this house does not have it. */
export async function textsFor({ locale, units }: Reader): Promise<Texts> {
  const lang = localeOf(locale);
  const { usage, texts }: Language = LANGUAGES[lang];
  const catalogue = await texts();
  return { lang, usage, units, t: (key, ...[values]) => String(formatOf(catalogue, usage, key).format(values as Record<string, string | number> | undefined)) };
}
