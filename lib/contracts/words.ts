import type { z } from 'zod';

const THINGS: Record<string, string> = { string: 'text', number: 'a number', int: 'a whole number', boolean: 'true or false', array: 'a list', object: 'an object', date: 'a time' };
const FORMATS: Record<string, string> = { datetime: 'a time with a zone, such as 2026-03-04T06:00:00Z', date: 'a date such as 2026-03-04', uuid: 'an identifier', email: 'a mail address', url: 'an address' };
const COUNTED: Record<string, string> = { string: 'characters', array: 'items', set: 'items', map: 'items', file: 'bytes' };

/** `origin` tells what has the bound: a text its characters, a list its items, a number itself. */
function bound(origin: string, word: string, figure: number | bigint): string {
  const counted = COUNTED[origin];
  return counted ? `must have ${word} ${figure} ${figure === 1 && counted === 'items' ? 'item' : counted}` : `must be ${word} ${figure}`;
}

/** What is said of a value where its schema says nothing itself, so that all sentences of a form or an answer are of one kind. */
export function words(issue: z.core.$ZodRawIssue): string {
  switch (issue.code) {
    case 'invalid_type':
      return issue.input === undefined ? 'is needed' : `must be ${THINGS[issue.expected] ?? issue.expected}`;
    case 'invalid_value':
      return issue.values.length === 1 ? `must be ${String(issue.values[0])}` : `must be one of ${issue.values.map(String).join(', ')}`;
    case 'too_small':
      return bound(issue.origin, issue.exact ? 'exactly' : issue.inclusive ? 'at least' : 'more than', issue.minimum);
    case 'too_big':
      return bound(issue.origin, issue.exact ? 'exactly' : issue.inclusive ? 'at most' : 'less than', issue.maximum);
    case 'not_multiple_of':
      return issue.divisor === 1 ? 'must be a whole number' : `must be a multiple of ${issue.divisor}`;
    case 'invalid_format':
      return FORMATS[issue.format] ? `must be ${FORMATS[issue.format]}` : 'is not in the form that this takes';
    case 'unrecognized_keys':
      return `has fields that are not known: ${issue.keys.join(', ')}`;
    default:
      return 'is not in the form that this takes';
  }
}
