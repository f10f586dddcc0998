import { correctBrix, gravityByRefractometer, sgOfBrix } from '@/lib/core/gravity/refractometer';
import { REFRACTOMETER_OFF_POINTS } from '@/lib/core/how/readings';
import { gravityText, typedNumber } from './figures';

/** What has to be known of the must for a refractometer to tell anything. */
export interface MustKnown {
  pitched: boolean;
  /** With all sugar added since, SG. */
  originalGravity: number | null;
}

/** What the reading comes to, beside the field while it is typed; null while nothing is typed. */
export function refractometerWords(draft: { brix: string; temperature: string }, { pitched, originalGravity }: MustKnown): string | null {
  const shown = typedNumber(draft.brix);
  if (shown === null || !(shown >= 0 && shown <= 60)) return null;
  const celsius = typedNumber(draft.temperature);
  const brix = celsius === null ? shown : correctBrix(shown, celsius);
  if (brix === null) return 'The sample has to be 10 to 20 °C; leave it empty where the instrument corrects itself.';
  if (!pitched) return `${gravityText(sgOfBrix(brix))}: no alcohol in it yet.`;
  if (originalGravity === null) return 'Alcohol changes what it shows: tell the original gravity first, or use a hydrometer.';
  const gravity = gravityByRefractometer(originalGravity, brix);
  if (gravity === null) return `That is more than the must had at the start, ${gravityText(originalGravity)}.`;
  return `${gravityText(gravity)} ± ${(REFRACTOMETER_OFF_POINTS / 1000).toFixed(3)} with the alcohol reckoned in, from ${gravityText(originalGravity)}; read as a must it would be ${gravityText(sgOfBrix(brix))}. Not to bottle by: what alcohol adds to the reading is recalled, not checked against a source.`;
}
