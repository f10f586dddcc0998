import type { EntryBody } from '@/lib/contracts/batches';
import { correctBrix, sgOfBrix } from '@/lib/core/gravity/refractometer';
import type { How } from '@/lib/core/how/how';
import { howOfReading, REFRACTOMETER_OFF_POINTS } from '@/lib/core/how/readings';
import { degrees, grams, gravityText, litres } from './figures';
import { CLARITY_WORDS, FOAM_WORDS, NECK_WORDS, SUBSTANCE_WORDS } from './words';

const sentence = (text: string) => `${text.charAt(0).toUpperCase()}${text.slice(1)}.`;
const listed = (parts: readonly string[]) => (parts.length > 1 ? `${parts.slice(0, -1).join(', ')} and ${parts.at(-1)}` : (parts[0] ?? ''));

/** `Added 120 g of sugar and 0.3 L at 1.031.` */
function additionWords(entry: EntryBody): string {
  const { detail } = entry;
  const what = detail?.name ?? (detail?.substance && detail.substance !== 'other' ? SUBSTANCE_WORDS[detail.substance] : null);
  const liquid = entry.volume_l ? `${litres(entry.volume_l)} of ${what ?? 'liquid'}${entry.gravity === null ? '' : ` at ${gravityText(entry.gravity)}`}` : null;
  // Sugar that was reckoned from what was weighed stands behind it.
  const weighed = detail?.grams && !(detail.substance === 'sugar' || detail.substance === 'fruit') ? `${grams(detail.grams)} of ${what ?? 'something'}${entry.sugar_g ? ` (${grams(entry.sugar_g)} of sugar)` : ''}` : null;
  const parts = [weighed, !weighed && entry.sugar_g ? `${grams(entry.sugar_g)} of sugar` : null, entry.fruit_g ? `${grams(entry.fruit_g)} of fruit` : null, liquid].filter((part) => part !== null);
  if (parts.length > 0) return `Added ${listed(parts)}.`;
  return what ? `Added ${what}.` : 'Something added.';
}

/** Read before there was any alcohol in it: °Bx stands for itself. */
const must = (entry: EntryBody): boolean => entry.detail?.brix != null && entry.gravity !== null && Math.abs(entry.gravity - sgOfBrix(brixAt20(entry))) < 0.0002;
const brixAt20 = ({ detail, temperature_c }: EntryBody): number => (temperature_c === null ? null : correctBrix(detail?.brix ?? 0, temperature_c)) ?? detail?.brix ?? 0;

/** Where the gravity of a reading comes from; null where it stands as it was read. */
export const howOfEntry = (entry: EntryBody): How | null =>
  entry.kind !== 'reading' || entry.gravity === null ? null : howOfReading({ gravity: entry.gravity, read: entry.gravity_read, sampleC: entry.temperature_c, calibratedC: entry.calibrated_at_c, brix: entry.detail?.instrument === 'refractometer' ? (entry.detail.brix ?? null) : null, must: must(entry) });

function readingWords(entry: EntryBody): string {
  const { detail } = entry;
  const sample = entry.temperature_c === null ? '' : `, sample at ${degrees(entry.temperature_c)}`;
  const ph = detail?.ph == null ? '' : ` pH ${detail.ph.toFixed(2)}.`;
  const og = detail?.as_original_gravity ? ' Taken for the original gravity.' : '';
  if (detail?.instrument === 'refractometer') return `Refractometer${detail.brix == null ? '' : ` ${detail.brix.toFixed(1)} °Bx`}${sample}${must(entry) ? '.' : `, alcohol reckoned in from memory, ± ${(REFRACTOMETER_OFF_POINTS / 1000).toFixed(3)}.`}${ph}${og}`;
  const corrected = entry.gravity !== null && entry.gravity_read !== null && gravityText(entry.gravity) !== gravityText(entry.gravity_read);
  return `Hydrometer${sample}${corrected ? `, corrected from ${gravityText(entry.gravity_read!)}` : ''}.${ph}${og}`;
}

/** What was looked at and measured, each in its own short sentence. */
function seenWords({ detail }: EntryBody): string {
  if (!detail) return '';
  return [
    detail.foam ? `foam ${FOAM_WORDS[detail.foam]}` : null,
    detail.clarity ? CLARITY_WORDS[detail.clarity] : null,
    detail.bubbles_per_minute == null ? null : `${Number(detail.bubbles_per_minute.toFixed(1))} bubbles a minute`,
    detail.ph == null ? null : `pH ${detail.ph.toFixed(2)}`,
    detail.titratable_acid_g_per_l == null ? null : `acid ${detail.titratable_acid_g_per_l.toFixed(1)} g/L`,
    detail.free_sulphite_mg_l == null ? null : `free sulphite ${Number(detail.free_sulphite_mg_l.toFixed(0))} mg/L`,
    detail.smell ? `smell: ${detail.smell.replace(/\.$/, '')}` : null,
    detail.taste ? `taste: ${detail.taste.replace(/\.$/, '')}` : null,
  ]
    .filter((part) => part !== null)
    .map((part) => (part.startsWith('pH') ? `${part}.` : sentence(part)))
    .join(' ');
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
    case 'overrule':
      return entry.detail?.said ? `Overruled: “${entry.detail.said.headline.replace(/\.$/, '')}”.` : 'Overruled a call.';
    case 'observation':
    case 'note':
      return seenWords(entry);
  }
}
