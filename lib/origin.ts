import { AsyncLocalStorage } from 'node:async_hooks';

/** From where the request in hand came, for the audit trail. */
export interface Origin {
  /** As the nearest proxy saw it. */
  address: string;
  /** `session`, or `token …1a2b`: by which key. */
  means: string;
}

const held = new AsyncLocalStorage<Origin>();

/** Runs the work with its origin known to everything below. */
export const withOrigin = <T>(origin: Origin, work: () => T): T => held.run(origin, work);

/** Null outside a request: the worker, a script. */
export const currentOrigin = (): Origin | null => held.getStore() ?? null;
