import { parse, TYPE, type MessageFormatElement } from '@formatjs/icu-messageformat-parser';
import { USUAL_UNITS } from '@/lib/core/units/chosen';
import { en } from '@/lib/texts/en';
import { textsFor } from '@/lib/texts/texts';

/** As most readers of these tests are written to. */
export const english = await textsFor({ locale: 'en', units: USUAL_UNITS });

/** Every branch's elements, those of branches within included. */
function* elementsOf(elements: readonly MessageFormatElement[]): Generator<MessageFormatElement> {
  for (const element of elements) {
    yield element;
    if (element.type === TYPE.select || element.type === TYPE.plural) for (const option of Object.values(element.options)) yield* elementsOf(option.value);
  }
}

/** What a text is given, each with its kind: `count plural`, `name argument`. */
function givenTo(text: string): string[] {
  const elements = [...elementsOf(parse(text, { ignoreTag: true }))];
  return [...new Set(elements.flatMap((element) => (element.type === TYPE.literal || element.type === TYPE.pound || element.type === TYPE.tag ? [] : [`${element.value} ${TYPE[element.type]}`])))].sort();
}

/** What a translation lacks, has too much, or cannot be read in, by key; empty: it can be used. */
export function faultsOf(catalogue: Readonly<Record<string, string>>, original: Readonly<Record<string, string>> = en): string[] {
  const keys = [...new Set([...Object.keys(original), ...Object.keys(catalogue)])];
  return keys.flatMap((key) => {
    const [source, text] = [original[key], catalogue[key]];
    if (source === undefined) return [`${key}: is no text of this house`];
    if (text === undefined) return [`${key}: is missing`];
    try {
      // A translation may choose by a number or a word where English does not, and the other way round.
      const names = (list: string[]) => [...new Set(list.map((item) => item.split(' ')[0]!))];
      const [wanted, has] = [names(givenTo(source)), names(givenTo(text))];
      return [...wanted.filter((name) => !has.includes(name)).map((name) => `${key}: lacks {${name}}`), ...has.filter((name) => !wanted.includes(name)).map((name) => `${key}: knows no {${name}}`)];
    } catch (error) {
      return [`${key}: cannot be read, ${(error as Error).message}`];
    }
  });
}
