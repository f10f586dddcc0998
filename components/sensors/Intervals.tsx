import { everyWords } from './words';

/** Spans that float sensors are usually set to, s. */
const USUAL = [60, 300, 900, 1_800, 3_600];

/** How often a sensor speaks; one that was told another span keeps it in the list. */
export function IntervalOptions({ given }: { given?: number }) {
  const spans = given === undefined || USUAL.includes(given) ? USUAL : [...USUAL, given].sort((a, b) => a - b);
  return spans.map((seconds) => (
    <option key={seconds} value={seconds}>
      {everyWords(seconds)}
    </option>
  ));
}
