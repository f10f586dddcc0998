import type { AssessmentBody, CallBody } from '@/lib/contracts/assessment';
import type { BatchBody } from '@/lib/contracts/batches';
import { when } from '@/components/charts/zone';
import { STATE_WORDS, stateOfCall, type StateWord } from '@/lib/core/calls/attention';
import type { How } from '@/lib/core/how/how';
import { howOfCall } from '@/lib/core/how/judged';
import { CALL_NAMES, type CallName, type Neck } from '@/lib/core/types';
import { rulerOf, thresholdsOf, type RulerParts } from './evidence';

/** A call as the batch page tells it. */
export interface CallRow {
  name: CallName;
  state: StateWord;
  /** The state's word here: `Not yet` for what is only a matter of time. */
  word: string;
  question: string;
  headline: string;
  reason: string;
  ruler: RulerParts | null;
  /** Label and sentence of each line under the ruler. */
  lines: { label: string; text: string }[];
  /** The alert that nobody has yet, to be taken in hand here. */
  alert: string | null;
  /** Who has it. */
  takenBy: string | null;
  /** What a person holds instead, where they have set it aside. */
  overruled: BatchBody['overruled'][number] | null;
  /** Its rule, and the figures that it was held to. */
  how: How;
}

const QUESTIONS: Record<CallName, string> = {
  started: 'working?',
  neck: 'tube to airlock?',
  stalled: 'stalled?',
  temperature: 'warm enough?',
  rack: 'ready to rack?',
  bottle: 'ready to bottle?',
  sensor: 'sensor sound?',
};

/** Order of equals: what costs more when neglected comes first. */
const ORDER: readonly CallName[] = ['stalled', 'neck', 'temperature', 'bottle', 'rack', 'started', 'sensor'];

/** Here the unsafe thing is asked for by name: a bottle that could burst is a Stop. */
function stateHere(name: CallName, call: CallBody, neck: Neck): StateWord {
  if (name === 'bottle' && (call.verdict === 'hold' || call.kind === 'refermentation')) return 'Stop';
  if (call.verdict === 'unknown') return 'Silent';
  if (name === 'neck' && call.verdict === 'no' && neck === 'airlock') return 'Done';
  const sketch = { verdict: call.verdict, kind: call.kind, since: null, expectedAt: call.expected_at === null ? null : Date.parse(call.expected_at) };
  return stateOfCall(name, sketch, neck);
}

function wordHere(name: CallName, call: CallBody, state: StateWord): string {
  if (state === 'Silent') return call.kind === 'silent' ? 'Silent' : 'Not known';
  if (state === 'Leave be' && (name === 'rack' || name === 'bottle' || (name === 'started' && call.verdict === 'no'))) return 'Not yet';
  return state;
}

/** The label of the line says it already. */
const bare = (text: string) => {
  const rest = text.replace(/^Changes it: /, '');
  return rest.charAt(0).toUpperCase() + rest.slice(1);
};

function linesOf(call: CallBody, now: number, timeZone: string, ruler: RulerParts | null): CallRow['lines'] {
  const at = (iso: string) => when(Date.parse(iso) / 1000, now, timeZone);
  const rest = thresholdsOf(call, ruler?.index ?? null);
  return [
    call.act && { label: 'do', text: call.act },
    rest && { label: 'threshold', text: rest },
    call.since && { label: 'since', text: `${at(call.since)}.` },
    call.expected_at && { label: 'expected', text: `${at(call.expected_at)}.` },
    call.changes_it && { label: 'changes it', text: bare(call.changes_it) },
  ].filter((line): line is { label: string; text: string } => Boolean(line));
}

/** The bottle's Stop answers a question nobody may have asked yet: what wants a person stands before it, save a bottle that works again. */
function rank(row: CallRow, judged: AssessmentBody): number {
  const quiet = STATE_WORDS.indexOf('Leave be') - 0.5;
  // Before the start nothing else has anything to say.
  if (row.name === 'started' && judged.calls.started.verdict !== 'yes' && row.state !== 'Check') return quiet - 0.1;
  if (row.word === 'Not known') return quiet;
  const asked = row.name === 'bottle' && row.state === 'Stop' && judged.calls.bottle.kind !== 'refermentation';
  return asked ? STATE_WORDS.indexOf('Ready') + 0.5 : STATE_WORDS.indexOf(row.state);
}

/** All calls of a batch, what wants a person first. */
export function callRows(batch: Pick<BatchBody, 'neck' | 'alerts' | 'overruled' | 'original_gravity'>, judged: AssessmentBody, now: number, timeZone: string): CallRow[] {
  const rows = CALL_NAMES.map((name): CallRow => {
    const call = judged.calls[name];
    const alert = batch.alerts.find((item) => item.call === name);
    const overruled = batch.overruled.find((item) => item.call === name) ?? null;
    const own = overruled ? 'Leave be' : stateHere(name, call, batch.neck);
    const state: StateWord = alert?.state === 'acknowledged' && own !== 'Stop' && own !== 'Leave be' ? 'In hand' : own;
    const ruler = rulerOf(name, call, batch.original_gravity);
    return {
      name,
      state,
      word: overruled ? 'Overruled' : wordHere(name, call, state),
      question: QUESTIONS[name],
      headline: call.headline,
      reason: call.reason,
      ruler,
      lines: linesOf(call, now, timeZone, ruler),
      alert: alert?.state === 'open' ? alert.id : null,
      takenBy: alert?.taken_by ?? null,
      overruled,
      how: howOfCall(name, call.evidence),
    };
  });
  return rows.sort((a, b) => rank(a, judged) - rank(b, judged) || ORDER.indexOf(a.name) - ORDER.indexOf(b.name));
}

/** Loud calls are shown with their evidence open. */
export const isLoud = (row: Pick<CallRow, 'state' | 'word'>): boolean => row.state !== 'Leave be' && row.state !== 'Done' && row.word !== 'Not known';
