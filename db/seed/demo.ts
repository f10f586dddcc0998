import type { Role } from '../../lib/core/roles';

/**
 * The demo: an invented cellar with invented people. Their passphrase is printed
 * at every start, so a demo must never listen beyond loopback.
 */
export const DEMO_PASSPHRASE = 'clear by midwinter';

export const DEMO_CELLAR_NAME = 'Low barn';

export const DEMO_PEOPLE: ReadonlyArray<{ name: string; email: string; role: Role }> = [
  { name: 'Una Thorne', email: 'una@lowbarn.example', role: 'keeper' },
  { name: 'Piet Marsh', email: 'piet@lowbarn.example', role: 'brewer' },
  { name: 'Inga Farrow', email: 'inga@lowbarn.example', role: 'hand' },
  { name: 'Bo Lark', email: 'bo@lowbarn.example', role: 'guest' },
];

export interface DemoBatch {
  /** A scenario of devices/simulator. */
  scenario: string;
  seed: number;
  tag: number;
  place: string;
  yeast: string | null;
  /** Written to the log by someone, hours after the pitch. */
  notes?: ReadonlyArray<{ atH: number; by: string; text: string }>;
  /** Read by hand beside what the scenario logs, hours after the pitch. */
  readAtH?: readonly number[];
  /** How many days ago somebody looked after the water in its airlock last; a fortnight before that too, as long as it had one. */
  waterDaysAgo?: number;
  /** A fining that runs when the demo opens: its first dose went in so many minutes before. */
  fining?: { fining: string; dose: string; startedMinAgo: number };
}

/** In the order of their tags on the shelf. */
export const DEMO_BATCHES: readonly DemoBatch[] = [
  { scenario: 'foaming', seed: 11, tag: 1, place: 'by the sink', yeast: 'dry cider yeast', notes: [{ atH: 30, by: 'Inga Farrow', text: 'Foam in the tube this morning; jar half full, emptied.' }] },
  { scenario: 'ready-to-rack', waterDaysAgo: 4, seed: 12, tag: 2, place: 'long shelf', yeast: 'dry cider yeast', notes: [{ atH: 400, by: 'Piet Marsh', text: 'Lees have gone tight and flat. Smells clean.' }] },
  { scenario: 'racking', waterDaysAgo: 6, seed: 13, tag: 3, place: 'long shelf', yeast: 'red wine yeast', fining: { fining: 'two-part', dose: 'a teaspoon', startedMinAgo: 18 } },
  { scenario: 'finished', waterDaysAgo: 9, seed: 14, tag: 4, place: 'north wall', yeast: 'red wine yeast', notes: [{ atH: 60 * 24, by: 'Una Thorne', text: 'One can read print through it.' }], readAtH: [88 * 24, 96 * 24 - 5] },
  { scenario: 'stuck-cold', seed: 15, tag: 5, place: 'back row by the door', yeast: 'dry ale yeast', notes: [{ atH: 98, by: 'Inga Farrow', text: 'Heat mat found unplugged. Plugged back in; not sure it is warming.' }] },
  { scenario: 'silent', seed: 16, tag: 6, place: 'back row', yeast: 'white wine yeast' },
  { scenario: 'in-lag', seed: 17, tag: 7, place: 'by the sink', yeast: 'white wine yeast' },
  { scenario: 'healthy-mead', seed: 18, tag: 8, place: 'long shelf', yeast: 'mead yeast' },
  { scenario: 'long-tail', waterDaysAgo: 13.75, seed: 19, tag: 9, place: 'north wall', yeast: 'white wine yeast', notes: [{ atH: 44 * 24, by: 'Piet Marsh', text: 'Week seven and it still pushes a bubble now and then.' }] },
  { scenario: 'healthy-beer', seed: 20, tag: 10, place: 'back row', yeast: 'dry ale yeast' },
];

/** What the people of the demo put on their rounds themselves; days from the opening, the past ones done. */
export const DEMO_JOBS: ReadonlyArray<{ title: string; note: string | null; by: string; dueInDays: number; repeatDays: number | null; doneBy: string | null }> = [
  { title: 'Air the barn and sweep round the vessels', note: null, by: 'Una Thorne', dueInDays: -3, repeatDays: 7, doneBy: 'Inga Farrow' },
  { title: 'Count the clean half-litre bottles', note: 'The bitter wants forty.', by: 'Piet Marsh', dueInDays: 1.2, repeatDays: null, doneBy: null },
];
