import { when } from '@/components/charts/zone';
import type { EntryBody, RevisionList } from '@/lib/contracts/batches';
import { degrees, grams, gravityText, litres } from './figures';
import { CLARITY_WORDS, FOAM_WORDS, NECK_WORDS, SUBSTANCE_WORDS } from './words';

type Said = RevisionList['items'][number]['before'];

/** One correction: who, when, and each thing as it was and as it became. */
export interface Correction {
  at: string;
  by: string;
  changes: { name: string; before: string; after: string }[];
}

/** What an entry says, thing by thing, as it is shown. */
function saidOf(said: Said, now: number, timeZone: string): Map<string, string> {
  const { detail } = said;
  const pairs: [string, string | null][] = [
    ['time', when(Date.parse(said.at) / 1000, now, timeZone)],
    ['gravity as read', said.gravity_read === null ? null : gravityText(said.gravity_read)],
    ['gravity', said.gravity === null ? null : gravityText(said.gravity)],
    ['sample', said.temperature_c === null ? null : degrees(said.temperature_c)],
    ['neck', said.neck && NECK_WORDS[said.neck]],
    ['volume', said.volume_l === null ? null : litres(said.volume_l)],
    ['sugar', said.sugar_g === null ? null : grams(said.sugar_g)],
    ['fruit', said.fruit_g === null ? null : grams(said.fruit_g)],
    ['what', detail?.substance ? SUBSTANCE_WORDS[detail.substance] : null],
    ['name', detail?.name ?? null],
    ['weight', detail?.grams == null ? null : grams(detail.grams)],
    ['°Bx', detail?.brix == null ? null : detail.brix.toFixed(1)],
    ['pH', detail?.ph == null ? null : detail.ph.toFixed(2)],
    ['bubbles a minute', detail?.bubbles_per_minute == null ? null : String(detail.bubbles_per_minute)],
    ['foam', detail?.foam ? FOAM_WORDS[detail.foam] : null],
    ['clarity', detail?.clarity ? CLARITY_WORDS[detail.clarity] : null],
    ['smell', detail?.smell ?? null],
    ['taste', detail?.taste ?? null],
    ['words', said.text],
  ];
  return new Map(pairs.filter((pair): pair is [string, string] => pair[1] !== null && pair[1] !== ''));
}

/** The corrections of an entry, newest first; `now` in seconds since 1970. */
export function correctionsOf(entry: EntryBody, revisions: RevisionList['items'], now: number, timeZone: string): Correction[] {
  return revisions.map((revision, index) => {
    // What it became is what the next correction found, or what it says now.
    const after = saidOf(index === 0 ? entry : revisions[index - 1]!.before, now, timeZone);
    const before = saidOf(revision.before, now, timeZone);
    const names = [...new Set([...before.keys(), ...after.keys()])].filter((name) => before.get(name) !== after.get(name));
    return {
      at: when(Date.parse(revision.at) / 1000, now, timeZone),
      by: revision.by?.name ?? 'somebody who has left',
      changes: names.map((name) => ({ name, before: before.get(name) ?? '–', after: after.get(name) ?? '–' })),
    };
  });
}
