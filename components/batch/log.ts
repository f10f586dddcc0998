import type { VerdictChangeList } from '@/lib/contracts/assessment';
import type { EntryBody } from '@/lib/contracts/batches';
import { CALL_NAMES } from '@/lib/core/types';
import { clock, wallTime, MONTHS } from '@/components/charts/zone';
import { entryWords } from './entry-words';
import { gravityText } from './figures';

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
  /** The reader may correct it or take it back. */
  mine: boolean;
  /** The line itself; null for what the program came to think. */
  entry: EntryBody | null;
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
  entry,
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
    return [{ id: `call ${change.at}`, at: Date.parse(change.at) / 1000, kind: 'call' as const, text: said.map((call) => call.headline).join(' '), own: null, figure: null, who: 'Fallbright', mine: false, entry: null }];
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
  calls: ['call', 'overrule'],
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
