export interface Address {
  name: string;
  address: string;
}

export interface OutgoingMail {
  to: Address;
  subject: string;
  text: string;
  html: string;
  /** The same for every try of the same mail, so that a double can be told from a new one. */
  messageId: string;
  /** The mail this one follows, to keep them together in the reader. */
  inReplyTo: string | null;
}

/** A way out of the house. `send` fulfils when the other side has taken the mail. */
export interface MailTransport {
  /** @throws MailFailure */
  send(mail: OutgoingMail): Promise<void>;
  close(): void;
}

/**
 * `unavailable`: the server cannot be reached or does not answer, so the next
 * mail would fare no better. `deferred`: it said "later" (4xx). `refused`: it
 * said "no" (5xx).
 */
export type FailureKind = 'unavailable' | 'deferred' | 'refused';

export class MailFailure extends Error {
  override name = 'MailFailure';
  constructor(
    readonly kind: FailureKind,
    message: string,
    options?: ErrorOptions,
  ) {
    super(message, options);
  }
}
