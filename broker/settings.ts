import { hearChanges } from '@/lib/services/changes';
import { owedSettings } from '@/lib/services/sensors/settings-owed';
import { logFor } from '@/lib/log';

const log = logFor('settings');
const RETRY_MS = 5_000;

/** Lays a retained message on a topic; an empty one takes away what lay there. */
export type Retain = (topic: string, payload: string) => Promise<void>;

/**
 * Keeps every sensor's settings on its topic at the broker: all of them whenever
 * this house begins to listen, then those of the cellar where a sensor changed.
 */
export function keepSettings(retain: Retain): { again(): void; stop(): Promise<void> } {
  const laid = new Map<string, string>();
  let owed = new Set<string | null>();
  let working: Promise<void> | null = null;
  let timer: NodeJS.Timeout | undefined;
  let stopped = false;

  const lay = async () => {
    while (owed.size > 0 && !stopped) {
      // The word for all covers every cellar's.
      const cellars: (string | null)[] = owed.has(null) ? [null] : [...owed];
      owed = new Set();
      try {
        for (const cellar of cellars) {
          for (const { topic, payload } of await owedSettings(cellar)) {
            if (laid.get(topic) === payload) continue;
            await retain(topic, payload);
            laid.set(topic, payload);
          }
        }
      } catch (error) {
        for (const cellar of cellars) owed.add(cellar);
        log.warn({ err: error }, 'settings could not be laid on their topics; tried again');
        timer = setTimeout(() => ask(), RETRY_MS);
        return;
      }
    }
  };
  const ask = (cellar?: string | null) => {
    if (cellar !== undefined) owed.add(cellar);
    working ??= lay().finally(() => (working = null));
  };

  const listener = hearChanges({
    onChange: (change) => {
      if (change.kind === 'sensor') ask(change.cellar);
    },
    // What was said while nobody listened is found by looking at all of them.
    onConnect: () => ask(null),
    onError: (error) => log.warn({ err: error }, 'changes go unheard; connecting again'),
  });
  return {
    /** The broker may have lost what lay there: all of it is laid anew. */
    again: () => {
      laid.clear();
      ask(null);
    },
    stop: async () => {
      stopped = true;
      clearTimeout(timer);
      await listener.close();
      await working;
    },
  };
}
