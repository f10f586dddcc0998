import { describe, expect, it } from 'vitest';
import { createInvitation, createToken } from '@/lib/contracts/people';
import { createShare } from '@/lib/contracts/shares';

describe('what gives access', () => {
  it.each([
    ['a share link', createShare, {}],
    ['an invitation', createInvitation, { email: 'wren@low.example', role: 'hand' }],
    ['a token', createToken, { name: 'Kettle', role: 'hand' }],
  ])('refuses a limit that nobody knows: %s', (_, schema, body) => {
    expect(schema.safeParse({ ...body, expires_in_days: 7 }).success).toBe(true);
    expect(schema.safeParse({ ...body, days: 7 }).error?.issues.map(({ message }) => message)).toEqual(['has fields that are not known: days']);
  });
});
