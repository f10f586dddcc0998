import { describe, expect, it } from 'vitest';
import { composeLetter } from '@/lib/mail/compose-letter';
import type { InvitationLetter, LinkLetter } from '@/lib/mail/letters';
import { english } from '../../support/texts';

const context = { publicUrl: 'https://barn.example', token: 'A'.repeat(32), texts: english };
const invitation = (change: Partial<InvitationLetter> = {}): InvitationLetter => ({ template: 'invitation', invitation: 'x', cellar: 'Stone loft', by: 'Wren Holt', role: 'hand', expires_at: '2026-03-10T12:00:00Z', time_zone: 'Europe/Lisbon', ...change });
const link = (kind: LinkLetter['kind']): LinkLetter => ({ template: 'link', kind, link: 'x', expires_at: '2026-03-10T12:00:00Z', new_email: 'new@loft.example' });

describe('letters', () => {
  it('say who asks what of whom, until when, and lead to one page with the secret behind the #', () => {
    const { subject, text, html } = composeLetter(invitation(), context);
    expect(subject).toBe('Wren Holt asks you to share the cellar Stone loft');
    expect(text).toContain('Open until Tue 10 Mar 12:00.');
    expect(text).toContain(`https://barn.example/invitation#${context.token}`);
    expect(html).toContain('A hand helps on the round');
  });

  it('lead each to its own page, and say what to do if it was not you', () => {
    const pages = { 'sign-in': '/sign-in/link#', password: '/sign-in/passphrase#', 'mail-old': '/mail-address#', 'mail-new': '/mail-address#' } as const;
    for (const [kind, page] of Object.entries(pages)) {
      const { text } = composeLetter(link(kind as LinkLetter['kind']), context);
      expect(text, kind).toContain(`https://barn.example${page}${context.token}`);
      expect(text, kind).toMatch(/If (you did not ask|it was not you)/);
    }
  });

  // OWASP ASVS 5.0.0 1.3.11.
  it('keep names out of the headers and the markup, whatever they hold', () => {
    for (const name of ['x\r\nBcc: all@evil.example', 'x\u2028Subject: y', '\u202Etxet', '"><script>alert(1)</script>', '\u0000', 'a'.repeat(5_000)]) {
      const { subject, html } = composeLetter(invitation({ cellar: name, by: name }), context);
      expect(subject).not.toMatch(/[\u0000-\u001f\u2028\u2029\u202a-\u202e]/);
      expect(subject.length).toBeLessThanOrEqual(200);
      expect(html).not.toContain('<script>alert');
    }
  });

  it('tell of a change to the account without a secret, with the way to undo it', () => {
    const { subject, text } = composeLetter({ template: 'notice', what: 'password-changed', at: '2026-03-10T12:00:00Z', time_zone: 'UTC', about: null }, { ...context, token: '' });
    expect(subject).toBe('Your passphrase was changed');
    expect(text).toContain('https://barn.example/settings/security');
    expect(text).not.toContain('#');
  });
});
