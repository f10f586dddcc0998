import { UnavailableError } from './errors';

interface Room {
  /** Pieces of work that run together. */
  atOnce: number;
  /** How many more may wait; whoever comes after them is told so at once. */
  waiting: number;
  /** What they are told. */
  says: string;
}

/** Gives turns to work that needs much of the machine: better to say that there are too many than to answer in a minute. */
export function turns({ atOnce, waiting: mostWaiting, says }: Room): <T>(work: () => Promise<T>) => Promise<T> {
  let running = 0;
  const waiting: Array<() => void> = [];
  return async (work) => {
    if (running >= atOnce) {
      if (waiting.length >= mostWaiting) throw new UnavailableError(says);
      await new Promise<void>((resolve) => waiting.push(resolve));
    } else {
      running += 1;
    }
    try {
      return await work();
    } finally {
      // The turn passes on; only when nobody waits is it given back.
      const next = waiting.shift();
      if (next) next();
      else running -= 1;
    }
  };
}
