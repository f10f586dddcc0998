import { clock, when } from '@/components/charts/zone';
import { entryWords } from '@/components/batch/entry-words';
import type { LogKind } from '@/components/batch/log';
import { gravityText } from '@/components/batch/figures';
import type { EntryBody } from '@/lib/contracts/batches';
import type { Stopped } from '@/lib/client/unsent/send';
import type { Unsent, UnsentEntry } from '@/lib/client/unsent/store';

/** What is this new needs no word while the line is up. */
const SLOW_MS = 90_000;

const notes = (count: number) => (count === 1 ? '1 note waits' : `${count} notes wait`);

export interface BarWords {
  strong: string;
  rest: string;
  /** Where to go about it. */
  link: { href: string; word: string } | null;
  /** `away`: the ink bar. `mind`: something to see to, while the line is up. */
  tone: 'away' | 'mind';
}

interface BarFacts {
  /** Since when the line is down; null: it is up. */
  offlineSince: number | null;
  /** How old what is shown is; null: the server's. */
  keptSince: number | null;
  waiting: number;
  refused: readonly Pick<Unsent, 'batchId'>[];
  stopped: Stopped;
  now: number;
  timeZone: string;
}

/** What the bar under the header says; null: nothing to say. Times in ms. */
export function barWords({ offlineSince, keptSince, waiting, refused, stopped, now, timeZone }: BarFacts): BarWords | null {
  const wait = waiting > 0 ? ` ${notes(waiting)} to be sent.` : '';
  const asOf = keptSince === null ? null : when(keptSince / 1000, now / 1000, timeZone);
  const about = refused[0] ? { href: refused[0].batchId === null ? '/rounds' : `/batches/${refused[0].batchId}`, word: 'Look at it' } : null;
  const no = refused.length === 0 ? '' : ` ${refused.length === 1 ? '1 note was' : `${refused.length} notes were`} not taken.`;
  if (offlineSince !== null) {
    const strong = asOf === null ? `Offline since ${clock(offlineSince / 1000, timeZone)}.` : `Offline. Shown as of ${asOf}.`;
    return { strong, rest: `${asOf === null ? 'Showing what was known then. ' : ''}It catches up by itself.${wait}${no}`, link: about, tone: 'away' };
  }
  if (asOf !== null && now - keptSince! > SLOW_MS) return { strong: `Shown as of ${asOf}.`, rest: `The network is slow; it catches up by itself.${wait}${no}`, link: about, tone: 'away' };
  if (waiting > 0 && stopped === 'signed-out') return { strong: `${notes(waiting)} on this device.`, rest: 'Sign in again and they are sent.', link: { href: '/sign-in', word: 'Sign in' }, tone: 'mind' };
  if (waiting > 0) return { strong: `${notes(waiting)} to be sent.`, rest: `The server is asked again in a moment.${no}`, link: about, tone: 'mind' };
  return refused.length > 0 ? { strong: no.trim(), rest: 'It is still on this device, with what was wrong.', link: about, tone: 'mind' } : null;
}

/** An entry that waits, as the log shows one. */
export function unsentRow({ input }: Pick<UnsentEntry, 'input'>): { kind: LogKind; at: number; text: string; own: string | null; figure: string | null } {
  const entry = {
    kind: input.kind,
    text: input.text ?? null,
    gravity: input.gravity ?? null,
    gravity_read: input.gravity ?? null,
    temperature_c: input.temperature_c ?? null,
    neck: input.neck ?? null,
    volume_l: input.volume_l ?? null,
    sugar_g: input.sugar_g ?? null,
    fruit_g: input.fruit_g ?? null,
    detail: input.detail ?? null,
  } as EntryBody;
  const words = entryWords(entry);
  return {
    kind: input.kind,
    at: Date.parse(input.at) / 1000,
    text: entry.text !== null && !/\d/.test(words) ? '' : words,
    own: entry.text,
    figure: (input.kind === 'reading' || input.kind === 'pitch') && typeof input.gravity === 'number' ? gravityText(input.gravity) : null,
  };
}
