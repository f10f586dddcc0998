import { createEntry, type LOGGED_KINDS } from '@/lib/contracts/batches';
import type { Neck } from '@/lib/core/types';
import type { NewEntry } from '@/lib/client/entries';
import { instantOf, wallTime } from '@/components/charts/zone';
import { typedGravity, typedNumber } from './figures';

export type EntryKind = (typeof LOGGED_KINDS)[number];

/** The form as it is typed: every field text. */
export interface EntryDraft {
  kind: EntryKind;
  /** Local time, `2026-10-15T14:32`. */
  at: string;
  text: string;
  gravity: string;
  temperature: string;
  calibratedAt: string;
  neck: Neck | '';
  volume: string;
  sugar: string;
  fruit: string;
}

const two = (value: number) => String(value).padStart(2, '0');

/** Seconds since 1970 to what a local time field takes. */
export function toLocal(at: number, timeZone: string): string {
  const wall = wallTime(at, timeZone);
  return `${wall.year}-${two(wall.month)}-${two(wall.day)}T${two(wall.hour)}:${two(wall.minute)}`;
}

/** A local time field to RFC 3339; null where it is not a time. */
export function fromLocal(text: string, timeZone: string): string | null {
  const match = /^(\d{4})-(\d{2})-(\d{2})T(\d{2}):(\d{2})/.exec(text);
  if (!match) return null;
  const [year, month, day, hour, minute] = match.slice(1).map(Number) as [number, number, number, number, number];
  return new Date(instantOf({ year, month, day, hour, minute }, timeZone) * 1000).toISOString();
}

export function emptyDraft(kind: EntryKind, now: number, timeZone: string): EntryDraft {
  return { kind, at: toLocal(now, timeZone), text: '', gravity: '', temperature: '', calibratedAt: '20', neck: '', volume: '', sugar: '', fruit: '' };
}

/** Which fields a kind asks for, in their order. */
export const FIELDS: Record<EntryKind, readonly (keyof EntryDraft)[]> = {
  reading: ['gravity', 'temperature', 'calibratedAt', 'at', 'text'],
  observation: ['text', 'at'],
  note: ['text', 'at'],
  neck: ['neck', 'at', 'text'],
  rack: ['volume', 'neck', 'at', 'text'],
  addition: ['sugar', 'fruit', 'volume', 'gravity', 'text', 'at'],
  top_up: ['volume', 'gravity', 'at', 'text'],
  stabilise: ['text', 'at'],
  pitch: ['gravity', 'temperature', 'volume', 'neck', 'at', 'text'],
};

const WIRE: Record<string, keyof EntryDraft> = {
  at: 'at',
  text: 'text',
  gravity: 'gravity',
  temperature_c: 'temperature',
  calibrated_at_c: 'calibratedAt',
  neck: 'neck',
  volume_l: 'volume',
  sugar_g: 'sugar',
  fruit_g: 'fruit',
};

export type DraftErrors = Partial<Record<keyof EntryDraft, string>>;

/** Sentences by field of the wire to sentences by field of the form. */
export function errorsOf(fields: Record<string, readonly string[]>): DraftErrors {
  return Object.fromEntries(Object.entries(fields).flatMap(([path, said]) => (WIRE[path] && said[0] ? [[WIRE[path], said[0]]] : [])));
}

/** What is sent, or what is wrong; only the fields of the kind count. `clientId` is the form's own, so that sending twice keeps one. */
export function entryOf(draft: EntryDraft, timeZone: string, clientId: string): { entry: NewEntry; errors: null } | { entry: null; errors: DraftErrors } {
  const asked = (field: keyof EntryDraft) => FIELDS[draft.kind].includes(field);
  const number = (field: 'temperature' | 'calibratedAt' | 'volume' | 'sugar' | 'fruit') => (asked(field) ? typedNumber(draft[field]) : null);
  const temperature = number('temperature');
  const at = fromLocal(draft.at, timeZone);
  if (at === null) return { entry: null, errors: { at: 'choose a day and a time' } };
  const checked = createEntry.safeParse({
    kind: draft.kind,
    at,
    text: draft.text.trim() === '' ? null : draft.text,
    gravity: asked('gravity') ? typedGravity(draft.gravity) : null,
    temperature_c: temperature,
    // Without a sample temperature there is nothing to correct.
    calibrated_at_c: temperature === null ? null : number('calibratedAt'),
    neck: asked('neck') && draft.neck !== '' ? draft.neck : null,
    volume_l: number('volume'),
    sugar_g: number('sugar'),
    fruit_g: number('fruit'),
    client_id: clientId,
  });
  if (checked.success) return { entry: checked.data, errors: null };
  const fields: Record<string, string[]> = {};
  for (const issue of checked.error.issues) (fields[issue.path.join('.')] ??= []).push(issue.message);
  return { entry: null, errors: errorsOf(fields) };
}
