import { z } from 'zod';
import type { Texts } from '../texts/texts';

/**
 * A letter: a mail about somebody's account or an invitation, to one address.
 * It holds no secret: the link's token is made from the row it names when the
 * letter is sent.
 */
const invitationLetter = z.object({
  template: z.literal('invitation'),
  invitation: z.string(),
  cellar: z.string(),
  by: z.string(),
  role: z.enum(['keeper', 'brewer', 'hand', 'guest']),
  expires_at: z.string(),
  time_zone: z.string(),
});

/** A link that does something, once. */
const linkLetter = z.object({
  template: z.literal('link'),
  kind: z.enum(['sign-in', 'password', 'mail-old', 'mail-new']),
  link: z.string(),
  expires_at: z.string(),
  /** For a change of address: the new one. */
  new_email: z.string().nullable(),
});

/** Something about the account has changed: whoever did not do it should know. */
const noticeLetter = z.object({
  template: z.literal('notice'),
  what: z.enum(['password-changed', 'second-factor-on', 'second-factor-off', 'recovery-code-used', 'mail-changed', 'account-deleted', 'removed', 'handed-over', 'webhook-given-up']),
  at: z.string(),
  time_zone: z.string(),
  /** The cellar or the address it is about. */
  about: z.string().nullable(),
  /** What the person read when it was owed: their account may be gone when it is written. */
  locale: z.string().optional(),
});

export const letterPayload = z.discriminatedUnion('template', [invitationLetter, linkLetter, noticeLetter]);
export type LetterPayload = z.infer<typeof letterPayload>;
export type InvitationLetter = z.infer<typeof invitationLetter>;
export type LinkLetter = z.infer<typeof linkLetter>;
export type NoticeLetter = z.infer<typeof noticeLetter>;

export interface LetterContext {
  /** Where links lead, without a slash at the end. */
  publicUrl: string;
  /** The reader's language and units. */
  texts: Texts;
  /** The reader's own zone; absent where no account tells it. */
  timeZone?: string | null;
  /** The link's token; empty where the letter has none. */
  token: string;
}
