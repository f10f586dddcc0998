import { parse, TYPE, type MessageFormatElement } from '@formatjs/icu-messageformat-parser';
import { printAST } from '@formatjs/icu-messageformat-parser/printer.js';
import type { Catalogue, TextKey } from '@/lib/texts/catalogue';
import { en } from '@/lib/texts/en';
import type * as Languages from '@/lib/texts/languages';

const PLAIN = 'abcdefghijklmnopqrstuvwxyzABCDEFGHIJKLMNOPQRSTUVWXYZ';
const ACCENTED = 'áƀçďéƒĝĥíĵķĺḿñóƥɋŕšťúṽŵẋýžÁƁÇĎÉƑĜĤÍĴĶĹḾÑÓƤɊŔŠŤÚṼŴẊÝŽ';
const accented = (text: string) => [...text].map((sign) => [...ACCENTED][PLAIN.indexOf(sign)] ?? sign).join('');

function accentAll(elements: readonly MessageFormatElement[]): MessageFormatElement[] {
  return elements.map((element) => {
    if (element.type === TYPE.literal) return { ...element, value: accented(element.value) };
    if (element.type === TYPE.select || element.type === TYPE.plural) return { ...element, options: Object.fromEntries(Object.entries(element.options).map(([name, option]) => [name, { ...option, value: accentAll(option.value) }])) } as MessageFormatElement;
    return element;
  });
}

/** A language that nobody speaks: English, every letter accented, each text in brackets. What shows neither did not come from the catalogue. */
export const bracketed = Object.fromEntries(Object.entries(en).map(([key, text]) => [key, `⟦${printAST(accentAll(parse(text, { ignoreTag: true })))}⟧`])) as Record<TextKey, string> satisfies Catalogue;

/** The tag of that language: private use, ISO 639-2. Its dates and numbers are those of Greek, which has no Latin letters. */
export const BRACKETED = 'qps';

/** For `vi.mock('@/lib/texts/languages', …)`: one language more, added as any other is. */
export function withBracketed(languages: typeof Languages): typeof Languages {
  Object.assign(languages.LANGUAGES, { [BRACKETED]: { name: accented('English'), usage: 'el', texts: async () => bracketed } });
  languages.LOCALES.push(BRACKETED as Languages.Locale);
  return languages;
}

/** What stands in a bracketed text without coming from the catalogue: plain Latin letters anywhere, or any Latin letter outside the brackets. @param known what is data, or the same in every language */
export function escapedFrom(text: string, known: readonly string[] = []): string[] {
  let left = known.reduce((rest, name) => rest.replaceAll(name, ' '), text.replace(/https?:\/\/\S+/g, ' '));
  const plain = left.match(/[A-Za-z]+/g) ?? [];
  for (let before = ''; before !== left; ) [before, left] = [left, left.replace(/⟦[^⟦⟧]*⟧/g, ' ')];
  return [...plain, ...(left.match(/[⟦⟧]|\p{Script=Latin}+/gu) ?? [])];
}
