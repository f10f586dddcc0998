/** A loop that works, sleeps as long as the work says, and can be woken or stopped. */
export interface Loop {
  wake(): void;
  /** Fulfils when the work in hand is done. */
  stop(): Promise<void>;
}

/**
 * Runs `work` again and again. It returns how long to sleep, ms; what it throws
 * goes to `onError`, which returns the same.
 */
export function startLoop(work: () => Promise<number>, onError: (error: unknown) => number): Loop {
  let stopping = false;
  let woken = false;
  let rouse: (() => void) | null = null;

  const sleep = (ms: number) =>
    new Promise<void>((resolve) => {
      if (stopping || woken) return resolve();
      const timer = setTimeout(resolve, ms);
      rouse = () => {
        clearTimeout(timer);
        resolve();
      };
    });

  const running = (async () => {
    while (!stopping) {
      woken = false;
      const pause = await work().catch(onError);
      await sleep(pause);
      rouse = null;
    }
  })();

  const wake = () => {
    woken = true;
    rouse?.();
  };
  return {
    wake,
    stop: () => {
      stopping = true;
      wake();
      return running;
    },
  };
}
