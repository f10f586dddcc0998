import { logFor } from '@/lib/log';
import { beat, HEARTBEAT_MS, type Part } from '@/lib/services/heartbeat';

const log = logFor('heartbeat');

/** Says again and again that this part lives, with its figures; returns the function that stops it. */
export function startHeartbeat(part: Part, figures: () => Record<string, unknown>): () => void {
  let beating = false;
  const once = () => {
    // While the database stalls, one try at a time.
    if (beating) return;
    beating = true;
    beat(part, figures())
      .catch((error: unknown) => log.warn({ err: error, part }, 'the sign of life could not be written'))
      .finally(() => (beating = false));
  };
  once();
  const timer = setInterval(once, HEARTBEAT_MS);
  return () => clearInterval(timer);
}
