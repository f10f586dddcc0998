import { createEntry, updateEntry, type CLARITIES, type EntryBody, type EntryDetail, type INSTRUMENTS, type LOGGED_KINDS, type SUBSTANCES, type UpdateEntry } from '@/lib/contracts/batches';
import type { Foam, Neck } from '@/lib/core/types';
import type { NewEntry } from '@/lib/client/entries';
import { instantOf, wallTime } from '@/components/charts/zone';
import { typedGravity, typedNumber } from './figures';
import { sentencesOf } from '@/lib/contracts/issues';

export type EntryKind = (typeof LOGGED_KINDS)[number];
export type Substance = (typeof SUBSTANCES)[number];

/** The form as it is typed: every field text. */
export interface EntryDraft {
  kind: EntryKind;
  /** Local time, `2026-10-15T14:32`. */
  at: string;
  text: string;
  instrument: (typeof INSTRUMENTS)[number];
  gravity: string;
  brix: string;
  temperature: string;
  calibratedAt: string;
  ph: string;
  bubbles: string;
  foam: Foam | '';
  clarity: (typeof CLARITIES)[number] | '';
  smell: string;
  taste: string;
  neck: Neck | '';
  volume: string;
  substance: Substance;
  name: string;
  grams: string;
}

export type EntryField = keyof EntryDraft;

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

/** A time that is typed half way. */
export const HALF_TYPED = 'half typed';

/** When something was done, as typed; empty: now, so that a page left open is not earlier than what was logged from it since. What is no time is left for the schema to refuse. */
export const timeTyped = (text: string, timeZone: string): string => (text === '' ? new Date().toISOString() : (fromLocal(text, timeZone) ?? ''));

const EMPTY: Omit<EntryDraft, 'kind' | 'at'> = {
  text: '',
  instrument: 'hydrometer',
  gravity: '',
  brix: '',
  temperature: '',
  calibratedAt: '20',
  ph: '',
  bubbles: '',
  foam: '',
  clarity: '',
  smell: '',
  taste: '',
  neck: '',
  volume: '',
  substance: 'sugar',
  name: '',
  grams: '',
};

export function emptyDraft(kind: EntryKind, now: number, timeZone: string): EntryDraft {
  return { ...EMPTY, kind, at: toLocal(now, timeZone) };
}

/** An entry as it stands in the form, to be corrected. */
export function draftOfEntry(entry: EntryBody, kind: EntryKind, timeZone: string): EntryDraft {
  const { detail } = entry;
  const text = (value: number | null | undefined) => (typeof value === 'number' ? String(value) : '');
  const gravity = entry.gravity_read ?? (detail?.brix == null ? entry.gravity : null);
  return {
    kind,
    at: toLocal(Date.parse(entry.at) / 1000, timeZone),
    text: entry.text ?? '',
    instrument: detail?.instrument ?? 'hydrometer',
    gravity: gravity === null ? '' : gravity.toFixed(3),
    brix: text(detail?.brix),
    temperature: text(entry.temperature_c),
    calibratedAt: text(entry.calibrated_at_c ?? 20),
    ph: text(detail?.ph),
    bubbles: text(detail?.bubbles_per_minute),
    foam: detail?.foam ?? '',
    clarity: detail?.clarity ?? '',
    smell: detail?.smell ?? '',
    taste: detail?.taste ?? '',
    neck: entry.neck ?? '',
    volume: text(entry.volume_l),
    substance: detail?.substance ?? (entry.fruit_g ? 'fruit' : entry.sugar_g ? 'sugar' : entry.volume_l ? 'juice' : 'other'),
    name: detail?.name ?? '',
    grams: text(detail?.grams ?? entry.sugar_g ?? entry.fruit_g),
  };
}

const LIQUIDS: ReadonlySet<Substance> = new Set<Substance>(['juice', 'water']);
/** Only these say nothing without their amount: the judgement reckons with it. */
const WEIGHED: ReadonlySet<Substance> = new Set<Substance>(['sugar', 'honey', 'fruit']);
/** Key of the catalogue from which the server takes the sugar in so much honey. */
const HONEY = 'honey';

function additionFields(substance: Substance): readonly EntryField[] {
  if (substance === 'water') return ['substance', 'volume', 'at', 'text'];
  if (substance === 'juice') return ['substance', 'volume', 'gravity', 'at', 'text'];
  return WEIGHED.has(substance) ? ['substance', 'grams', 'at', 'text'] : ['substance', 'grams', 'name', 'at', 'text'];
}

const FIELDS: Record<Exclude<EntryKind, 'reading' | 'addition'>, readonly EntryField[]> = {
  observation: ['foam', 'clarity', 'bubbles', 'ph', 'smell', 'taste', 'text', 'at'],
  note: ['text', 'at'],
  neck: ['neck', 'at', 'text'],
  rack: ['volume', 'neck', 'at', 'text'],
  top_up: ['volume', 'gravity', 'at', 'text'],
  stabilise: ['text', 'at'],
  pitch: ['gravity', 'temperature', 'volume', 'neck', 'at', 'text'],
  overrule: ['text'],
};

/** Which fields an entry asks for, in their order. */
export function fieldsOf({ kind, instrument, substance }: Pick<EntryDraft, 'kind' | 'instrument' | 'substance'>): readonly EntryField[] {
  if (kind === 'addition') return additionFields(substance);
  if (kind !== 'reading') return FIELDS[kind];
  return instrument === 'refractometer' ? ['instrument', 'brix', 'temperature', 'at', 'text'] : ['instrument', 'gravity', 'temperature', 'calibratedAt', 'ph', 'at', 'text'];
}

const WIRE: Record<string, EntryField> = {
  at: 'at',
  text: 'text',
  gravity: 'gravity',
  temperature_c: 'temperature',
  calibrated_at_c: 'calibratedAt',
  neck: 'neck',
  volume_l: 'volume',
  sugar_g: 'grams',
  fruit_g: 'grams',
  'detail.brix': 'brix',
  'detail.ph': 'ph',
  'detail.bubbles_per_minute': 'bubbles',
  'detail.smell': 'smell',
  'detail.taste': 'taste',
  'detail.name': 'name',
  'detail.grams': 'grams',
  'detail.ingredient': 'grams',
};

export type DraftErrors = Partial<Record<EntryField, string>>;

/** Sentences by field of the wire to sentences by field of the form. */
export function errorsOf(fields: Record<string, readonly string[]>): DraftErrors {
  return Object.fromEntries(Object.entries(fields).flatMap(([path, said]) => (WIRE[path] && said[0] ? [[WIRE[path], said[0]]] : [])));
}

/** What was looked at, measured or weighed; null where nothing was. */
function detailOf(draft: EntryDraft, asked: (field: EntryField) => boolean): EntryDetail | null {
  const words = (field: 'smell' | 'taste' | 'name') => (asked(field) && draft[field].trim() !== '' ? draft[field] : null);
  const number = (field: 'brix' | 'ph' | 'bubbles' | 'grams') => (asked(field) ? typedNumber(draft[field]) : null);
  const detail: EntryDetail = {
    instrument: draft.kind === 'reading' && draft.instrument === 'refractometer' ? 'refractometer' : null,
    brix: number('brix'),
    ph: number('ph'),
    bubbles_per_minute: number('bubbles'),
    foam: asked('foam') && draft.foam !== '' ? draft.foam : null,
    clarity: asked('clarity') && draft.clarity !== '' ? draft.clarity : null,
    smell: words('smell'),
    taste: words('taste'),
    substance: asked('substance') ? draft.substance : null,
    name: words('name'),
    grams: number('grams'),
    ingredient: asked('substance') && draft.substance === 'honey' ? HONEY : null,
  };
  const given = Object.entries(detail).filter(([, value]) => value !== null);
  return given.length > 0 ? Object.fromEntries(given) : null;
}

/** The amount, where the judgement needs it. */
function amountMissing(draft: EntryDraft): DraftErrors | null {
  if (draft.kind !== 'addition') return null;
  if (WEIGHED.has(draft.substance) && typedNumber(draft.grams) === null) return { grams: 'say how much went in' };
  if (LIQUIDS.has(draft.substance) && typedNumber(draft.volume) === null) return { volume: 'say how much went in' };
  return null;
}

function wireOf(draft: EntryDraft, at: string) {
  const fields = fieldsOf(draft);
  const asked = (field: EntryField) => fields.includes(field);
  const number = (field: 'temperature' | 'calibratedAt' | 'volume') => (asked(field) ? typedNumber(draft[field]) : null);
  const temperature = number('temperature');
  const grams = asked('grams') ? typedNumber(draft.grams) : null;
  return {
    at,
    text: draft.text.trim() === '' ? null : draft.text,
    gravity: asked('gravity') ? typedGravity(draft.gravity) : null,
    temperature_c: temperature,
    // Without a sample temperature there is nothing to correct.
    calibrated_at_c: temperature === null ? null : number('calibratedAt'),
    neck: asked('neck') && draft.neck !== '' ? draft.neck : null,
    volume_l: number('volume'),
    sugar_g: draft.kind === 'addition' && draft.substance === 'sugar' ? grams : null,
    fruit_g: draft.kind === 'addition' && draft.substance === 'fruit' ? grams : null,
    detail: detailOf(draft, asked),
  };
}

/** What is sent, or what is wrong; only the fields of the kind count. `clientId` is the form's own, so that sending twice keeps one. */
export function entryOf(draft: EntryDraft, timeZone: string, clientId: string): { entry: NewEntry; errors: null } | { entry: null; errors: DraftErrors } {
  const at = fromLocal(draft.at, timeZone);
  if (at === null) return { entry: null, errors: { at: 'choose a day and a time' } };
  const missing = amountMissing(draft);
  if (missing) return { entry: null, errors: missing };
  const wire = wireOf(draft, at);
  // A refractometer's reading is asked for at its own field.
  if (draft.kind === 'reading' && draft.instrument === 'refractometer' && typeof wire.detail?.brix !== 'number') return { entry: null, errors: { brix: 'is needed for a reading' } };
  const checked = createEntry.safeParse({ ...wire, kind: draft.kind, client_id: clientId });
  return checked.success ? { entry: checked.data, errors: null } : { entry: null, errors: errorsOf(sentencesOf(checked.error.issues)) };
}

/** Only what differs from the entry as it was; null where nothing does. What the form does not show of it stays. */
export function correctionOf(draft: EntryDraft, before: EntryBody, timeZone: string): { change: UpdateEntry | null; errors: null } | { change: null; errors: DraftErrors } {
  const at = fromLocal(draft.at, timeZone);
  if (at === null) return { change: null, errors: { at: 'choose a day and a time' } };
  const missing = amountMissing(draft);
  if (missing) return { change: null, errors: missing };
  const was = draftOfEntry(before, draft.kind, timeZone);
  const [now, then] = [wireOf(draft, at), wireOf(was, fromLocal(was.at, timeZone) ?? before.at)];
  const differs = (field: keyof typeof now) => JSON.stringify(now[field]) !== JSON.stringify(then[field]);
  const changed = (Object.keys(now) as (keyof typeof now)[]).filter(differs);
  if (changed.length === 0) return { change: null, errors: null };
  const change: Record<string, unknown> = Object.fromEntries(changed.map((field) => [field, now[field]]));
  if (changed.includes('detail')) change.detail = merged(before.detail, then.detail, now.detail);
  const checked = updateEntry.safeParse(change);
  return checked.success ? { change: checked.data, errors: null } : { change: null, errors: errorsOf(sentencesOf(checked.error.issues)) };
}

/** The kept detail with the form's part of it replaced. */
function merged(kept: EntryDetail | null, then: EntryDetail | null, now: EntryDetail | null): EntryDetail | null {
  const rest = Object.entries(kept ?? {}).filter(([key]) => !(key in (then ?? {})));
  const detail = Object.fromEntries([...rest, ...Object.entries(now ?? {})]);
  return Object.keys(detail).length > 0 ? detail : null;
}
