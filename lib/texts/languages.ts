import type { Catalogue } from './catalogue';

export interface Language {
  /** By its own name. */
  name: string;
  /** The BCP 47 tag whose dates, numbers and plurals it uses. */
  usage: string;
  /** Read in when a message is written: what only has to name the languages, as the browser does, carries no texts. */
  texts: () => Promise<Catalogue>;
}

/** The languages in which messages are written: one line each, and a file beside this one. */
export const LANGUAGES = {
  en: { name: 'English', usage: 'en-GB', texts: () => import('./en').then(({ en }) => en) },
} as const satisfies Record<string, Language>;

export type Locale = keyof typeof LANGUAGES;
export const LOCALES = Object.keys(LANGUAGES) as [Locale, ...Locale[]];

/** The language kept with a person, or English where this house no longer has it. */
export const localeOf = (kept: string | null | undefined): Locale => LOCALES.find((locale) => locale === kept) ?? 'en';
