import type { Claimed } from '@/db/queries/outbox';
import type { MeansName } from '@/lib/core/alerts/telling';
import type { MailPayload } from '@/lib/mail/payload';

/** One thing that a person is owed, ready to go. */
export interface Ready {
  row: Claimed;
  payload: MailPayload;
}

/** A way out of the house to a person. `send` fulfils when the other side has taken all of it. */
export interface Means {
  readonly name: MeansName;
  /** @param ready at least one, all of one person @throws MailFailure, NobodyThere */
  send(ready: readonly Ready[]): Promise<void>;
  close(): void;
}

/** The person has nothing that could take it: no fault, and nothing to try again. */
export class NobodyThere extends Error {
  override name = 'NobodyThere';
}
