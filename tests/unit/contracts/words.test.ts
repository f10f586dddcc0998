import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { endpoints, type Endpoint } from '@/lib/contracts/endpoints';
import { pageQuery } from '@/lib/contracts/common';

const said = (schema: z.ZodType, value: unknown) => schema.safeParse(value).error?.issues.map((issue) => `${issue.path.join('.')} ${issue.message}`.trim());

describe('what is said of a value that is wrong', () => {
  it.each<[string, z.ZodType, unknown, string]>([
    ['too small', pageQuery, { limit: '0' }, 'limit must be at least 1'],
    ['too large', pageQuery, { limit: '500' }, 'limit must be at most 200'],
    ['no number', pageQuery, { limit: 'ten' }, 'limit must be a number'],
    ['no whole number', pageQuery, { limit: '1.5' }, 'limit must be a whole number'],
    ['given twice', pageQuery, { cursor: ['a', 'b'] }, 'cursor must be text'],
    ['too long', pageQuery, { cursor: 'x'.repeat(201) }, 'cursor must have at most 200 characters'],
    ['left out', z.object({ name: z.string() }), {}, 'name is needed'],
    ['none of a few', z.enum(['cider', 'mead']), 'tea', 'must be one of cider, mead'],
    ['not the one', z.literal('cider'), 'tea', 'must be cider'],
    ['too many', z.array(z.string()).max(1), ['a', 'b'], 'must have at most 1 item'],
    ['out of bounds', z.number().gt(0), 0, 'must be more than 0'],
    ['no time', z.iso.datetime(), 'today', 'must be a time with a zone, such as 2026-03-04T06:00:00Z'],
    ['of no form', z.string().regex(/^a$/), 'b', 'is not in the form that this takes'],
    ['more than was asked', z.strictObject({}), { extra: 1 }, 'has fields that are not known: extra'],
    ['neither of two', z.union([z.string(), z.number()]), true, 'is not in the form that this takes'],
  ])('%s', (_what, schema, value, sentence) => {
    expect(said(schema, value)).toEqual([sentence]);
  });

  it('is the schema’s own sentence where it has one', () => {
    expect(said(z.string('must be text to read'), 1)).toEqual(['must be text to read']);
  });

  it('is in our own words for every query and body of the API', () => {
    const theirs = /Invalid|Too (small|big)|expected|received|Unrecognized/;
    for (const [name, { query, body }] of Object.entries<Endpoint>(endpoints)) {
      for (const schema of [query, body]) for (const value of [undefined, null, 7, 'x', [], {}]) expect((schema && said(schema, value)) ?? [], name).not.toEqual(expect.arrayContaining([expect.stringMatching(theirs)]));
    }
  });
});
