import type { VerdictChangeList } from '@/lib/contracts/assessment';
import type { EntryBody } from '@/lib/contracts/batches';
import { CALL_NAMES } from '@/lib/core/types';
import { clock, wallTime, MONTHS } from '@/components/charts/zone';
import { degrees, grams, gravityText, litres } from './figures';
import { NECK_WORDS } from './words';

export const LOG_FILTERS = ['all', 'readings', 'additions', 'notes', 'calls'] as const;
export type LogFilter = (typeof LOG_FILTERS)[number];

/** A drawn kind stands before each line of the log. */
export type LogKind = EntryBody['kind'] | 'call';

export interface LogRow {
  id: string;
  /** Seconds since 1970. */
  at: number;
  kind: LogKind;
  text: string;
  /** Said by a person, in their own words, after what the program says. */
  own: string | null;
  figure: string | null;
  who: string;
  /** The entry may be taken back by the reader. */
  mine: boolean;
}

/** `Added 120 g sugar and 0.3 L at 1.031.` */
function additionWords(entry: EntryBody): string {
  const parts = [
    entry.sugar_g ? `${grams(entry.sugar_g)} sugar` : null,
    entry.fruit_g ? `${grams(entry.fruit_g)} fruit` : null,
    entry.volume_l ? `${litres(entry.volume_l)} liquid${entry.gravity === null ? '' : ` at ${gravityText(entry.gravity)}`}` : null,
  ].filter((part) => part !== null);
  if (parts.length === 0) return 'Something added.';
  return `Added ${parts.length > 1 ? `${parts.slice(0, -1).join(', ')} and ${parts.at(-1)}` : parts[0]}.`;
}

function readingWords(entry: EntryBody): string {
  const sample = entry.temperature_c === null ? 'Hydrometer' : `Hydrometer, sample at ${degrees(entry.temperature_c)}`;
  const corrected = entry.gravity !== null && entry.gravity_read !== null && gravityText(entry.gravity) !== gravityText(entry.gravity_read);
  return corrected ? `${sample}, corrected from ${gravityText(entry.gravity_read!)}.` : `${sample}.`;
}

/** What happened, in the log's words; the person's own words stand apart. */
export function entryWords(entry: EntryBody): string {
  switch (entry.kind) {
    case 'pitch':
      return entry.volume_l === null ? 'Pitched.' : `Pitched, ${litres(entry.volume_l)}.`;
    case 'reading':
      return readingWords(entry);
    case 'neck':
      return entry.neck === null ? 'Neck changed.' : entry.neck === 'open' ? 'Neck opened.' : `${NECK_WORDS[entry.neck][0]!.toUpperCase()}${NECK_WORDS[entry.neck].slice(1)} put on.`;
    case 'rack':
      return entry.volume_l === null ? 'Racked.' : `Racked, ${litres(entry.volume_l)} came over.`;
    case 'addition':
      return additionWords(entry);
    case 'top_up':
      return entry.volume_l === null ? 'Topped up.' : `Topped up with ${litres(entry.volume_l)}${entry.gravity === null ? '' : ` at ${gravityText(entry.gravity)}`}.`;
    case 'stabilise':
      return 'Stabilised.';
    case 'fining':
      return entry.detail?.dose === 'b' ? 'Fined, second dose.' : entry.detail?.dose === 'a' ? 'Fined, first dose.' : 'Fined.';
    case 'split':
      return entry.volume_l === null ? 'Split.' : `Split, ${litres(entry.volume_l)} went over.`;
    case 'blend':
      return entry.volume_l === null ? 'Blended.' : `Blended, ${litres(entry.volume_l)}.`;
    case 'bottling':
      return entry.volume_l === null ? 'Bottled.' : `Bottled, ${litres(entry.volume_l)}.`;
    case 'observation':
    case 'note':
      return '';
  }
}

/** Where the person said it in their own words, ours are kept only for their figures. */
const wordsBeside = (entry: EntryBody): string => {
  const words = entryWords(entry);
  return entry.text !== null && !/\d/.test(words) ? '' : words;
};

const rowOf = (entry: EntryBody): LogRow => ({
  id: entry.id,
  at: Date.parse(entry.at) / 1000,
  kind: entry.kind,
  text: wordsBeside(entry),
  own: entry.text,
  figure: (entry.kind === 'reading' || entry.kind === 'pitch') && entry.gravity !== null ? gravityText(entry.gravity) : null,
  who: entry.person?.name ?? 'Fallbright',
  mine: entry.mine,
});

/**
 * What the program came to think, one line a change; a call that only lost its
 * data says nothing worth keeping. The first judgement changes every call: of it
 * only what is so is told, not all that is not.
 */
function callRows(changes: VerdictChangeList['items']): LogRow[] {
  return changes.flatMap((change) => {
    const first = change.changed.length === CALL_NAMES.length;
    const said = change.changed.map((name) => change.assessment.calls[name]).filter((call) => call.verdict !== 'unknown' && !(first && call.verdict === 'no'));
    if (said.length === 0) return [];
    return [{ id: `call ${change.at}`, at: Date.parse(change.at) / 1000, kind: 'call' as const, text: said.map((call) => call.headline).join(' '), own: null, figure: null, who: 'Fallbright', mine: false }];
  });
}

/** Newest first; of one instant, the person's line stands above the program's. */
export function logRows(entries: readonly EntryBody[], changes: VerdictChangeList['items']): LogRow[] {
  return [...entries.map(rowOf), ...callRows(changes)].sort((a, b) => b.at - a.at || Number(a.kind === 'call') - Number(b.kind === 'call'));
}

const BY_FILTER: Record<Exclude<LogFilter, 'all'>, readonly LogKind[]> = {
  readings: ['reading', 'pitch'],
  additions: ['addition', 'top_up', 'stabilise', 'rack', 'neck', 'fining', 'split', 'blend', 'bottling'],
  notes: ['note', 'observation'],
  calls: ['call'],
};

export const filtered = (rows: readonly LogRow[], filter: LogFilter): LogRow[] => rows.filter((row) => filter === 'all' || BY_FILTER[filter].includes(row.kind));

/** `Wed 15, 09:04` this month, else `15 Oct, 09:04`; the year where it is another. */
export function logTime(at: number, now: number, timeZone: string): string {
  const wall = wallTime(at, timeZone);
  const today = wallTime(now, timeZone);
  const time = clock(at, timeZone);
  if (wall.year !== today.year) return `${wall.day} ${MONTHS[wall.month - 1]} ${wall.year}`;
  return wall.month === today.month ? `${wall.weekday} ${wall.day}, ${time}` : `${wall.day} ${MONTHS[wall.month - 1]}, ${time}`;
}
