import { describe, expect, it } from 'vitest';
import { asFailure } from '@/lib/mail/smtp';

const said = (responseCode: number | undefined, code?: string) => asFailure(Object.assign(new Error('x'), { responseCode, code }));

describe('what a mail server answers', () => {
  it.each([
    ['nobody answers', undefined, 'ECONNECTION', 'unavailable'],
    ['it shuts down', 421, 'EPROTOCOL', 'unavailable'],
    ['it is busy', 451, 'EMESSAGE', 'deferred'],
    ['it says no to the mail', 550, 'EENVELOPE', 'refused'],
    ['the address is none that can be written to', undefined, 'EENVELOPE', 'refused'],
  ] as const)('is taken for what it is: %s', (_, responseCode, code, kind) => {
    expect(said(responseCode, code).kind).toBe(kind);
  });

  // RFC 4954 4.2 and 6: they speak of who sends, not of the mail.
  it.each([454, 530, 534, 535, 538])('is no fault of the mail where it does not let the house in: %i', (responseCode) => {
    expect(said(responseCode, 'EAUTH').kind).toBe('unavailable');
  });
});
